// `tolerand plan` as a user runs it: from problems to a plan, and from the plan to a study that keeps it.
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { spawnSync } from "node:child_process";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { AllocationPlan } from "../../src/findings/allocation-plan.js";
import type { ProblemPlan } from "../../src/findings/plan.js";
import type { StudyRecord } from "../../src/record/types.js";

const program = fileURLToPath(new URL("../../dist/cli/main.js", import.meta.url));
let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-plan-"));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

function tolerand(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [program, ...args], {
    cwd: folder,
    encoding: "utf8",
  });
  expect(stderr).not.toMatch(/\n {4}at /);
  return { status, stdout, stderr };
}

function planned(...args: string[]): {
  from: string;
  plans: ProblemPlan[];
  allocation: AllocationPlan | null;
} {
  const { status, stdout, stderr } = tolerand("plan", ...args, "--json");
  expect(status, stderr).toBe(0);
  return JSON.parse(stdout) as { from: string; plans: ProblemPlan[]; allocation: AllocationPlan | null };
}

const problem = (name: string, text: string) => {
  writeFileSync(join(folder, name), text);
  return name;
};

describe("plan", () => {
  it.each(["availability-chain", "season-guarantee-geometric"])(
    "recommends for tidal/%s what a study with fresh keys then finds within the tolerance",
    (id) => {
      const [plan] = planned(`tidal/${id}`).plans;
      const chosen = plan?.recommended;
      expect(chosen?.point).not.toBeNull();
      const n = chosen?.point?.n ?? 0;
      const flags = [
        "--sources",
        chosen?.source ?? "",
        "--sizes",
        String(n),
        "--replicates",
        "32",
        "--seed",
        "4711",
      ];
      const { stdout } = tolerand("study", `tidal/${id}`, ...flags, "--out", id, "--json");
      const record = JSON.parse(stdout) as StudyRecord;
      const budget = record.budgets.find((one) => one.source === chosen?.source && !one.inUse);
      expect([budget?.n, budget?.verdict]).toEqual([n, "within"]);
      const cell = record.cells.find((one) => one.source === chosen?.source && one.n === n);
      // 32 errors of single runs at 99 %: more than 3 outside has a probability below 5e-4.
      const outside = (cell?.estimates ?? []).filter(
        (estimate) => Math.abs(estimate - (cell?.reference ?? NaN)) > (plan?.tolerance ?? 0),
      );
      expect(outside.length).toBeLessThanOrEqual(3);
    },
  );

  it("plans from a report folder without a run, and follows seconds per point", () => {
    const file = problem(
      "small.yaml",
      "inputs: { x: { distribution: uniform, length: 4 } }\nintegrand: mean(x .^ 2)\nreference: { value: 1/3, basis: elementary }\ntolerance: { absolute: 0.01 }\n",
    );
    tolerand(
      "study",
      file,
      "--sources",
      "philox4x32,sobol+owen",
      "--sizes",
      "2^6..2^10",
      "--replicates",
      "16",
      "--out",
      "done",
    );
    const { from, plans } = planned("done", "--seconds-per-point", "0.5");
    expect(from).toBe("record");
    const best = plans[0]?.recommended;
    expect(best?.source).toBe("sobol+owen");
    expect(best?.userSeconds).toBe((best?.point?.n ?? 0) / 2);
    const text = tolerand("plan", "done").stdout;
    expect(text).toContain("→  sobol+owen");
    expect(text).toMatch(/To show it: a study of [\d,]+ points with 16 replicates\./);
  });

  it("says never for all where what is declared takes the tolerance", () => {
    const file = problem(
      "declared.yaml",
      "inputs: { x: { distribution: uniform } }\nintegrand: x\nreference: { value: 1/2, basis: elementary }\ntolerance: { absolute: 0.01 }\ndeclared: [{ line: time step, bias: 0.02, basis: halved }]\n",
    );
    const { plans } = planned(file, "--sources", "philox4x32,sobol+owen");
    expect(plans[0]?.sources.map(({ status }) => status)).toEqual(["never", "never"]);
    expect(plans[0]?.recommended).toBeNull();
    expect(tolerand("plan", file, "--sources", "philox4x32").stdout).toContain(
      "No recommendation: no source of this plan is known to come inside the tolerance.",
    );
  });

  it.each([
    [["--seconds-per-point", "0"], '--seconds-per-point: expected a number above 0, found "0"'],
    [["--time", "soon"], '--time: expected a number above 0, found "soon"'],
    [["--randomisations", "0"], '--randomisations: expected a whole number of at least 1, found "0"'],
    [["--total", "-1"], '--total: expected a number above 0, found "-1"'],
    [["--total", "1"], "--total: a weighted sum needs weights; give a folder whose suite.yaml has total"],
  ])("refuses %j", (flags, message) => {
    const { status, stderr, stdout } = tolerand("plan", "tidal/price-floor", ...flags);
    expect([status, stdout]).toEqual([2, ""]);
    expect(stderr).toContain(message);
  });
});

describe("allocation over a suite", () => {
  const suite = (name: string, total: string) => {
    mkdirSync(join(folder, name), { recursive: true });
    const text = (integrand: string, value: string) =>
      `inputs: { x: { distribution: uniform } }\nintegrand: ${integrand}\nreference: { value: ${value}, basis: elementary }\ntolerance: { absolute: 0.01 }\n`;
    problem(join(name, "line.yaml"), text("x", "1/2"));
    problem(join(name, "square.yaml"), text("x^2", "1/3"));
    problem(join(name, "suite.yaml"), total);
    return name;
  };

  it("gives the heavier problem more points and costs no more than equal ones", () => {
    const name = suite("sum", "total: { weights: { line: 50, square: -1 }, tolerance: { absolute: 0.2 } }\n");
    const { allocation } = planned(name, "--sources", "philox4x32");
    const [line, square] = allocation?.cheapest?.rows ?? [];
    expect(line?.n).toBeGreaterThan(3 * (square?.n ?? Infinity));
    expect(allocation?.cheapest?.total).toBeLessThanOrEqual(0.2);
    expect(allocation?.saving).toBeGreaterThanOrEqual(0);
    expect(tolerand("plan", name, "--sources", "philox4x32").stdout).toMatch(
      /Weighted sum of the suite {3}tolerance ±0\.20 at 99 %/,
    );
  });

  it.each([
    ["total: { weights: { lin: 1 }, tolerance: { absolute: 1 } }", 'found "lin"; did you mean "line"?'],
    [
      "total: { weights: { line: 0 }, tolerance: { absolute: 1 } }",
      "expected a number other than 0, found 0",
    ],
    ["total: { weights: { line: 1 }, tolerance: { absolute: 0 } }", "expected a number above 0, found 0"],
    ["total: { weights: {}, tolerance: { absolute: 1 } }", "at least one problem with a weight"],
    ["total: { weights: { line: 1 } }", "tolerance"],
  ])("refuses %s", (total, message) => {
    const { status, stderr } = tolerand("plan", suite("bad", `${total}\n`));
    expect(status).toBe(2);
    expect(stderr).toContain(message);
  });
});

// The laws of a run: threads, interruptions and the place of a size among sizes change no bit of an estimate.
import { describe, expect, it } from "vitest";
import type { StudyRecord } from "../../src/record/types.js";
import { threads } from "../../src/study/executor.js";
import type { TaskResult } from "../../src/study/tasks.js";
import { problem, runSpec, specOf } from "./fixtures.js";

const smooth = problem("smooth", "mean(x)");
const wave = problem("wave", "0.5 + sin(2 * pi * x[1]) * x[2] * exp(x[3])");
const SETTINGS = {
  sources: ["pcg64", "mt19937", "randu", "sobol+owen", "halton+permuted", "sobol"],
  sizes: [2, 50, 64, 100, 1000, 4096],
  replicates: 8,
  seed: 7,
};

/** What must never change: estimates and variances within, by problem, source and n. */
function estimates(record: StudyRecord) {
  return record.cells.map(({ problem, source, n, estimates, withinVariances }) => [
    problem,
    source,
    n,
    estimates,
    withinVariances,
  ]);
}

describe("a run", () => {
  const spec = specOf([smooth, wave], SETTINGS);

  it("gives the same estimates and digest on one thread, on three, and in this process", async () => {
    const here = await runSpec(spec);
    const one = await runSpec(spec, { executor: (problems) => threads(problems, 1) });
    const three = await runSpec(spec, { executor: (problems) => threads(problems, 3) });
    expect(estimates(one)).toEqual(estimates(here));
    expect(estimates(three)).toEqual(estimates(here));
    expect(new Set([here.digest, one.digest, three.digest]).size).toBe(1);
  });

  it("interrupted anywhere and taken up again, gives what an uninterrupted one gives", async () => {
    const whole = await runSpec(spec);
    for (const stop of [1, 5, 11]) {
      const journal = new Map<string, TaskResult>();
      const controller = new AbortController();
      const part = await runSpec(spec, {
        journal,
        signal: controller.signal,
        onResult: (count) => {
          if (count === stop) controller.abort();
        },
      });
      expect(part.environment.complete).toBe(false);
      expect(part.cells.length).toBeLessThan(whole.cells.length);
      const rest = await runSpec(spec, { journal });
      expect(rest.digest).toBe(whole.digest);
      expect(estimates(rest)).toEqual(estimates(whole));
    }
  });

  it("gives an estimate the same bits whether its n is an intermediate or the final size", async () => {
    const whole = await runSpec(spec);
    for (const n of [2, 50, 100, 1000]) {
      const alone = await runSpec(specOf([smooth, wave], { ...SETTINGS, sizes: [n] }));
      for (const cell of alone.cells) {
        const same = whole.cells.find(
          (c) => c.problem === cell.problem && c.source === cell.source && c.n === cell.n,
        );
        expect(cell.estimates).toEqual(same?.estimates);
        expect(cell.withinVariances).toEqual(same?.withinVariances);
      }
    }
  });

  it("gives an unrandomised quasi-random source one replicate and no error bar", async () => {
    const record = await runSpec(spec);
    const row = record.cells.filter((cell) => cell.source === "sobol");
    expect(row.every((cell) => cell.replicates === 1 && cell.biasStandardError === null)).toBe(true);
    expect(record.budgets.filter((b) => b.source === "sobol").every((b) => b.verdict === "none")).toBe(true);
  });

  it("counts non-finite values and keeps the first offending point with what the integrand was given", async () => {
    const pole = problem("pole", "1 / floor(1.0625 - x[1]) * 0.5");
    const record = await runSpec(
      specOf([pole], { sources: ["pcg64"], sizes: [64, 256], replicates: 4, seed: 1 }),
    );
    const cell = record.cells.find((c) => c.n === 256);
    expect(cell?.nonFinite?.count).toBeGreaterThan(0);
    const first = cell?.nonFinite?.first;
    expect(first?.inputs).toHaveLength(3);
    expect(first?.inputs[0]).toBeGreaterThan(0.0625);
    expect(first?.value).toBe("Infinity");
    expect(cell?.bias).toBeNull();
    expect(record.warnings.join("\n")).toContain("pole");
  });

  it("forms a consensus where there is no reference, and says so", async () => {
    const unknown = problem("unknown", "mean(x)", { reference: null });
    const record = await runSpec(
      specOf([unknown], { sources: ["pcg64", "sobol+owen"], sizes: [256, 1024], replicates: 16, seed: 3 }),
    );
    const [consensus] = record.consensus;
    expect(consensus?.agreed).toBe(true);
    expect(consensus?.members).toHaveLength(3);
    expect(Math.abs((consensus?.value ?? 0) - 0.5)).toBeLessThan(5 * (consensus?.standardError ?? 0));
    expect(record.cells[0]?.reference).toBe(consensus?.value);
  });
});

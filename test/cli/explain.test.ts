/** `tolerand explain` as its users meet it. */
import { spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Explanation } from "../../src/record/explanation.js";
import type { Sensitivity } from "../../src/record/sensitivity.js";
import { parseRecord } from "../../src/record/schema.js";

const program = fileURLToPath(new URL("../../dist/cli/main.js", import.meta.url));
let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-explain-"));
  writeFileSync(
    join(folder, "crest.yaml"),
    `title: Crest between the planes
inputs: { x: { distribution: uniform, length: 3 } }
integrand: (1 + 0.6 * cos(2 * pi * (4 * x[1] - 3 * x[2]))) * (1 + 0.5 * sin(2 * pi * x[3]))
reference: { value: 1, basis: whole periods }
tolerance: { absolute: 0.02 }
`,
  );
  writeFileSync(
    join(folder, "steep.yaml"),
    `inputs: { z: { distribution: normal, length: 2 } }
integrand: exp(z[1] - z[2])
reference: { value: exp(1), basis: lognormal mean }
tolerance: { absolute: 0.02 }
`,
  );
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

function tolerand(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [program, "explain", ...args], {
    cwd: folder,
    encoding: "utf8",
  });
  expect(stderr).not.toMatch(/\n {4}at /);
  return { status, stdout: stdout.replaceAll("\u00a0", " "), stderr };
}

/** Invented for this test: 3 a = 4 mod m, so pairs lie on 4 u1 - 3 u2 = whole number + phase. */
const MODULUS = 1_000_003n;
const MULTIPLIER = ((): bigint => {
  for (let a = 1n; ; a++) if ((3n * a - 4n) % MODULUS === 0n) return a;
})();
const HOUSE = `{ name: house, congruential: { modulus: ${MODULUS}, multiplier: ${MULTIPLIER}, increment: 0 } }`;

describe("explain --source", () => {
  it("explains a generator invented on the spot", () => {
    const { status, stdout } = tolerand("crest.yaml", "--source", HOUSE, "--out", "why");
    expect(status).toBe(0);
    expect(stdout).toContain("house on Crest between the planes");
    expect(stdout).toMatch(
      /\n {2}(9\d|10\d) % of the bias comes from 4 u₁ − 3 u₂ \(the same at 2 places along the coordinates\): 6 planes, gap 0.20\.\n/,
    );
    expect(stdout).toContain(": explained");
    expect(stdout).toContain("lattice of its tuples: modulus 1,000,003, all states from 1 to m − 1");
    const record = parseRecord(JSON.parse(readFileSync(join(folder, "why", "record.json"), "utf8")));
    const [explanation] = record.explanations;
    // f^(4, -3, 0) and its opposite have 0.3 each
    expect(explanation?.predicted?.value).toBeCloseTo(0.6, 2);
    expect(explanation?.measured?.value).toBeCloseTo(0.6, 2);
    const page = readFileSync(join(folder, "why", "index.html"), "utf8").replaceAll("\u00a0", " ");
    expect(page).toContain("4 u₁ − 3 u₂: 6 planes, gap 0.20");
    expect(existsSync(join(folder, "why", "charts", "comb-crest-house.vl.json"))).toBe(true);
  });

  it("takes several sources, and says of each why there is nothing to predict", () => {
    const { status, stdout } = tolerand(
      "crest.yaml",
      "--sources",
      "mt19937,mrg32k3a,lattice+shift",
      "--json",
    );
    expect(status).toBe(0);
    const found = JSON.parse(stdout) as Explanation[];
    expect(found.map(({ source, predicted }) => [source, predicted])).toEqual([
      ["mt19937", null],
      ["mrg32k3a", null],
      ["lattice+shift", null],
    ]);
    expect(found.map(({ reason }) => reason)).toEqual([
      "it has no lattice structure: its outputs are no linear recurrence modulo a whole number",
      "its lattice is too fine to matter: no dual vector is shorter than 65,536",
      "its bias is 0 by theorem: the randomisation shift makes every point uniform",
    ]);
  });

  it("leaves an integrand without bound to the full cycle", () => {
    const { status, stdout } = tolerand("steep.yaml", "--source", "randu", "--points", "1024");
    expect(status).toBe(0);
    expect(stdout).toContain(
      "No prediction: the integrand grows without bound towards an edge of coordinate 1",
    );
    expect(stdout).toContain("--full-cycle");
  });

  it("refuses more than one problem, and sources that cannot serve it", () => {
    const many = tolerand("planes", "--source", "randu");
    expect(many.status).toBe(2);
    expect(many.stderr).toContain('problem: expected one problem, found 6 in "planes"; name one of them');
    const small = tolerand("crest.yaml", "--source", "{ name: flat, lattice: { vector: [1, 3] } }");
    expect(small.status).toBe(2);
    expect(small.stderr).toContain(
      "--source: crest: flat is left out, it has 2 coordinates of 3. Name a source that has them.",
    );
  });
});

describe("explain --source of a net", () => {
  it("sets its pairs beside what the integrand does in pairs", () => {
    const { status, stdout } = tolerand("crest.yaml", "--source", "sobol", "--points", "8192");
    expect(status).toBe(0);
    expect(stdout).toMatch(
      /\nsobol: pairs that do something only together, and t of each at 2\^13 points \(0 even, 13 says nothing\)\n {4}Pair +Only together +Interval +t\n {4}x\[1\], x\[2\] +5\d %.*0\n/,
    );
  });
});

describe("explain without a source", () => {
  it("says which inputs matter", () => {
    const { status, stdout } = tolerand("crest.yaml");
    expect(status).toBe(0);
    expect(stdout).toContain("Crest between the planes: which inputs matter");
    expect(stdout).toMatch(/\n {4}Coordinate +Alone +Interval +Has part in +Interval\n/);
    expect(stdout).toMatch(/\n {4}x\[1\], x\[2\] /);
    expect(stdout).toContain("superposition dimension");
  });

  it("gives the same as JSON", () => {
    const { status, stdout } = tolerand("crest.yaml", "--json", "--points", "4096", "--seed", "3");
    expect(status).toBe(0);
    const { measures, reason } = JSON.parse(stdout) as Sensitivity;
    expect(reason).toBeNull();
    // parts of (1 + 0.6 c) (1 + 0.5 s): x[1] and x[2] act only together, 0.18 (1 + 0.125), x[3] alone 0.125
    const all = 0.18 + 0.125 + 0.18 * 0.125;
    expect(measures?.units[2]?.alone.value).toBeCloseTo(0.125 / all, 1);
    expect(measures?.pairs[0]).toMatchObject({ i: 0, j: 1 });
    expect(measures?.pairs[0]?.interaction.value).toBeCloseTo(0.18 / all, 1);
    expect(tolerand("crest.yaml", "--json", "--points", "4096", "--seed", "3").stdout).toBe(stdout);
  });

  it("writes a page, but not over a study", () => {
    const { status, stderr } = tolerand("crest.yaml", "--out", "inputs");
    expect(status).toBe(0);
    expect(stderr).toContain("Next: open ");
    const page = readFileSync(join(folder, "inputs", "index.html"), "utf8").replaceAll("\u00a0", " ");
    expect(page).toContain("Which inputs matter: Crest between the planes");
    expect(page).toContain('id="inputs-crest"');
    expect(page).toContain("How the inputs act, and what that leaves to gain");
    expect(existsSync(join(folder, "inputs", "charts", "inputs-crest.vl.json"))).toBe(true);
    const found = JSON.parse(readFileSync(join(folder, "inputs", "inputs.json"), "utf8")) as Sensitivity;
    expect(found.problem).toBe("crest");
    writeFileSync(join(folder, "inputs", "record.json"), "{}");
    expect(tolerand("crest.yaml", "--out", "inputs").status).toBe(2);
  });

  it("refuses what needs a source, and too few points", () => {
    const cycle = tolerand("crest.yaml", "--full-cycle");
    expect(cycle.status).toBe(2);
    expect(cycle.stderr).toContain(
      '--full-cycle: expected a source beside it, found none; name one with --source, or leave --full-cycle out to see which inputs of "crest" matter',
    );
    const few = tolerand("crest.yaml", "--points", "10");
    expect(few.status).toBe(2);
    expect(few.stderr).toContain("--points");
  });
});

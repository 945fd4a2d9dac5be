/** Probes from end to end: the file that is written, and what a study of it finds. */
import { spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Cell, StudyRecord } from "../../src/record/types.js";

const program = fileURLToPath(new URL("../../dist/cli/main.js", import.meta.url));
let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-probe-"));
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

function study(file: string, ...args: string[]): StudyRecord {
  const { status } = tolerand("study", file, "--out", `out-${file}`, ...args);
  expect(status).toBe(0);
  return JSON.parse(readFileSync(join(folder, `out-${file}`, "record.json"), "utf8")) as StudyRecord;
}

const cellsOf = ({ cells }: StudyRecord, source: string): Cell[] =>
  cells.filter((cell) => cell.source === source);

const verdicts = ({ budgets }: StudyRecord): Record<string, string> =>
  Object.fromEntries(budgets.map(({ source, verdict }) => [source, verdict]));

describe("the probe of RANDU", () => {
  it("says 2 at every n for RANDU, and 1 for sound sources", () => {
    const { status, stdout, stderr } = tolerand("probe", "randu");
    expect([status, stdout]).toEqual([0, "probe-randu-3.yaml\n"]);
    expect(stderr).toBe(
      "Tuples of randu lie on planes of 9 x[1] - 6 x[2] + x[3], 0.0921 apart; predicted error +100 % of the integral.\n" +
        "Next: tolerand study probe-randu-3.yaml\n",
    );
    const record = study("probe-randu-3.yaml", "--sizes", "2^4..2^12");
    const cells = cellsOf(record, "randu");
    expect(cells).toHaveLength(9);
    for (const { estimates } of cells) for (const value of estimates) expect(value).toBeCloseTo(2, 12);
    for (const source of ["philox4x32", "sobol+owen"]) {
      const last = cellsOf(record, source).at(-1);
      expect(Math.abs(last?.bias ?? NaN)).toBeLessThan(0.02);
    }
    expect(verdicts(record)).toEqual({ randu: "outside", philox4x32: "within", "sobol+owen": "within" });
  });

  it("is never written over another file", () => {
    const { status, stderr } = tolerand("probe", "randu");
    expect(status).toBe(2);
    expect(stderr).toMatch(
      /probe-randu-3\.yaml.*exists already and is not overwritten; choose another name/s,
    );
  });

  it("has a peak that RANDU misses by the error that is predicted", () => {
    const { stdout } = tolerand("probe", "randu", "--peaked", "--json");
    const said = JSON.parse(stdout) as { predictedRelativeError: number; vector: string[] };
    expect(said).toMatchObject({
      file: "probe-randu-3-peaked.yaml",
      lattice: { kind: "seed-averaged", modulus: String(2 ** 30), points: null },
      vector: ["9", "-6", "1"],
      squaredLength: "118",
      integrand: "peak",
    });
    const record = study("probe-randu-3-peaked.yaml", "--sizes", "2^18", "--sources", "randu,sobol+owen");
    const integral = record.problems[0]?.reference?.value ?? NaN;
    const [randu] = cellsOf(record, "randu");
    const [sound] = cellsOf(record, "sobol+owen");
    const error = (randu?.bias ?? NaN) / integral;
    const standardError = (randu?.biasStandardError ?? NaN) / integral;
    // fixed seed; four standard errors of a study of 32 replicates
    expect(Math.abs(error - said.predictedRelativeError)).toBeLessThan(4 * standardError);
    expect(error).toBeLessThan(-0.2);
    expect(Math.abs((sound?.bias ?? NaN) / integral)).toBeLessThan(0.03);
  });
});

describe("the probe of a source that nobody has seen before", () => {
  const own =
    "{ name: house, congruential: { modulus: '2^27', multiplier: 3141605, increment: 77 }, bits: top 24 }";

  it("finds it from an inline mapping, and what is written holds the source", () => {
    const { status } = tolerand("probe", own, "--dimension", "4", "--out", "wave");
    expect(status).toBe(0);
    const record = study("wave.yaml", "--sizes", "2^6..2^11", "--replicates", "16");
    const cells = cellsOf(record, "house");
    expect(cells).toHaveLength(6);
    for (const { estimates } of cells) for (const value of estimates) expect(value).toBeCloseTo(2, 3);
    expect(verdicts(record)).toEqual({ house: "outside", philox4x32: "within", "sobol+owen": "within" });
  });

  it("finds it from a file, strided, with ridges between its planes", () => {
    writeFileSync(
      join(folder, "own.yaml"),
      "name: strided\ncongruential: { modulus: 2^31 - 1, multiplier: 742938285 }\ntuples: strided 7\n",
    );
    const { stdout } = tolerand(
      "probe",
      "@own.yaml",
      "--dimension",
      "2",
      "--peaked",
      "--out",
      "ridge",
      "--json",
    );
    const said = JSON.parse(stdout) as { predictedRelativeError: number; integrand: string };
    expect(said.integrand).toBe("ridges");
    const record = study("ridge.yaml", "--sizes", "2^6..2^12", "--replicates", "16");
    const integral = record.problems[0]?.reference?.value ?? NaN;
    for (const { estimates } of cellsOf(record, "strided")) {
      for (const value of estimates) expect(value / integral - 1).toBeCloseTo(said.predictedRelativeError, 6);
    }
    expect(verdicts(record)).toMatchObject({ strided: "outside", philox4x32: "within" });
  });

  it("finds a rank-1 lattice at its number of points, where it says so", () => {
    const mine = "{ name: mine, lattice: { vector: [1, 182667, 469891] } }";
    const { status } = tolerand("probe", mine, "--points", "1024", "--out", "rank");
    expect(status).toBe(0);
    const text = readFileSync(join(folder, "rank.yaml"), "utf8");
    expect(text).toContain("(1,024 points, one lattice)");
    const record = study("rank.yaml", "--replicates", "8");
    const cells = cellsOf(record, "mine");
    expect(cells.at(-1)?.n).toBe(1024);
    for (const { estimates } of cells) for (const value of estimates) expect(value).toBeCloseTo(2, 9);
    expect(verdicts(record)["philox4x32"]).toBe("within");
  });
});

describe("asking for a probe that cannot be", () => {
  it("writes no file, and says why", () => {
    const cases: readonly (readonly [readonly string[], RegExp])[] = [
      [["mt19937"], /^source "mt19937": no probe resonates with it: it has no lattice structure/],
      [["lattice+shift"], /^source "lattice\+shift": no probe resonates with it: /],
      [["mrg32k3a", "--dimension", "5"], /^source "mrg32k3a": its 32 output bits are too few/],
      [
        ["randu", "--dimension", "1"],
        /^dimension: expected a whole number from 2 to 48 for a probe, found 1\n/,
      ],
      [["randu", "--dimension", "two"], /^--dimension: expected a whole number of at least 1, found "two"/],
      [["rando"], /^source: unknown source "rando"; did you mean "randu"\?/],
      [["{ name: x, congruential: { modulus: 8 "], /^--source: expected a mapping/],
    ];
    for (const [args, expected] of cases) {
      const { status, stdout, stderr } = tolerand("probe", ...args, "--out", "none");
      expect([status, stdout]).toEqual([2, ""]);
      expect(stderr).toMatch(expected);
    }
    expect(existsSync(join(folder, "none.yaml"))).toBe(false);
  });
});

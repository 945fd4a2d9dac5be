// The programs that docs/own-sources.md shows, run as a reader would run them: the same points and the same verdicts as
// the built-in sources of the same methods.
import { execFileSync, spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { StudyRecord } from "../../src/record/types.js";

const program = fileURLToPath(new URL("../../dist/cli/main.js", import.meta.url));
const page = readFileSync(new URL("../../docs/own-sources.md", import.meta.url), "utf8");
const block = (language: string): string =>
  new RegExp(`\`\`\`${language}\n([^]*?)\`\`\``).exec(page)?.[1] ?? "";
const has = (command: string): boolean => spawnSync(command, ["--version"]).status === 0;

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-own-"));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

function tolerand(...args: string[]): string {
  const { stdout, stderr, status } = spawnSync(process.execPath, [program, ...args], {
    cwd: folder,
    encoding: "utf8",
  });
  expect([status, stderr.includes("--allow-programs")]).toEqual([0, false]);
  return stdout;
}

/**
 * 1 + cos 2 pi (9 u1 - 6 u2 + u3): its mean is 1, and 2 at every point of RANDU, for (9, -6, 1) is the shortest dual vector of RANDU in three dimensions
 * (9 - 6 x 65539 + 65539^2 is a multiple of 2^31; D. E. Knuth, The Art of Computer Programming, vol. 2, 3.3.4).
 */
function study(...sources: string[]): ReadonlyMap<string, string> {
  writeFileSync(
    join(folder, "wave.yaml"),
    `inputs: { u: { distribution: uniform, length: 3 } }
integrand: 1 + cos(2 * pi * (9 * u[1] - 6 * u[2] + u[3]))
reference: { value: 1, basis: mean of a cosine over whole periods }
tolerance: { absolute: 0.3 }
`,
  );
  const flags = ["--sizes", "2^9..2^12", "--replicates", "16", "--allow-programs", "--json", "--replace"];
  const record = JSON.parse(
    tolerand("study", "wave.yaml", ...sources.flatMap((source) => ["--source", source]), ...flags),
  ) as StudyRecord;
  return new Map(
    record.budgets.map(({ source, verdict, largestLine }) => [source, `${verdict}, ${largestLine}`]),
  );
}

describe("C (skipped where there is no compiler called cc)", () => {
  it.skipIf(!has("cc"))("xoshiro256++ gives the points and the verdict of the built-in one", () => {
    writeFileSync(join(folder, "house.c"), block("c"));
    execFileSync("cc", ["-O2", "-o", "house", "house.c"], { cwd: folder });
    const source = (more: string) => `{ name: house, draws: { program: [./house], format: u64le }${more} }`;
    const state = tolerand(
      "points",
      "splitmix64",
      "--state",
      "12345",
      "--format",
      "integers",
      "--points",
      "4",
    );
    const asked = ["--dimension", "3", "--points", "2000"];
    const own = tolerand("points", source(", state: 12345"), ...asked, "--allow-programs");
    expect(own).toBe(
      tolerand("points", "xoshiro256++", "--state", state.trim().split("\n").join(","), ...asked),
    );
    const verdicts = study(source(""), "xoshiro256++");
    expect([...verdicts]).toEqual([
      ["house", "within, sampling"],
      ["xoshiro256++", "within, sampling"],
    ]);
  });
});

describe("Python (skipped where there is no python3)", () => {
  it.skipIf(!has("python3"))("RANDU gives the points and the verdict of the built-in one", () => {
    writeFileSync(join(folder, "house.py"), block("python"));
    const source = (more: string) =>
      `{ name: house, draws: { program: [python3, house.py], format: f64le }${more} }`;
    const asked = ["--dimension", "3", "--points", "2000"];
    expect(tolerand("points", source(", state: 12345"), ...asked, "--allow-programs")).toBe(
      tolerand("points", "randu", "--state", "12345", ...asked),
    );
    const verdicts = study(source(""), "randu", "pcg64");
    expect([...verdicts]).toEqual([
      ["house", "outside, source structure"],
      ["randu", "outside, source structure"],
      // a sound source lends its deviation: the estimates of RANDU have none
      ["pcg64", "within, sampling"],
    ]);
  });
});

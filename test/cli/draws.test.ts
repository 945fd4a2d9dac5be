// Draws from outside as a user studies them: leave for programs, paths of problem files, repeated replicates.
import { execFileSync, spawnSync } from "node:child_process";
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { StudyRecord } from "../../src/record/types.js";

const program = fileURLToPath(new URL("../../dist/cli/main.js", import.meta.url));
let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-draws-"));
  mkdirSync(join(folder, "suite"));
  writeFileSync(
    join(folder, "suite/house"),
    `#!/bin/sh\nexec "${process.execPath}" "${program}" points pcg64 --points 3000 --format u64le --seed "\${TOLERAND_SEED%??????}"\n`,
  );
  chmodSync(join(folder, "suite/house"), 0o755);
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

function problem(name: string, source: string): string {
  writeFileSync(
    join(folder, `suite/${name}.yaml`),
    `inputs: { x: { distribution: uniform, length: 3 } }
integrand: mean(x)
reference: { value: 0.5, basis: symmetry }
tolerance: { absolute: 0.1 }
study:
  sources: [${source}]
  sizes: [64, 256]
  replicates: 3
`,
  );
  return `suite/${name}.yaml`;
}

const record = (name: string): StudyRecord =>
  JSON.parse(readFileSync(join(folder, "reports", name, "record.json"), "utf8")) as StudyRecord;

describe("programs", () => {
  const house = "{ name: house, draws: { program: [./house], format: u64le } }";
  const refusal =
    'source "house" would start the program: ./house (in folder "suite"); programs are started only with --allow-programs on the command line\n';

  it("are not started without leave by study, and not at all by check", () => {
    const path = problem("refused", house);
    expect(tolerand("study", path)).toMatchObject({ status: 2, stdout: "", stderr: refusal });
    expect(existsSync(join(folder, "reports"))).toBe(false);
    expect(tolerand("check", path).status).toBe(0);
    expect(tolerand("study", path, "--dry-run").stdout).toContain("not timed");
  });

  it("are studied with leave, each replicate with a seed of its own", () => {
    const { status, stderr } = tolerand("study", problem("allowed", house), "--allow-programs");
    expect([status, stderr.includes("same draws")]).toEqual([0, false]);
    const [small, large] = record("allowed").cells;
    expect([small?.n, large?.n, new Set(large?.estimates).size]).toEqual([64, 256, 3]);
  });

  it("that take no seed are refused: their replicates repeat", () => {
    const draws = '{ program: [sh, -c, "while :; do cat house; done"], format: u32le }';
    const path = problem("constant", `{ name: constant, draws: ${draws} }`);
    const { status, stderr } = tolerand("study", path, "--allow-programs", "--sizes", "64", "--threads", "1");
    expect(status).toBe(2);
    expect(stderr).toContain(
      'source "constant": replicate 1 begins with the same draws as replicate 0 (from byte offset 0 on); let the program take its seed from TOLERAND_SEED, which differs for each replicate\n',
    );
  });

  it("that end early are refused before the study begins", () => {
    const path = problem("early", '{ name: early, draws: { program: [sh, -c, "exit 7"], format: u32le } }');
    const { status, stderr } = tolerand("study", path, "--allow-programs");
    expect([status, stderr]).toEqual([
      2,
      'source "early", replicate 0: its program ended with exit code 7 at byte offset 0, where 3072 more bytes are wanted; give more draws, or take fewer replicates or points (--replicates, --sizes)\n',
    ]);
  });

  it("give points too, with leave", () => {
    const source = "{ name: house, draws: { program: [suite/house], format: u64le } }";
    expect(tolerand("points", source, "--points", "2").stderr).toBe(
      'source "house" would start the program: suite/house; programs are started only with --allow-programs on the command line\n',
    );
    expect(tolerand("points", source, "--points", "2", "--allow-programs").stdout).toMatch(
      /^0\.\d+\n0\.\d+\n$/,
    );
  });
});

describe("files", () => {
  it("written by points are read as the same points", () => {
    const draws = execFileSync(process.execPath, [
      program,
      "points",
      "mt19937",
      "--state",
      "1",
      "--points",
      "30",
      "--format",
      "u32be",
    ]);
    writeFileSync(join(folder, "draws.bin"), draws);
    const source = "{ name: house, draws: { file: draws.bin, format: u32be } }";
    const asked = ["--dimension", "3", "--points", "10"];
    const { stdout } = tolerand("points", source, ...asked);
    expect(stdout).toBe(tolerand("points", "mt19937", "--state", "1", ...asked).stdout);
  });

  it("are found beside the problem file, and their stock is checked before the run", () => {
    writeFileSync(join(folder, "suite/small.bin"), new Uint8Array(4 * 3 * 256 * 2));
    const path = problem("small", "{ name: small, draws: { file: small.bin, format: u32le } }");
    const message =
      'replicates: source "small" has 2 of 256 points in 3 coordinates ("small.bin" holds 1536 draws), but 3 are asked for by "small"; take fewer replicates or points (--replicates, --sizes)\n';
    expect(tolerand("check", path)).toMatchObject({ status: 2, stderr: message });
  });

  it("outside the folder of a problem file are refused with the line", () => {
    symlinkSync(join(folder, "draws.bin"), join(folder, "suite/link.bin"));
    for (const path of ["../draws.bin", join(folder, "draws.bin"), "link.bin"]) {
      const file = problem("outside", `{ name: out, draws: { file: ${path}, format: u32le } }`);
      expect(tolerand("check", file)).toMatchObject({
        status: 2,
        stderr: `suite/outside.yaml:6:13: study.sources item 1: draws.file: expected a path in the folder of the problem file, found "${path}", which leaves it; move it there, or name the source on the command line with --source\n`,
      });
    }
    const run = problem("run", "{ name: run, draws: { program: [/bin/cat, x], format: u32le } }");
    expect(tolerand("check", run).stderr).toContain(
      'draws.program: expected a path in the folder of the problem file, found "/bin/cat"',
    );
    const set = problem("set", "{ name: set, draws: { file: a, format: u32le, folder: .. } }");
    expect(tolerand("check", set).stderr).toContain("draws: folder: not a key of problem files");
  });

  it("that hold integers of the source itself are written in both byte orders, reals in both widths", () => {
    const run = (format: string) =>
      execFileSync(process.execPath, [
        program,
        "points",
        "mt19937",
        "--state",
        "5489",
        "--points",
        "2",
        "--format",
        format,
      ]);
    // M. Matsumoto, T. Nishimura, mt19937ar: the first outputs from seed 5489 are 3499211612 and 581869302
    const outputs = [3499211612, 581869302];
    const bytes = Buffer.alloc(8);
    outputs.forEach((output, k) => bytes.writeUInt32BE(output, 4 * k));
    expect(run("u32be")).toEqual(bytes);
    expect(run("u64be").readBigUInt64BE(8)).toBe(581869302n);
    const reals = outputs.map((output) => (output + 0.5) / 2 ** 32);
    expect(run("text").toString()).toBe(`${reals.join("\n")}\n`);
    expect([run("f32le").readFloatLE(0), run("f32le").readFloatLE(4)]).toEqual(reals.map(Math.fround));
  });
});

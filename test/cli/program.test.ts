// The program as a user runs it: commands, streams, exit codes, interruption. Values from outside are named where they stand.
import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { StudyRecord } from "../../src/record/types.js";

const program = fileURLToPath(new URL("../../dist/cli/main.js", import.meta.url));
let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-cli-"));
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

function record(name: string): StudyRecord {
  return JSON.parse(readFileSync(join(folder, name, "record.json"), "utf8")) as StudyRecord;
}

const FOUR_KEYS = `inputs: { x: { distribution: uniform, length: 4 } }
integrand: mean(x .^ 2)
reference: { value: 1/3, basis: elementary }
tolerance: { absolute: 0.02 }
`;
const QUICK = ["--sources", "philox4x32,sobol+owen", "--sizes", "2^6..2^9", "--replicates", "8"];

describe("points", () => {
  it("prints published integers", () => {
    // S. K. Park and K. W. Miller, Communications of the ACM 31 (1988) 1192-1201: x_10000 = 1043618065 from x_0 = 1.
    const { stdout } = tolerand(
      "points",
      "minstd-16807",
      "--state",
      "1",
      "--format",
      "integers",
      "--points",
      "10000",
    );
    const lines = stdout.trimEnd().split("\n");
    expect(lines).toHaveLength(10_000);
    expect(lines.at(-1)).toBe("1043618065");
    // M. Matsumoto, T. Nishimura's generator seeded with 5489: the 10,000th output, as the C++ standard requires (rand.predef).
    const mt = tolerand(
      "points",
      "mt19937",
      "--state",
      "5489",
      "--format",
      "integers",
      "--first",
      "9999",
      "--points",
      "1",
    );
    expect(mt.stdout).toBe("4123659995\n");
  });

  it("gives the same points as text and as binary, and the same tail after --first", () => {
    const args = ["points", "sobol+owen", "--dimension", "3", "--points", "700"];
    const csv = tolerand(...args)
      .stdout.trimEnd()
      .split("\n");
    expect(csv).toHaveLength(700);
    const { stdout } = spawnSync(process.execPath, [program, ...args, "--format", "f64le"]);
    const rows = new Float64Array(new Uint8Array(stdout).buffer);
    expect(csv.join(",").split(",").map(Number)).toEqual([...rows]);
    const tail = tolerand(...args.slice(0, 4), "--points", "100", "--first", "600");
    expect(tail.stdout.trimEnd().split("\n")).toEqual(csv.slice(600));
  });

  it("says what a source cannot do, and what to do instead", () => {
    expect(tolerand("points", "sobol", "--format", "integers")).toMatchObject({
      status: 2,
      stdout: "",
      stderr:
        '--format: sobol has no integers of its own, found "integers"; take csv, f64le, f32le or text\n',
    });
    expect(tolerand("points", "xoshiro256++", "--format", "u32le").stderr).toMatch(
      /^--format: the integers of xoshiro256\+\+ do not fit 32 bits \(\d+ came\); take u64le, u64be or integers\n$/,
    );
    expect(tolerand("points", "mt19938").stderr).toContain('did you mean "mt19937"?');
    expect(tolerand("points", "mt19937", "--points", "0").stderr).toBe(
      '--points: expected a whole number of at least 1, found "0"\n',
    );
  });
});

describe("study", () => {
  it("runs a problem file of four keys and writes a whole report", () => {
    writeFileSync(join(folder, "four.yaml"), FOUR_KEYS);
    const { status, stdout, stderr } = tolerand("study", "four.yaml", ...QUICK);
    expect(status).toBe(0);
    expect(stdout).toContain("sobol+owen");
    expect(stderr).toMatch(/Next: open .*reports\/four\/index\.html\n$/);
    for (const file of ["index.html", "record.json", "summary.md"])
      expect(existsSync(join(folder, "reports/four", file))).toBe(true);
    expect(existsSync(join(folder, "reports/four/journal.jsonl"))).toBe(false);
  });

  it("prints the record alone with --json", () => {
    const { stdout } = tolerand("study", "four.yaml", ...QUICK, "--json");
    const printed = JSON.parse(stdout) as StudyRecord;
    expect(printed.schema).toBe("tolerand/record/1");
    expect(printed.digest).toBe(record("reports/four").digest);
  });

  it("keeps another study's folder unless told to replace it", () => {
    const refused = tolerand("study", "four.yaml", ...QUICK, "--seed", "2");
    expect(refused.status).toBe(2);
    expect(refused.stderr).toContain("holds the record of another study and is not overwritten");
    expect(tolerand("study", "four.yaml", ...QUICK, "--seed", "2", "--replace").status).toBe(0);
    expect(record("reports/four").spec.seed).toBe(2);
  });

  it("plans without running", () => {
    const { status, stdout } = tolerand("study", "four.yaml", ...QUICK, "--dry-run", "--out", "dry");
    expect(status).toBe(0);
    expect(stdout).toMatch(/tasks, about .* on \d+ threads?/);
    expect(existsSync(join(folder, "dry"))).toBe(false);
  });

  it("ends with 1 where what is in use is outside, and says by how much", () => {
    writeFileSync(
      join(folder, "used.yaml"),
      `${FOUR_KEYS.replace("0.02", "1e-4")}inUse: { source: mt19937, points: 500 }\n`,
    );
    const { status, stdout } = tolerand("study", "used.yaml", ...QUICK);
    expect(status).toBe(1);
    expect(stdout).toMatch(/In use: mt19937, 500 points: outside/);
  });

  it("takes sources of the user's own from the command line and from a file", () => {
    writeFileSync(
      join(folder, "house.yaml"),
      "name: house\ncongruential: { modulus: 2^31, multiplier: 65539, increment: 0 }\n",
    );
    const inline = '{ name: mine, congruential: { modulus: "2^31 - 1", multiplier: 16807, increment: 0 } }';
    const sizes = ["--sizes", "64,128", "--replicates", "4", "--out", "own"];
    const { status } = tolerand(
      "study",
      "four.yaml",
      "--source",
      "@house.yaml",
      "--source",
      inline,
      ...sizes,
    );
    expect(status).toBe(0);
    expect(record("own").sources.map((source) => [source.id, source.family])).toEqual([
      ["house", "own"],
      ["mine", "own"],
    ]);
  });

  it("interrupted, leaves a record and ends with 3; taken up again, gives the bytes of an uninterrupted run", async () => {
    const args = [
      "study",
      "four.yaml",
      "--sources",
      "philox4x32,sobol+owen",
      "--sizes",
      "2^10..2^20",
      "--replicates",
      "16",
    ];
    expect(tolerand(...args, "--out", "whole").status).toBe(0);
    const child = spawn(process.execPath, [program, ...args, "--out", "cut"], {
      cwd: folder,
      stdio: "ignore",
    });
    await waitFor(() => lines(join(folder, "cut/journal.jsonl")) > 2);
    child.kill("SIGINT");
    const code = await new Promise((resolve) => child.once("exit", resolve));
    expect(code).toBe(3);
    expect(record("cut").environment.complete).toBe(false);
    expect(tolerand(...args, "--out", "cut").stderr).toContain("go on with --resume");
    expect(tolerand(...args, "--out", "cut", "--resume", "--threads", "1").status).toBe(0);
    expect(record("cut").digest).toBe(record("whole").digest);
    expect(record("cut").cells.map((cell) => cell.estimates)).toEqual(
      record("whole").cells.map((cell) => cell.estimates),
    );
  });

  it("killed outright, loses only what was in flight", async () => {
    const args = [
      "study",
      "four.yaml",
      "--sources",
      "philox4x32,sobol+owen",
      "--sizes",
      "2^10..2^20",
      "--replicates",
      "16",
    ];
    const child = spawn(process.execPath, [program, ...args, "--out", "killed"], {
      cwd: folder,
      stdio: "ignore",
    });
    await waitFor(() => lines(join(folder, "killed/journal.jsonl")) > 2);
    child.kill("SIGKILL");
    await new Promise((resolve) => child.once("exit", resolve));
    expect(tolerand(...args, "--out", "killed", "--resume").status).toBe(0);
    expect(record("killed").digest).toBe(record("whole").digest);
  });
});

function lines(path: string): number {
  return existsSync(path) ? readFileSync(path, "utf8").split("\n").length - 1 : 0;
}

async function waitFor(condition: () => boolean): Promise<void> {
  for (let tries = 0; tries < 2000 && !condition(); tries++)
    await new Promise((resolve) => setTimeout(resolve, 5));
  expect(condition()).toBe(true);
}

describe("the other commands", () => {
  it("writes a problem that checks and runs as it is, and never overwrites", () => {
    expect(tolerand("new", "season")).toMatchObject({ status: 0, stdout: "season.yaml\n" });
    expect(tolerand("new", "season").status).toBe(2);
    expect(tolerand("study", "season", ...QUICK).status).toBe(2);
    expect(tolerand("study", "season.yaml", ...QUICK).status).toBe(0);
  });

  it("checks: shapes, resolved settings, and the value at a point", () => {
    const { stdout } = tolerand("check", "four.yaml", "--at", "0.5", "--resolved", "--seed", "9");
    expect(stdout).toContain("value       0.25 at (0.5, 0.5, 0.5, 0.5)");
    expect(stdout).toContain("seed        9 (flag)");
    expect(stdout).toContain("replicates  32 (default)");
    expect(tolerand("check", "four.yaml", "--at", "0.5,2").stderr).toBe(
      '--at: expected numbers between 0 and 1 with commas between, found "2"\n',
    );
    expect(tolerand("check", "four.yaml", "--at", "0.5,0.2").stderr).toContain("found 2");
  });

  it("names file, line and column of what is wrong in a problem file", () => {
    writeFileSync(
      join(folder, "wrong.yaml"),
      FOUR_KEYS.replace("mean(x .^ 2)", "mean(y .^ 2)").replace("tolerance", "tolerence"),
    );
    const { status, stdout, stderr } = tolerand("check", "wrong.yaml");
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain("wrong.yaml:4:1:");
    expect(stderr).toContain("tolerance");
  });

  it("redraws a report from its record alone, and refuses what is no record", () => {
    expect(tolerand("report", "reports/season", "--out", "again").status).toBe(0);
    expect(readFileSync(join(folder, "again/index.html"), "utf8")).toBe(
      readFileSync(join(folder, "reports/season/index.html"), "utf8"),
    );
    writeFileSync(join(folder, "no.json"), '{"schema": 1}');
    const { status, stderr } = tolerand("report", "no.json");
    expect(status).toBe(2);
    expect(stderr).toContain("tolerand/record/1");
    expect(tolerand("report", "nowhere").stderr).toBe(
      'record: "nowhere" does not exist; give a record.json or a report folder\n',
    );
  });

  it("lists as tables and as data", () => {
    for (const command of ["sources", "problems", "functions", "distributions", "estimators"]) {
      expect(tolerand(command).status).toBe(0);
      expect(Array.isArray(JSON.parse(tolerand(command, "--json").stdout))).toBe(true);
    }
    for (const args of [["schema"], ["schema", "--record"]]) {
      expect(JSON.parse(tolerand(...args).stdout)).toHaveProperty("$schema");
    }
  });

  it("copies a shipped suite out, which then runs from there", () => {
    expect(tolerand("problems", "--copy", "planes").status).toBe(0);
    expect(tolerand("check", "./planes").status).toBe(0);
    expect(tolerand("problems", "--copy", "planes").status).toBe(2);
  });
});

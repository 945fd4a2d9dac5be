/** Full cycles and resolution on the command line: agreement, refusal, interruption and taking up again. */
import { spawn, spawnSync } from "node:child_process";
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { averageOverCycle } from "../../src/cli/full-cycle.js";
import type { Explanation } from "../../src/record/explanation.js";
import { parseSource } from "../../src/sources/choice.js";
import { problem } from "../study/fixtures.js";
import { fakeIo } from "./io.js";

const program = fileURLToPath(new URL("../../dist/cli/main.js", import.meta.url));
let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-cycle-"));
  writeFileSync(
    join(folder, "ripples.yaml"),
    `inputs: { x: { distribution: uniform, length: 2 } }
integrand: (1 + 0.5 * cos(2 * pi * 11 * x[1])) * (1 + 0.5 * cos(2 * pi * x[2]))
reference: { value: 1, basis: whole periods }
tolerance: { absolute: 0.02 }
`,
  );
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

const HOUSE = "{ name: house, congruential: { modulus: 1048573, multiplier: 11 } }";

describe("explain --full-cycle", () => {
  it("agrees with the prediction, the measurement and the series", () => {
    const { status, stdout } = tolerand(
      "explain",
      "ripples.yaml",
      "--source",
      HOUSE,
      "--full-cycle",
      "--json",
    );
    expect(status).toBe(0);
    const [explanation] = JSON.parse(stdout) as Explanation[];
    const cycle = explanation?.fullCycle ?? null;
    // the pairs lie on 11 x1 - x2 = whole number: 2 x 0.25^2, and the origin that is never taken (f(0) = 2.25) left out
    const m = 1_048_573;
    expect(cycle?.states).toBe(m - 1);
    expect(cycle?.bias).toBeCloseTo((m * 1.125 - 2.25) / (m - 1) - 1, 12);
    for (const other of [explanation?.predicted, explanation?.measured]) {
      expect(other?.interval[0]).toBeLessThan(cycle?.bias ?? NaN);
      expect(other?.interval[1]).toBeGreaterThan(cycle?.bias ?? NaN);
    }
    expect(explanation?.resolution?.own).toBe(20);
    expect(explanation?.resolution?.costs.map(({ bits }) => bits)).toEqual([8, 12, 16, 20, 24, 32]);
    expect(readdirSync(join(folder, "reports", "full-cycle"))).toEqual([]);
  });

  it("prints the average and the table of bits", () => {
    const { stdout } = tolerand(
      "explain",
      "ripples.yaml",
      "--source",
      HOUSE,
      "--full-cycle",
      "--threads",
      "1",
    );
    expect(stdout).toMatch(/bias over all 1,048,572 states 0\.12499893 \(exact average\)/);
    expect(stdout).toMatch(
      /what bits cost: the bias of the middles of cells of width 2\^−bits, 99 % intervals \(◂ its own\)/,
    );
    expect(stdout).toMatch(/\n {4}20 ◂/);
  });

  it("is refused before any work where the states are too many", () => {
    const { status, stderr } = tolerand("explain", "ripples.yaml", "--source", "drand48", "--full-cycle");
    expect([status, stderr]).toEqual([
      2,
      'source "drand48": it has 281,474,976,710,656 starting states, and a full cycle goes through at most 4,294,967,296; a study measures its bias over replicates instead\n',
    ]);
  });
});

describe("what bits cost", () => {
  it("is the bias of a sound source that is cut to few of them", () => {
    const cut = "{ name: cut, source: mt19937, bits: top 6, endpoint: left }";
    writeFileSync(
      join(folder, "square.yaml"),
      `inputs: { x: { distribution: uniform, length: 2 } }
integrand: sum(x .^ 2)
reference: { value: 2/3, basis: elementary }
tolerance: { absolute: 0.02 }
`,
    );
    const square = tolerand("explain", "square.yaml", "--source", cut, "--json");
    const [found] = JSON.parse(square.stdout) as Explanation[];
    // each coordinate: -h/2 + h^2/6, h = 1/64
    const exact = 2 * (-1 / 128 + 1 / (6 * 64 * 64));
    const [low, high] = found?.resolution?.costs.find(({ bits }) => bits === 6)?.interval ?? [NaN, NaN];
    expect(low).toBeLessThan(exact);
    expect(high).toBeGreaterThan(exact);
    expect(found?.measured?.interval[0]).toBeLessThan(exact);
    expect(found?.measured?.interval[1]).toBeGreaterThan(exact);
  });
});

describe("an interrupted full cycle", () => {
  it("keeps what is done, says so, and goes on from there to the same bits", async () => {
    const wide = problem("wide", "mean(x .^ 2)", { dimension: 20_000 });
    const small = parseSource({ name: "small", congruential: { modulus: 8191, multiplier: 17 } });
    const stop = new AbortController();
    const io = fakeIo(folder, stop.signal);
    stop.abort();
    expect(await averageOverCycle(wide, small, 1, io)).toBeNull();
    const [file = ""] = readdirSync(join(folder, "reports", "full-cycle"));
    expect(io.err()).toContain(
      `Interrupted. The states that are done stand in ${join("reports", "full-cycle", file)}.\n` +
        "Next: tolerand test   (the same command goes on from there)\n",
    );

    const again = fakeIo(folder);
    const average = await averageOverCycle(wide, small, 2, again);
    const elsewhere = fakeIo(mkdtempSync(join(folder, "fresh-")));
    expect(await averageOverCycle(wide, small, 1, elsewhere)).toEqual(average);
    expect(readdirSync(join(folder, "reports", "full-cycle"))).toEqual([]);
  });

  it("is left by Ctrl-C with exit code 3, its journal whole", async () => {
    const args = [
      "explain",
      "ripples.yaml",
      "--source",
      "minstd-16807",
      "--full-cycle",
      "--points",
      "64",
      "--threads",
      "1",
    ];
    const child = spawn(process.execPath, [program, ...args], { cwd: folder });
    const journal = join(folder, "reports", "full-cycle");
    const code = await new Promise<number | null>((done) => {
      const watch = setInterval(() => {
        const [file] = safeList(journal);
        if (file === undefined || readFileSync(join(journal, file), "utf8").split("\n").length < 4) return;
        clearInterval(watch);
        child.kill("SIGINT");
      }, 20);
      child.on("exit", done);
    });
    expect(code).toBe(3);
    const [file = ""] = safeList(journal);
    const lines = readFileSync(join(journal, file), "utf8").trimEnd().split("\n");
    for (const line of lines) expect(() => JSON.parse(line) as unknown).not.toThrow();
    expect(lines.length).toBeGreaterThan(2);
    rmSync(journal, { recursive: true });
  });
});

function safeList(path: string): string[] {
  try {
    return readdirSync(path);
  } catch {
    return [];
  }
}

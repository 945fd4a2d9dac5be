import { setImmediate } from "node:timers/promises";
import { describe, expect, it } from "vitest";
import { digestOf } from "../../src/record/json.js";
import type { StudySpec } from "../../src/record/types.js";
import { inProcess } from "../../src/study/executor.js";
import type { TaskResult } from "../../src/study/tasks.js";
import { runSpec, specOf } from "./fixtures.js";
import { makeProblem } from "../findings/make.js";

const PROBLEM = makeProblem("p", {
  integrand: "sum(u)",
  tolerance: { absolute: 0.01, relative: null, to: "reference", confidence: 0.99 },
});
const SIZES = [64, 128, 256, 512, 1024, 2048];
const SPEC: StudySpec = {
  ...specOf([PROBLEM], {
    sources: ["philox4x32", "sobol+owen", "lattice+shift"],
    sizes: SIZES,
    replicates: 16,
  }),
  until: "tolerance",
};

describe("a study that stops at the tolerance", () => {
  it("stops each source at its first size inside, and says so differently at the limit of points", async () => {
    const record = await runSpec(SPEC);
    const stop = (source: string) => record.stops?.find((one) => one.source === source);
    expect(stop("sobol+owen")).toMatchObject({ inside: true, looks: 6 });
    expect(stop("sobol+owen")?.n).toBeLessThan(2048);
    expect(stop("philox4x32")).toMatchObject({ inside: false, look: 6, n: 2048 });
    for (const { source, n, inside } of record.stops ?? []) {
      const own = record.cells.filter((cell) => cell.source === source).map((cell) => cell.n);
      expect(own).toEqual(SIZES.filter((size) => size <= n));
      const budget = record.budgets.find((one) => one.source === source);
      expect(budget?.verdict === "within").toBe(inside);
      // Bonferroni: 1 - 0.01 / 6 at each look.
      expect(budget?.confidence).toBeCloseTo(1 - 0.01 / 6, 12);
    }
    const said = record.warnings.join("\n");
    expect(said).toMatch(
      /p, sobol\+owen: stopped inside the tolerance at \d+ points, look \d of 6; each look is held to 99\.8333 %/,
    );
    expect(said).toContain(
      "p, philox4x32: not shown to be inside the tolerance when the limit of 2,048 points came (6 looks)",
    );
    expect(said).not.toContain("repeat");
  });

  it("has the estimates of a study of all sizes, to the bit, and a digest of its own", async () => {
    const { until: _until, ...whole } = SPEC;
    const [stopped, full] = [await runSpec(SPEC), await runSpec(whole)];
    for (const cell of stopped.cells) {
      const other = full.cells.find((one) => one.source === cell.source && one.n === cell.n);
      expect(cell.digest).toBe(other?.digest);
    }
    expect(digestOf(SPEC)).not.toBe(digestOf(whole));
    expect(full.stops).toBeUndefined();
  });

  it("gives the same record after an interruption, and in any order of results", async () => {
    const straight = await runSpec(SPEC);
    const journal = new Map<string, TaskResult>();
    const abort = new AbortController();
    const partial = await runSpec(SPEC, {
      journal,
      signal: abort.signal,
      onResult: (count) => {
        if (count === 4) abort.abort();
      },
    });
    expect(partial.cells.length).toBeLessThan(straight.cells.length);
    const resumed = await runSpec(SPEC, { journal });
    expect([resumed.digest, resumed.stops]).toEqual([straight.digest, straight.stops]);
    const backwards = await runSpec(SPEC, {
      executor: (problems) => {
        const inner = inProcess(problems);
        return {
          run: async (tasks, done, signal) => {
            const results: TaskResult[] = [];
            await inner.run([...tasks].reverse(), (result) => results.push(result), signal);
            for (const result of results) done(result);
            await setImmediate();
          },
          close: () => inner.close(),
        };
      },
    });
    expect([backwards.digest, backwards.stops]).toEqual([straight.digest, straight.stops]);
  });
});

/** The full cycle of RANDU against Fourier series: what is exact on both sides must agree. */
import { describe, expect, it } from "vitest";
import { loadPaths } from "../../src/problem/load.js";
import type { FullCycleAverage } from "../../src/record/types.js";
import { parseSource } from "../../src/sources/choice.js";
import { cycleExecutor, fullCycle } from "../../src/study/full-cycle.js";
import { prepareProblems } from "../../src/study/runnable.js";

async function cycle(path: string, source: string): Promise<FullCycleAverage | null> {
  const { problems } = await loadPaths([path], parseSource);
  const [loaded] = problems;
  if (loaded === undefined) throw new Error("no problem");
  const { problem } = loaded;
  const [runnable] = await prepareProblems([problem]);
  if (runnable === undefined) throw new Error("no problem");
  const executor = cycleExecutor({ problem: runnable, source }, 2);
  try {
    return await fullCycle({
      problem,
      source,
      executor,
      journal: { done: new Map(), add: () => undefined },
      signal: new AbortController().signal,
      advance: () => undefined,
    });
  } finally {
    await executor.close();
  }
}

const MINUTES = 5 * 60_000;

describe("the average over all odd states of RANDU", () => {
  it(
    "of a product of ripples holds the coefficient of (9, -6, 1) and its opposite, 2 x 0.45^3",
    async () => {
      // no other vector of the dual lattice has entries 0 or 9, 0 or 6, 0 or 1 up to signs, so the bias is exact
      const average = await cycle("planes/product-comb", "randu");
      expect(average?.states).toBe(2 ** 30);
      expect(average?.bias).toBeCloseTo(2 * 0.45 ** 3, 12);
    },
    MINUTES,
  );

  it(
    "of a Gaussian peak half-way between its planes is the sum of Poisson's formula",
    async () => {
      // multiples k (9, -6, 1) add 2 (-1)^k exp(-2 pi^2 s^2 118 k^2); the next shortest of a reduced basis are
      // (3194, 3331, -8747) and (4720, 7777, 4165), whose coefficients vanish
      const term = (k: number): number =>
        2 * (-1) ** k * Math.exp(-2 * Math.PI ** 2 * 0.03 ** 2 * 118 * k * k);
      const average = await cycle("planes/midway-peak", "randu");
      expect(average?.bias).toBeCloseTo(term(1) + term(2) + term(3), 10);
    },
    MINUTES,
  );
});

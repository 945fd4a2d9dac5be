/** Probes: the wave is the same at every tuple, and the error of a peak is the one that the full cycle has. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Problem, SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import { cycleExecutor, fullCycle } from "../../src/study/full-cycle.js";
import { leastCosine } from "../../src/study/probe-sight.js";
import { prepareProblems } from "../../src/study/runnable.js";
import { peakOf } from "../../src/structure/peak.js";
import { probeOf, type Probe } from "../../src/structure/probe.js";
import { problem } from "../study/fixtures.js";

const congruential = (modulus: number, multiplier: number, increment: number): SourceSpec => ({
  name: "invented",
  congruential: { modulus, multiplier, increment },
});

async function cycleMean(one: Problem, source: SourceSpec): Promise<number> {
  const [runnable] = await prepareProblems([one]);
  if (runnable === undefined) throw new Error("no problem");
  const average = await fullCycle({
    problem: one,
    source,
    executor: cycleExecutor({ problem: runnable, source }, 0),
    journal: { done: new Map(), add: () => undefined },
    signal: new AbortController().signal,
    advance: () => undefined,
  });
  return average?.mean ?? NaN;
}

describe("the wave of a probe", () => {
  it("is RANDU's 9 u1 - 6 u2 + u3, a whole number at every tuple of odd states", () => {
    // x(i+2) = 6 x(i+1) - 9 x(i) mod 2^31: G. Marsaglia, Proceedings of the National Academy of Sciences 61 (1968) 25-28
    const probe = probeOf(parseSource("randu"), 3, 1);
    expect(probe).toMatchObject({ vector: [9, -6, 1], phase: 0, squaredLength: 118 });
  });

  it("is that of the published shortest vector of 16807 in two dimensions", () => {
    // nu_2^2 = 16807^2 + 1 = 282475250: Knuth, The Art of Computer Programming, vol. 2, 3.3.4, table 1
    const probe = probeOf(parseSource("minstd-16807"), 2, 1);
    expect(probe).toMatchObject({ vector: [16807, -1], phase: 0, squaredLength: 282475250 });
  });

  const seen: readonly (readonly [SourceSpec, number])[] = [
    ["randu", 3],
    ["minstd-48271", 4],
    ["lcg-69069", 5],
    ["lrand48", 8],
    ["lcg-6364136223846793005", 6],
    ["mrg32k3a", 32],
    ["wichmann-hill", 12],
    [{ name: "a", congruential: { modulus: 3000, multiplier: 7 } }, 3],
    [{ name: "b", congruential: { modulus: "2^24", multiplier: 69069 }, tuples: "strided 5" }, 3],
    [{ name: "c", congruential: { modulus: "2^40", multiplier: 69069, increment: 1 }, bits: "low 12" }, 3],
    [{ name: "d", congruential: { modulus: "2^32", multiplier: 69069, increment: 1 }, bits: "top 20" }, 5],
    [{ name: "e", congruential: { modulus: 1009, multiplier: 11, increment: 5 }, endpoint: "left" }, 2],
    [{ name: "f", recursive: { modulus: 1009, multipliers: [7, 0, 5] } }, 5],
  ];
  for (const [spec, dimension] of seen) {
    const choice = parseSource(spec);
    it(`is the same at every point of ${choice.id} in ${dimension} dimensions, from any start`, () => {
      const probe = probeOf(choice, dimension, 1);
      for (const replicate of [0, 1, 2])
        expect(leastCosine(choice, probe, 2000, replicate)).toBeGreaterThan(0.999);
    });
  }

  it("is the same at every tuple of any congruential generator (property)", () => {
    const map = fc
      .integer({ min: 64, max: 1 << 20 })
      .chain((m) =>
        fc.tuple(fc.constant(m), fc.integer({ min: 2, max: m - 1 }), fc.integer({ min: 0, max: m - 1 })),
      );
    fc.assert(
      fc.property(map, fc.integer({ min: 2, max: 6 }), ([m, a, c], dimension) => {
        const choice = parseSource(congruential(m, a, c));
        let probe: Probe;
        try {
          probe = probeOf(choice, dimension, 1);
        } catch (error) {
          // a multiplier that shares a factor with the modulus: states run together, and no lattice is claimed
          expect(String(error)).toMatch(/shares a factor/);
          return;
        }
        expect(leastCosine(choice, probe, 300, 0)).toBeGreaterThan(1 - 1e-6);
      }),
      { seed: 11, numRuns: 150 },
    );
  });

  it("stands on the points of a rank-1 lattice", () => {
    for (const id of ["lattice", "korobov", "lattice-sequence"]) {
      const choice = parseSource(id);
      const probe = probeOf(choice, 4, 1024);
      expect(probe.points).toBe(choice.source.nearestSize(1024));
      expect(leastCosine(choice, probe, probe.points ?? 0, 0)).toBeGreaterThan(1 - 1e-9);
    }
  });
});

describe("a peak between the planes", () => {
  const cases: readonly (readonly [SourceSpec, number])[] = [
    [congruential(2 ** 10, 21, 1), 2],
    [congruential(2 ** 11, 37, 0), 3],
    [congruential(1021, 10, 0), 2],
    [congruential(65_521, 7, 0), 3],
    [congruential(2 ** 10, 77, 3), 4],
  ];
  for (const [source, dimension] of cases) {
    it(`has the error of the full cycle: ${JSON.stringify(source)} in ${dimension} dimensions`, async () => {
      const choice = parseSource(source);
      const peak = peakOf(probeOf(choice, dimension, 1));
      if (peak.kind !== "peak") throw new Error("no peak");
      const constants = { centre: peak.centre, width: peak.width };
      const one = problem("peak", "exp(-sum(((x - centre) / width) .^ 2) / 2)", { dimension, constants });
      // at least four widths inside the cube, which holds all but 2 x 3.2e-5 of the peak in each coordinate
      const integral = (peak.width * Math.sqrt(2 * Math.PI)) ** dimension;
      const error = (await cycleMean(one, source)) / integral - 1;
      expect(Math.abs(error - peak.relativeError)).toBeLessThan(3e-4);
      expect(Math.abs(peak.relativeError)).toBeGreaterThan(0.1);
    });
  }

  it("is a ridge between every two of them where they are close", () => {
    const ridges = peakOf(probeOf(parseSource("minstd-16807"), 2, 1));
    expect(ridges.kind).toBe("ridges");
    // 2 exp(-1 / (8 s^2)) / (s sqrt(2 pi)) - 1 for s = 0.2, by hand
    expect(ridges.relativeError).toBeCloseTo((2 * Math.exp(-3.125)) / (0.2 * Math.sqrt(2 * Math.PI)) - 1, 6);
  });

  it("has a prediction in every dimension", () => {
    const choice = parseSource("minstd-16807");
    for (let dimension = 2; dimension <= 12; dimension++) {
      const { relativeError } = peakOf(probeOf(choice, dimension, 1));
      expect(Math.abs(relativeError)).toBeGreaterThan(0.1);
      expect(relativeError).toBeGreaterThan(-1);
    }
  });
});

describe("a probe is refused", () => {
  const refusal = (spec: SourceSpec, dimension: number): string => {
    try {
      probeOf(parseSource(spec), dimension, 256);
    } catch (error) {
      if (error instanceof RangeError) return error.message;
    }
    return "not refused";
  };

  it("where the bits are too few, with their number and the limit", () => {
    expect(refusal("mrg32k3a", 5)).toBe(
      'source "mrg32k3a": its 32 output bits are too few to see its shortest dual vector in 5 dimensions: its entries add up to 617278781517, expected at most 42949672; in more dimensions it is shorter',
    );
    const cut = {
      name: "cut",
      congruential: { modulus: "2^32", multiplier: 69069, increment: 1 },
      bits: "top 8",
    };
    expect(refusal(cut, 3)).toMatch(/^source "cut": its 8 output bits are too few .* expected at most 2; in/);
  });

  it("where there is no lattice, or none in so many dimensions", () => {
    expect(refusal("mt19937", 3)).toMatch(/^source "mt19937": no probe resonates with it: it has no lattice/);
    expect(refusal("lattice+shift", 3)).toMatch(/^source "lattice\+shift": no probe resonates with it: /);
    expect(refusal("randu", 1)).toBe("dimension: expected a whole number from 2 to 48 for a probe, found 1");
    expect(refusal("randu", 49)).toBe(
      "dimension: expected a whole number from 2 to 48 for a probe, found 49",
    );
  });
});

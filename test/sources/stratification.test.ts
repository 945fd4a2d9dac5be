/**
 * The stratification law of digital nets: of the first 2^m points every elementary interval of volume 2^(t - m) holds
 * exactly 2^t (H. Niederreiter, SIAM 1992, definition 4.1), before and after each randomisation. The t-values are those of
 * published/data/qmc.json.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Randomisation } from "../../src/sources/contract.js";
import { niederreiter } from "../../src/sources/niederreiter.js";
import { sobol } from "../../src/sources/sobol.js";
import { reference } from "../published/qmc-data.js";
import { pointsOf } from "./points.js";

const tValues = reference.sobol["t_values_first_2^m_points"];

/** All ways to write `sum` as `parts` whole numbers from 0. */
function* shares(sum: number, parts: number): Generator<number[]> {
  if (parts === 1) {
    yield [sum];
    return;
  }
  for (let first = 0; first <= sum; first++) {
    for (const rest of shares(sum - first, parts - 1)) yield [first, ...rest];
  }
}

/** Whether all boxes of sides 2^-d_1, ..., 2^-d_s hold the same number of points. */
function balanced(points: readonly number[][], digits: readonly number[]): boolean {
  const counts = new Map<string, number>();
  for (const point of points) {
    const box = digits.map((d, j) => Math.floor((point[j] ?? NaN) * 2 ** d)).join();
    counts.set(box, (counts.get(box) ?? 0) + 1);
  }
  const boxes = 2 ** digits.reduce((sum, d) => sum + d, 0);
  return counts.size === boxes && [...counts.values()].every((count) => count === points.length / boxes);
}

const nets: [string, Randomisation[]][] = [
  ["plain", []],
  ["digital-shift", ["digital-shift"]],
  ["linear", ["linear"]],
  ["owen", ["owen"]],
];

describe.each(nets)("sobol, %s", (_, randomisations) => {
  it("every elementary interval holds its exact share, for random boxes at the net's t", () => {
    const cases = fc.record({
      dimension: fc.integer({ min: 1, max: 6 }),
      m: fc.integer({ min: 1, max: 9 }),
      block: fc.nat(7),
      key: fc.string(),
      choose: fc.nat(),
    });
    fc.assert(
      fc.property(cases, ({ dimension, m, block, key, choose }) => {
        const t = tValues[`dims1..${dimension}`]?.[m];
        if (t === undefined) throw new Error("no t-value");
        // A later block of 2^m points is a digitally shifted copy of the first, with the same t.
        const points = pointsOf(sobol, {
          dimension,
          first: block * 2 ** m,
          count: 2 ** m,
          randomisations,
          key,
        });
        const boxes = [...shares(m - t, dimension)];
        const digits = boxes[choose % boxes.length] ?? [];
        expect(balanced(points, digits)).toBe(true);
      }),
      { numRuns: 80, seed: 21 },
    );
  });

  it("t cannot be smaller: some finer box holds too much or too little", () => {
    for (const [dimension, m] of [
      [3, 8],
      [4, 9],
      [6, 9],
    ] as const) {
      const t = tValues[`dims1..${dimension}`]?.[m] ?? NaN;
      const points = pointsOf(sobol, { dimension, count: 2 ** m, randomisations, key: "finer" });
      const unbalanced = [...shares(m - t + 1, dimension)].filter((digits) => !balanced(points, digits));
      expect(unbalanced.length).toBeGreaterThan(0);
    }
  });
});

describe.each(nets)("niederreiter, %s", (_, randomisations) => {
  // Niederreiter (1988): t is the sum of the degrees less one of the polynomials x, x + 1, x^2 + x + 1, x^3 + x + 1, ...
  const degrees = [1, 1, 2, 3, 3, 4];

  it("every elementary interval holds its exact share at the t of the theorem", () => {
    const cases = fc.record({
      dimension: fc.integer({ min: 1, max: 6 }),
      key: fc.string(),
      choose: fc.nat(),
    });
    fc.assert(
      fc.property(cases, ({ dimension, key, choose }) => {
        const m = 11;
        const t = degrees.slice(0, dimension).reduce((sum, degree) => sum + degree - 1, 0);
        const points = pointsOf(niederreiter, { dimension, count: 2 ** m, randomisations, key });
        const boxes = [...shares(m - t, dimension)];
        expect(balanced(points, boxes[choose % boxes.length] ?? [])).toBe(true);
      }),
      { numRuns: 40, seed: 22 },
    );
  });
});

import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { Key } from "../../src/sources/key.js";
import { latinHypercube, stratified } from "../../src/sources/stratified.js";
import { pointsOf } from "./points.js";

describe("latin-hypercube", () => {
  it("margins: every coordinate has one point in each of n equal intervals", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 700 }),
        fc.integer({ min: 1, max: 9 }),
        fc.string(),
        (n, dimension, key) => {
          const points = pointsOf(latinHypercube, { dimension, count: n, key });
          for (let j = 0; j < dimension; j++) {
            const cells = new Set(points.map((point) => Math.floor((point[j] ?? NaN) * n)));
            expect(cells.size).toBe(n);
          }
        },
      ),
      { numRuns: 60, seed: 51 },
    );
  });

  it("refuses permutations beyond its memory", () => {
    const request = { dimension: 300, n: 2 ** 20, randomisations: [], key: new Key("k") };
    expect(() => latinHypercube.open(request, instantiateKernels())).toThrow(
      'n: source "latin-hypercube" holds n permuted numbers for every coordinate, at most 2^28 in all; found 1048576 for each of 300',
    );
  });

  it("has no points beyond those it was opened for", () => {
    expect(() => pointsOf(latinHypercube, { dimension: 1, n: 8, first: 4, count: 5, key: "k" })).toThrow(
      'source "latin-hypercube" was opened for 8 points and has no point 8',
    );
  });

  // For a sum of functions of one coordinate the variance is n^-3 rather than n^-1 (M. Stein, Technometrics 29, 1987,
  // 143-151): at n = 256 the ratio to plain sampling, 1/n = 2^-8 of the variance 1/12 a coordinate, is 2^-16.
  it("integrates a sum of coordinates with far less variance than plain sampling", () => {
    const n = 256;
    let sum = 0;
    for (let r = 0; r < 50; r++) {
      const points = pointsOf(latinHypercube, { dimension: 4, count: n, key: `r${r}` });
      const total = points.flat().reduce((t, u) => t + u - 0.5, 0);
      sum += (total / n) ** 2 / 50;
    }
    const ratio = sum / (4 / 12 / n);
    // 50 replicates: within a factor 2 of 1/n^2 but for fewer than 1 seed in 1,000
    expect(ratio * n ** 2).toBeGreaterThan(0.5);
    expect(ratio * n ** 2).toBeLessThan(2);
  });
});

describe("stratified", () => {
  it("every box holds one point", () => {
    fc.assert(
      fc.property(fc.nat(10), fc.integer({ min: 1, max: 12 }), fc.string(), (bits, dimension, key) => {
        const n = 2 ** bits;
        const points = pointsOf(stratified, { dimension, count: n, key });
        const boxes = points.map((point) =>
          point.map((u, j) => {
            const own = Math.floor(bits / dimension) + (j < bits % dimension ? 1 : 0);
            return Math.floor(u * 2 ** own);
          }),
        );
        expect(new Set(boxes.map((box) => box.join())).size).toBe(n);
      }),
      { numRuns: 60, seed: 52 },
    );
  });
});

import { describe, expect, it } from "vitest";
import { interlaced2, interlaced3 } from "../../src/sources/interlaced.js";
import { sobol } from "../../src/sources/sobol.js";
import { digitsOf, pointsOf } from "./points.js";

describe.each([
  [2, interlaced2],
  [3, interlaced3],
] as const)("order %i", (order, source) => {
  it("every coordinate takes its digits in turn from coordinates of Sobol's sequence", () => {
    const dimension = 4;
    const parts = pointsOf(sobol, { dimension: order * dimension, first: 1000, count: 40 });
    const points = pointsOf(source, { dimension, first: 1000, count: 40 });
    for (const [i, point] of points.entries()) {
      for (const [j, u] of point.entries()) {
        const digit = (value: bigint, row: number): bigint => (value >> BigInt(51 - row)) & 1n;
        const rows = Array.from({ length: 52 }, (_, row) =>
          digit(digitsOf(parts[i]?.[order * j + (row % order)] ?? NaN), Math.floor(row / order)),
        );
        expect(Array.from({ length: 52 }, (_, row) => digit(digitsOf(u), row))).toEqual(rows);
      }
    }
  });

  // Dick (2008): n^-order up to logarithms for smooth integrands. Mean over 16 digital shifts of the squared error; between
  // 2^5 and 2^11 points the order must be near 2 and 3; plain Sobol' points under a digital shift reach less than 1.5.
  it("the error of a smooth integrand falls with the order of the sequence", () => {
    const rmse = (n: number): number => {
      let sum = 0;
      for (let r = 0; r < 16; r++) {
        const points = pointsOf(source, {
          dimension: 2,
          count: n,
          randomisations: ["digital-shift"],
          key: `r${r}`,
        });
        const mean = points.reduce((total, [x = NaN, y = NaN]) => total + Math.exp(x + y), 0) / n;
        sum += (mean - (Math.E - 1) ** 2) ** 2;
      }
      return Math.sqrt(sum / 16);
    };
    const slope = Math.log2(rmse(2 ** 5) / rmse(2 ** 11)) / 6;
    expect(slope).toBeGreaterThan(order - 0.4);
  });
});

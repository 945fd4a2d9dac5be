import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { firstPrimes } from "../../src/numeric/primes.js";
import { kronecker } from "../../src/sources/kronecker.js";
import { lattice, ownLattice } from "../../src/sources/lattice.js";
import { digitsOf, pointsOf } from "./points.js";

/** floor(sqrt(p) 2^180) by bisection, independent of the source's own root. */
function longRoot(p: number): bigint {
  const square = BigInt(p) << 360n;
  let low = 0n;
  let high = BigInt(p) << 180n;
  while (high - low > 1n) {
    const middle = (low + high) >> 1n;
    if (middle * middle <= square) low = middle;
    else high = middle;
  }
  return low;
}

describe("kronecker", () => {
  it("equals frac(i sqrt(p)) in 180-bit arithmetic, at any index", () => {
    const primes = [...firstPrimes(30)];
    fc.assert(
      fc.property(fc.oneof(fc.nat(1000), fc.integer({ min: 0, max: 2 ** 52 - 20 })), (first) => {
        const points = pointsOf(kronecker, { dimension: 30, first, count: 20 });
        for (const [i, point] of points.entries()) {
          for (const [j, p] of primes.entries()) {
            const exact = (BigInt(first + i) * longRoot(p)) & ((1n << 180n) - 1n);
            // up to 2^-60 above: one unit of 2^-52 more where the fraction is that near to the next
            const cells = [exact >> 128n, ((exact >> 120n) + 1n) >> 8n];
            expect(cells).toContain(digitsOf(point[j] ?? NaN));
          }
        }
      }),
      { numRuns: 30, seed: 41 },
    );
  });
});

describe("shift and tent", () => {
  const dimension = 9;
  const count = 128;
  const shifted = pointsOf(lattice, { dimension, count, n: 128, randomisations: ["shift"], key: "s" });

  it("shift adds one number per coordinate modulo 1", () => {
    const plain = pointsOf(lattice, { dimension, count, n: 128 });
    const modulus = 2n ** 52n;
    for (let j = 0; j < dimension; j++) {
      const shifts = shifted.map((point, i) => {
        const difference = digitsOf(point[j] ?? NaN) - digitsOf(plain[i]?.[j] ?? NaN);
        return ((difference % modulus) + modulus) % modulus;
      });
      expect(new Set(shifts).size).toBe(1);
    }
    expect(new Set(shifted[0]).size).toBe(dimension);
  });

  it("tent folds every coordinate of the shifted lattice to 1 - |2u - 1|", () => {
    const folded = pointsOf(lattice, {
      dimension,
      count,
      n: 128,
      randomisations: ["shift", "tent"],
      key: "s",
    });
    expect(folded).toEqual(shifted.map((point) => point.map((u) => 1 - Math.abs(2 * u - 1))));
  });
});

describe("lattice", () => {
  it("maps sizes to the nearest power of two up to 2^20", () => {
    expect([1, 3, 100, 1500, 3e6, 2 ** 40].map((n) => lattice.nearestSize(n))).toEqual([
      1,
      4,
      128,
      1024,
      2 ** 20,
      2 ** 20,
    ]);
  });

  it("is a projection-regular lattice: every coordinate takes each k/n once", () => {
    const points = pointsOf(lattice, { dimension: 20, count: 256 });
    for (let j = 0; j < 20; j++) {
      const cells = points.map((point) => Math.floor((point[j] ?? NaN) * 256)).sort((a, b) => a - b);
      expect(cells).toEqual(Array.from({ length: 256 }, (_, k) => k));
    }
  });

  it("a vector of one's own may have any n and any components from 0", () => {
    const own = ownLattice("house", [0n, 1n, 5n, 2n ** 64n - 1n]);
    expect(own.nearestSize(1000)).toBe(1000);
    const points = pointsOf(own, { dimension: 4, count: 12 });
    expect(points.map((point) => Math.round((point[2] ?? NaN) * 12))).toEqual([
      0, 5, 10, 3, 8, 1, 6, 11, 4, 9, 2, 7,
    ]);
    expect(new Set(points.map((point) => point[0])).size).toBe(1);
    expect(() => ownLattice("house", [1n, -2n])).toThrow(
      "source.lattice.vector[2]: expected a whole number from 0, found -2",
    );
  });
});

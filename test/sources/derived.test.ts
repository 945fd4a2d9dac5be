/** Sources derived from others: leaped and finite forms of Halton's sequence, the golden ratio's Kronecker sequence. */
import { describe, expect, it } from "vitest";
import { halton, haltonLeaped } from "../../src/sources/halton.js";
import { hammersley } from "../../src/sources/hammersley.js";
import { kroneckerGolden } from "../../src/sources/kronecker.js";
import { inverseSquareWeights, latticeP2 } from "../../src/numeric/lattice-construction.js";
import { korobov } from "../../src/sources/korobov.js";
import { digitsOf, pointsOf } from "./points.js";

describe("halton-leaped", () => {
  it.each([[[]], [["permuted"]]] as const)("is every 409th point of halton: %j", (randomisations) => {
    const options = { dimension: 79, randomisations, key: "leap" };
    const leaped = pointsOf(haltonLeaped, { ...options, first: 7, count: 20, block: 9 });
    for (const [i, point] of leaped.entries()) {
      expect(pointsOf(halton, { ...options, first: 409 * (7 + i), count: 1 })).toEqual([point]);
    }
  });
});

describe("hammersley", () => {
  it.each([1, 5, 360])("is i/n and the points of halton, n = %i", (n) => {
    const points = pointsOf(hammersley, { dimension: 4, count: n });
    expect(points.map(([, ...rest]) => rest)).toEqual(pointsOf(halton, { dimension: 3, count: n }));
    for (const [i, [u = NaN]] of points.entries()) expect(Math.abs(u - i / n)).toBeLessThan(2 ** -51);
  });

  it("permuted keeps the steps 1/n of the first coordinate, modulo 1", () => {
    const points = pointsOf(hammersley, { dimension: 2, count: 64, randomisations: ["permuted"], key: "h" });
    const steps = points.slice(1).map(([u = NaN], i) => {
      const difference = digitsOf(u) - digitsOf(points[i]?.[0] ?? NaN);
      return (difference + 2n ** 52n) % 2n ** 52n;
    });
    expect(new Set(steps)).toEqual(new Set([2n ** 46n]));
  });
});

describe("kronecker-golden", () => {
  // The golden ratio, and the plastic constant 1.324717957244746025960908854... (R. Padovan 1994; OEIS A060006, from memory).
  it.each([
    [1, 0, 1 / 1.618033988749895],
    [2, 0, 1 / 1.324717957244746],
    [2, 1, 1 / 1.324717957244746 ** 2],
  ])("d = %i, coordinate %i: the first step is a power of 1/phi_d", (dimension, j, expected) => {
    const points = pointsOf(kroneckerGolden, { dimension, count: 2 });
    expect(points[1]?.[j]).toBeCloseTo(expected, 14);
  });

  it("solves x^(d+1) = x + 1 for every d", () => {
    for (const dimension of [3, 10, 100, 1000]) {
      const phi = 1 / (pointsOf(kroneckerGolden, { dimension, count: 2 })[1]?.[0] ?? NaN);
      expect(Math.abs(phi ** (dimension + 1) / (phi + 1) - 1)).toBeLessThan(1e-12);
    }
  });
});

describe("korobov", () => {
  it.each([8, 64, 2048])("has the vector (1, a, a^2, ...) mod n, n = %i", (n) => {
    const second = pointsOf(korobov, { dimension: 12, count: n })[1] ?? [];
    const vector = second.map((u) => Math.floor(u * n));
    const multiplier = vector[1] ?? NaN;
    for (let j = 0; j < 12; j++) {
      const power = BigInt(multiplier) ** BigInt(j) % BigInt(n);
      expect(vector[j]).toBe(Number(power));
    }
  });

  it("has the least P_2 of all multipliers where all are tried", () => {
    const weights = inverseSquareWeights(5);
    const valueOf = (a: number): number =>
      latticeP2(128, [1, a, a ** 2 % 128, a ** 3 % 128, a ** 4 % 128], weights);
    const second = pointsOf(korobov, { dimension: 5, count: 128 })[1] ?? [];
    const least = Math.min(...Array.from({ length: 64 }, (_, i) => valueOf(2 * i + 1)));
    expect(valueOf(Math.floor((second[1] ?? NaN) * 128)) / least - 1).toBeLessThan(1e-9);
  });
});

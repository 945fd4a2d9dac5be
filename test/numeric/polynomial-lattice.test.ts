import { describe, expect, it } from "vitest";
import { inverseSquareWeights } from "../../src/numeric/lattice-construction.js";
import {
  constructPolynomialLattice,
  seriesDigits,
  walshKernel,
} from "../../src/numeric/polynomial-lattice.js";
import { polynomialLattice } from "../../src/sources/polynomial-lattice.js";
import { digitsOf, pointsOf } from "../sources/points.js";

/** The product of two polynomials over GF(2) modulo p, bit by bit. */
function times(a: number, b: number, modulus: number, m: number): number {
  let product = 0n;
  for (let k = 0; k < m; k++) if ((b >> k) & 1) product ^= BigInt(a) << BigInt(k);
  for (let k = 2 * m; k >= m; k--) {
    if ((product >> BigInt(k)) & 1n) product ^= BigInt(modulus) << BigInt(k - m);
  }
  return Number(product);
}

function criterion(m: number, modulus: number, vector: readonly number[], weights: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < 2 ** m; k++) {
    let product = 1;
    for (const [j, q] of vector.entries()) {
      product *= 1 + (weights[j] ?? NaN) * walshKernel(seriesDigits(times(k, q, modulus, m), modulus, m), m);
    }
    sum += product;
  }
  return sum / 2 ** m - 1;
}

describe("constructPolynomialLattice", () => {
  it("the moduli are the least primitive polynomials (Lidl & Niederreiter, Finite Fields, table D, from memory)", () => {
    const moduli = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10].map(
      (m) => constructPolynomialLattice(m, inverseSquareWeights(1)).modulus,
    );
    expect(moduli).toEqual([0b11, 0b111, 0b1011, 0b10011, 0b100101, 0b1000011, 0b10000011, 285, 529, 1033]);
  });

  it.each([2, 3, 5, 7])("every component has the least criterion of all tried one by one, m = %i", (m) => {
    const weights = inverseSquareWeights(4);
    const { modulus, vector } = constructPolynomialLattice(m, weights);
    for (let j = 0; j < vector.length; j++) {
      const before = [...vector].slice(0, j);
      const values = Array.from({ length: 2 ** m - 1 }, (_, i) =>
        criterion(m, modulus, [...before, i + 1], weights),
      );
      const least = Math.min(...values);
      expect((values[(vector[j] ?? NaN) - 1] ?? NaN) - least).toBeLessThan(1e-12);
    }
  });

  it("the kernel has mean 0", () => {
    const m = 12;
    let sum = 0;
    for (let x = 0; x < 2 ** m; x++) sum += walshKernel(x, m);
    // the cell of 0 stands for its own share of the logarithmic steps
    expect(Math.abs(sum / 2 ** m)).toBeLessThan(4 / 2 ** m);
  });
});

describe("polynomial-lattice", () => {
  it("point k is the first m digits of k q / p, polynomials over GF(2)", () => {
    const m = 7;
    const { modulus, vector } = constructPolynomialLattice(m, inverseSquareWeights(9));
    const points = pointsOf(polynomialLattice, { dimension: 9, count: 2 ** m });
    for (const [k, point] of points.entries()) {
      const expected = [...vector].map((q) => seriesDigits(times(k, q, modulus, m), modulus, m));
      expect(point.map((u) => Number(digitsOf(u) >> BigInt(52 - m)))).toEqual(expected);
    }
  });

  it("every coordinate takes each k/n once, before and after scrambling", () => {
    for (const randomisations of [[], ["owen"], ["linear"], ["digital-shift"]] as const) {
      const points = pointsOf(polynomialLattice, { dimension: 30, count: 256, randomisations, key: "p" });
      for (let j = 0; j < 30; j++) {
        expect(new Set(points.map((point) => Math.floor((point[j] ?? NaN) * 256))).size).toBe(256);
      }
    }
  });
});

import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  constructOrderVector,
  constructVector,
  inverseSquareWeights,
  latticeOrderP2,
  latticeP2,
} from "../../src/numeric/lattice-construction.js";
import { isPrime } from "../../src/numeric/factor.js";
import { firstPrimes } from "../../src/numeric/primes.js";

function gcd(a: number, b: number): number {
  return b === 0 ? a : gcd(b, a % b);
}

/** The least value that any component prime to n gives after `vector`. */
function leastValue(n: number, vector: number[], weights: Float64Array): number {
  let least = Infinity;
  for (let z = 1; z <= n; z++) {
    if (gcd(z, n) === 1) least = Math.min(least, latticeP2(n, [...vector, z], weights));
  }
  return least;
}

describe("constructVector", () => {
  it("every component attains the least P_2 of all candidates tried one by one", () => {
    const sizes = fc.constantFrom(2, 3, 4, 5, 7, 8, 16, 31, 32, 61, 64, 101, 128, 137, 256);
    fc.assert(
      fc.property(
        sizes,
        fc.array(fc.double({ min: 0.01, max: 1.5, noNaN: true }), { minLength: 1, maxLength: 4 }),
        (n, w) => {
          const weights = Float64Array.from(w);
          const vector = [...constructVector(n, weights)];
          expect(vector.every((z) => gcd(z, n) === 1 && z <= Math.max(1, n / 2))).toBe(true);
          for (let j = 0; j < vector.length; j++) {
            const found = latticeP2(n, vector.slice(0, j + 1), weights);
            const least = leastValue(n, vector.slice(0, j), weights);
            expect(found - least).toBeLessThan(1e-9 * Math.abs(least) + 1e-13);
          }
        },
      ),
      { numRuns: 60, seed: 4 },
    );
  });

  it("components do not depend on how many follow", () => {
    const long = constructVector(1024, inverseSquareWeights(40));
    expect(constructVector(1024, inverseSquareWeights(7))).toEqual(long.subarray(0, 7));
  });

  it("refuses sizes that are neither a power of two nor a prime", () => {
    const message = "lattice: expected a power of two or a prime below 2^26 points, found ";
    for (const n of [0, -4, 1.5, NaN, 6, 9, 1000, 2 ** 26]) {
      expect(() => constructVector(n, inverseSquareWeights(2))).toThrow(new RangeError(`${message}${n}`));
    }
  });
});

describe("primes", () => {
  it("the first 1,000 are those that the Miller-Rabin test finds", () => {
    const primes = [...firstPrimes(1000)];
    expect(primes).toEqual(Array.from({ length: 7918 }, (_, i) => i + 2).filter((n) => isPrime(BigInt(n))));
  });

  it("any count from 1 to 20 is a prefix", () => {
    for (let count = 1; count <= 20; count++) {
      expect([...firstPrimes(count)]).toEqual([...firstPrimes(20)].slice(0, count));
    }
  });
});

describe("order-dependent weights", () => {
  /** Component by component straight from the definition: every candidate prime to n, the smallest of the best. */
  const plainSearch = (n: number, dimension: number, order: Float64Array): number[] => {
    const chosen: number[] = [];
    for (let j = 0; j < dimension; j++) {
      const candidates = Array.from({ length: n - 1 }, (_, i) => i + 1).filter((z) => gcd(z, n) === 1);
      const values = candidates.map((z) => latticeOrderP2(n, [...chosen, z], order));
      const least = Math.min(...values);
      chosen.push(
        candidates[values.findIndex((value) => value <= least + 1e-10 * Math.abs(least) + 1e-14)] as number,
      );
    }
    return chosen;
  };

  it("give what a search by the definition gives, for powers of two and primes", () => {
    for (const n of [16, 64, 127, 251]) {
      const order = Float64Array.of(1, 0.3, 0.05);
      expect([...constructOrderVector(n, 5, order)]).toEqual(plainSearch(n, 5, order));
    }
  });

  it("that are 1 for every order are product weights of 1", () => {
    const ones = new Float64Array(6).fill(1);
    expect(constructOrderVector(1024, 6, ones)).toEqual(constructVector(1024, ones));
    const vector = constructVector(256, ones);
    expect(latticeOrderP2(256, vector, ones)).toBeCloseTo(latticeP2(256, vector, ones), 9);
  });
});

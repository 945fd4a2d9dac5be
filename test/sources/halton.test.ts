import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { firstPrimes } from "../../src/numeric/primes.js";
import { halton } from "../../src/sources/halton.js";
import { pointsOf } from "./points.js";

const primes = [...firstPrimes(1229)];

/** The number of digits K in base p and p^K, the largest power up to 2^52. */
function resolution(p: number): { places: number; power: bigint } {
  let places = 0;
  let power = 1n;
  for (; power * BigInt(p) <= 2n ** 52n; places++) power *= BigInt(p);
  return { places, power };
}

/** The K digits of a coordinate, first after the point first. */
function digitsIn(p: number, u: number): number[] {
  const { places, power } = resolution(p);
  let rest = BigInt(Math.round(u * Number(power) - 0.5));
  const digits: number[] = [];
  for (let k = 0; k < places; k++, rest /= BigInt(p)) digits.unshift(Number(rest % BigInt(p)));
  return digits;
}

function indexDigits(p: number, index: number): number[] {
  let rest = index;
  return Array.from({ length: resolution(p).places }, () => {
    const digit = rest % p;
    rest = Math.floor(rest / p);
    return digit;
  });
}

const place = fc.record({
  j: fc.oneof(fc.nat(40), fc.nat(1228)),
  first: fc.oneof(fc.nat(5000), fc.integer({ min: 0, max: 2 ** 38 })),
});

describe("halton", () => {
  it("equals the radical inverse in exact arithmetic, at any index", () => {
    fc.assert(
      fc.property(place, ({ j, first }) => {
        const p = primes[j] ?? NaN;
        const points = pointsOf(halton, { dimension: j + 1, first, count: 3 });
        for (const [i, point] of points.entries()) {
          expect(digitsIn(p, point[j] ?? NaN)).toEqual(indexDigits(p, first + i));
        }
      }),
      { numRuns: 40, seed: 31 },
    );
  });
});

describe("permuted", () => {
  const options = { randomisations: ["permuted"], key: "permuted" } as const;

  it("every place of every base has one permutation, whatever the other digits", () => {
    const dimension = 12;
    const points = pointsOf(halton, { ...options, dimension, count: 2_000 });
    for (let j = 0; j < dimension; j++) {
      const p = primes[j] ?? NaN;
      let different = 0;
      const maps = indexDigits(p, 0).map(() => new Map<number, number>());
      for (const [i, point] of points.entries()) {
        const image = digitsIn(p, point[j] ?? NaN);
        for (const [k, digit] of indexDigits(p, i).entries()) {
          const known = maps[k]?.get(digit);
          if (known === undefined) maps[k]?.set(digit, image[k] ?? NaN);
          else if (known !== image[k]) different++;
        }
      }
      expect(different).toBe(0);
      for (const map of maps) expect(new Set(map.values()).size).toBe(map.size);
      // all digits of the places that the index reaches in full
      expect(maps[0]?.size).toBe(p);
      expect(maps[1]?.size).toBe(p);
    }
  });

  it("a coordinate does not depend on how many there are", () => {
    const many = pointsOf(halton, { ...options, dimension: 60, count: 50 });
    expect(pointsOf(halton, { ...options, dimension: 7, count: 50 })).toEqual(
      many.map((point) => point.slice(0, 7)),
    );
  });
});

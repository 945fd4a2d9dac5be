/**
 * Halton's sequence against data/qmc.json: exact fractions of the radical inverses (SciPy and GSL agree there to 2.3e-16,
 * `checks`).
 */
import { describe, expect, it } from "vitest";
import { firstPrimes } from "../../src/numeric/primes.js";
import { halton } from "../../src/sources/halton.js";
import { pointsOf } from "../sources/points.js";
import { reference } from "./qmc-data.js";

const { primes, first16_fractions, at_n } = reference.halton;

/** The midpoint of the cell of a fraction with denominator p^m: its digits are filled up with zeros to K places. */
function midpoint(fraction: string, p: number): number {
  const [numerator = "0", denominator = "1"] = fraction.split("/");
  let power = 1n;
  while (power * BigInt(p) <= 2n ** 52n) power *= BigInt(p);
  return (Number((BigInt(numerator) * power) / BigInt(denominator)) + 0.5) / Number(power);
}

const expected = (fractions: string[]): number[] => fractions.map((f, j) => midpoint(f, primes[j] ?? NaN));

describe("Halton (1960), qmc.json", () => {
  it("first 20 primes", () => {
    expect([...firstPrimes(20)]).toEqual(primes);
  });

  it("first 16 points in 20 dimensions", () => {
    expect(pointsOf(halton, { dimension: 20, count: 16 })).toEqual(first16_fractions.map(expected));
  });

  it.each(Object.entries(at_n))("point %s in 20 dimensions", (n, fractions) => {
    expect(pointsOf(halton, { dimension: 20, first: Number(n), count: 1 })).toEqual([expected(fractions)]);
  });

  it("the bases of dimensions 100, 1000 and 1229 (primes: D. N. Lehmer 1914, from memory)", () => {
    const all = firstPrimes(1229);
    expect([all[99], all[999], all[1228]]).toEqual([541, 7919, 9973]);
  });
});

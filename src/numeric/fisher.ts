/**
 * The variance-ratio law of Fisher and Snedecor, F with a and b degrees of freedom, through the incomplete beta function
 * (Abramowitz & Stegun 26.6.2).
 */
import { incompleteBeta } from "./incomplete-beta.js";

/**
 * P(F <= f) and P(F > f), each accurate when small. `a` and `b` > 0; f >= 0, Infinity allowed.
 * @throws RangeError for degrees that are not above 0.
 */
export function fisherTails(f: number, a: number, b: number): { lower: number; upper: number } {
  if (!(a > 0) || !(b > 0)) throw new RangeError(`F law: expected degrees above 0, found ${a} and ${b}`);
  if (Number.isNaN(f)) return { lower: NaN, upper: NaN };
  if (f === Infinity) return { lower: 1, upper: 0 };
  const total = a * f + b;
  return incompleteBeta(a / 2, b / 2, (a * f) / total, b / total);
}

/** Two-sided p-value: twice the smaller tail, at most 1. */
export function fisherTwoSided(f: number, a: number, b: number): number {
  const { lower, upper } = fisherTails(f, a, b);
  return Math.min(1, 2 * Math.min(lower, upper));
}

/** Chi-square (Helmert 1876; Pearson 1900) through the incomplete gamma function (Abramowitz & Stegun 26.4.19). */
import { incompleteGamma } from "./incomplete-gamma.js";
import { normalQuantile } from "./normal.js";
import { findRoot } from "./root.js";

/** P(X > x) with `degrees` > 0 of freedom. */
export function chiSquareUpper(x: number, degrees: number): number {
  return incompleteGamma(degrees / 2, Math.max(0, x) / 2).upper;
}

/** The x with P(X <= x) = p, for p in (0, 1). */
export function chiSquareQuantile(p: number, degrees: number): number {
  if (!(p > 0) || !(p < 1)) throw new RangeError(`chi-square quantile: expected p in (0, 1), found ${p}`);
  const at = (s: number) => {
    const tails = incompleteGamma(degrees / 2, Math.exp(s) / 2);
    return p < 0.5 ? Math.log(tails.lower) - Math.log(p) : Math.log1p(-p) - Math.log(tails.upper);
  };
  // Start: the cube-root approximation of Wilson & Hilferty (1931).
  const ninth = 2 / (9 * degrees);
  const root = Math.max(0.01, 1 - ninth + normalQuantile(p) * Math.sqrt(ninth));
  return Math.exp(findRoot(at, Math.log(degrees) + 3 * Math.log(root), 0.1));
}

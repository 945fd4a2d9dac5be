/**
 * The regularised incomplete beta function I_x(a, b) by its continued fraction (DLMF 8.17.22; Abramowitz & Stegun
 * 26.5.8) with the modified Lentz algorithm (Thompson & Barnett 1986), the factor in front by Loader's saddle-point form
 * (2000), so that a and b may be some 1e8. The smaller tail is computed directly. About 1e-13 relative; steps grow
 * like sqrt(max(a, b)).
 */
import { deviancePart, stirlingError } from "./gamma.js";
import type { Tails } from "./incomplete-gamma.js";
import { findRoot } from "./root.js";

/** x^a y^b Gamma(a + b + 1) / (Gamma(a + 1) Gamma(b + 1)) for y = 1 - x and real a, b > 0. */
export function betaWeight(a: number, b: number, x: number, y: number): number {
  const n = a + b;
  const exponent =
    stirlingError(n) - stirlingError(a) - stirlingError(b) - deviancePart(a, n * x) - deviancePart(b, n * y);
  return Math.sqrt(n / (2 * Math.PI * a * b)) * Math.exp(exponent);
}

function fraction(a: number, b: number, x: number): number {
  const guard = (value: number) => (Math.abs(value) < 1e-300 ? 1e-300 : value);
  let c = 1;
  let d = 1 / guard(1 - ((a + b) * x) / (a + 1));
  let value = d;
  for (let m = 1; ; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / guard(1 + even * d);
    c = guard(1 + even / c);
    value *= c * d;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / guard(1 + odd * d);
    c = guard(1 + odd / c);
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < 4e-16) return value;
  }
}

/** I_x(a, b) as `lower`, I_y(b, a) as `upper`. `y` is 1 - x; give it where it is known more exactly than 1 - x. */
export function incompleteBeta(a: number, b: number, x: number, y = 1 - x): Tails {
  if (!(a > 0) || !(b > 0) || !(x >= 0) || !(x <= 1)) {
    throw new RangeError(`incompleteBeta: expected a, b above 0 and x in [0, 1], found ${a}, ${b}, ${x}`);
  }
  if (x === 0) return { lower: 0, upper: 1 };
  if (y === 0) return { lower: 1, upper: 0 };
  const weight = (betaWeight(a, b, x, y) * a * b) / (a + b);
  if (x < (a + 1) / (a + b + 2)) {
    const lower = Math.min(1, (weight / a) * fraction(a, b, x));
    return { lower, upper: 1 - lower };
  }
  const upper = Math.min(1, (weight / b) * fraction(b, a, y));
  return { lower: 1 - upper, upper };
}

/** The x with I_x(a, b) = p, for p in [0, 1]; both ends are exact. */
export function betaQuantile(p: number, a: number, b: number): number {
  if (!(p >= 0) || !(p <= 1)) throw new RangeError(`betaQuantile: expected p in [0, 1], found ${p}`);
  if (p === 0 || p === 1) return p;
  // On the logit scale, where neither end crowds the root.
  const at = (s: number) => {
    const x = 1 / (1 + Math.exp(-s));
    const tails = incompleteBeta(a, b, x, 1 / (1 + Math.exp(s)));
    return p < 0.5 ? Math.log(tails.lower) - Math.log(p) : Math.log1p(-p) - Math.log(tails.upper);
  };
  const centre = Math.log(a / b);
  return 1 / (1 + Math.exp(-findRoot(at, centre, 2)));
}

/**
 * The regularised incomplete gamma functions P(a, x) and Q(a, x): power series below x = a + 1 (Abramowitz & Stegun
 * 6.5.29), Legendre's continued fraction above (6.5.31) by the modified Lentz algorithm (Thompson & Barnett, J. Comput.
 * Phys. 64 (1986) 490-509). The smaller of the two is computed directly, so tails keep their relative accuracy.
 * About 1e-14 for a up to 1e4; steps grow like sqrt(a).
 */
import { deviancePart, stirlingError } from "./gamma.js";

/** Both tails; they add to 1. */
export interface Tails {
  readonly lower: number;
  readonly upper: number;
}

/** x^a e^-x / Gamma(a + 1), without overflow. */
function gammaWeight(a: number, x: number): number {
  return Math.exp(-stirlingError(a) - deviancePart(a, x)) / Math.sqrt(2 * Math.PI * a);
}

function lowerSeries(a: number, x: number): number {
  let term = 1;
  let total = 1;
  for (let k = 1; term > total * 1e-17; k++) {
    term *= x / (a + k);
    total += term;
  }
  return total;
}

function upperFraction(a: number, x: number): number {
  let b = x + 1 - a;
  let c = 1e300;
  let d = 1 / b;
  let value = d;
  for (let k = 1; ; k++) {
    const numerator = -k * (k - a);
    b += 2;
    d = 1 / (numerator * d + b);
    c = b + numerator / c;
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < 4e-16) return value;
  }
}

/** P(a, x) as `lower` and Q(a, x) as `upper`, a > 0, x >= 0. */
export function incompleteGamma(a: number, x: number): Tails {
  if (!(a > 0) || !(x >= 0)) {
    throw new RangeError(`incompleteGamma: expected a above 0 and x from 0, found a = ${a}, x = ${x}`);
  }
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Infinity) return { lower: 1, upper: 0 };
  if (x < a + 1) {
    const lower = Math.min(1, gammaWeight(a, x) * lowerSeries(a, x));
    return { lower, upper: 1 - lower };
  }
  const upper = Math.min(1, gammaWeight(a, x) * a * upperFraction(a, x));
  return { lower: 1 - upper, upper };
}

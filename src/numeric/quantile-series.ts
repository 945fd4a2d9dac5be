/**
 * Taylor series of quantiles. With t the share of the mass beyond x, dx/dt = -+mass / g(x), and the series of that
 * differential equation follows from the slope of log g, a rational function of y = e^x, by recurrences (the idea is
 * G. Steinbrecher and W. T. Shaw's, "Quantile mechanics", European Journal of Applied Mathematics 19 (2008) 87-112).
 * Double-double arithmetic throughout.
 */
import { add, divide, exponential, fromNumber, multiply, scaled, subtract } from "./double-double.js";
import type { DoubleDouble } from "./double-double.js";
import { logDensity, logisticOf } from "./log-law.js";
import type { NormalisedLaw } from "./log-law.js";

/** Powers in a series: (1/9)^32 is below 1e-30, (2/9)^32 below 1e-20. */
export const TERMS = 33;

const ZERO = fromNumber(0);

function convolution(a: readonly DoubleDouble[], b: readonly DoubleDouble[], n: number): DoubleDouble {
  let sum = ZERO;
  for (let k = 0; k <= n; k++) sum = add(sum, multiply(a[k] ?? ZERO, b[n - k] ?? ZERO));
  return sum;
}

/**
 * Coefficients of x(s) with t = centre + width s, where x(0) = `x`. `direction` is 1 where t is the mass above x and -1
 * where it is below; `width` is already in shares of the law's mass.
 */
export function quantileSeries(
  of: NormalisedLaw,
  x: DoubleDouble,
  direction: number,
  width: DoubleDouble,
): DoubleDouble[] {
  const { law, mass, reference } = of;
  const inverse = divide(mass, exponential(subtract(logDensity(law, x), reference)));
  const v: DoubleDouble[] = [scaled(multiply(width, inverse), -direction)];
  const y: DoubleDouble[] = [exponential(x)];
  const z: DoubleDouble[] = [exponential({ high: -x.high, low: -x.low })];
  const p: DoubleDouble[] = [logisticOf(x)];
  const slope: DoubleDouble[] = [];
  const square: DoubleDouble[] = [];
  const flow: DoubleDouble[] = [];
  const result: DoubleDouble[] = [x];
  for (let n = 0; n < TERMS - 1; n++) {
    let here = n === 0 ? law.a : ZERO;
    if (law.b !== 0) here = add(here, scaled(y[n] ?? ZERO, law.b));
    if (law.c !== 0) here = add(here, scaled(convolution(y, y, n), law.c));
    if (law.d !== 0) here = add(here, scaled(z[n] ?? ZERO, law.d));
    if (law.e.high !== 0) here = add(here, multiply(p[n] ?? ZERO, law.e));
    slope.push(here);
    square.push(convolution(v, v, n));
    const next = fromNumber(n + 1);
    result.push(divide(v[n] ?? ZERO, next));
    v.push(divide(scaled(convolution(slope, square, n), -1), next));
    if (law.b !== 0 || law.c !== 0) y.push(divide(convolution(y, v, n), next));
    if (law.d !== 0) z.push(divide(scaled(convolution(z, v, n), -1), next));
    if (law.e.high !== 0) {
      // p' = p (1 - p) x'
      flow.push(subtract(p[n] ?? ZERO, convolution(p, p, n)));
      p.push(divide(convolution(flow, v, n), next));
    }
  }
  return result;
}

/** Value of a series at s. */
export function seriesAt(series: readonly DoubleDouble[], s: number): DoubleDouble {
  let sum = ZERO;
  for (let k = series.length - 1; k >= 0; k--) sum = add(scaled(sum, s), series[k] ?? ZERO);
  return sum;
}

const POLYNOMIALS: number[][] = [[1], [0, 1]];

/** Coefficients of Chebyshev's polynomial T_n, exact. */
function chebyshev(n: number): readonly number[] {
  for (let k = POLYNOMIALS.length; k <= n; k++) {
    const [one = [], two = []] = [POLYNOMIALS[k - 1], POLYNOMIALS[k - 2]];
    const next = [0, ...one.map((c) => 2 * c)];
    for (const [i, c] of two.entries()) next[i] = (next[i] ?? 0) - c;
    POLYNOMIALS.push(next);
  }
  return POLYNOMIALS[n] ?? [];
}

/** The series cut to `degree` with its error spread evenly over -1 to 1 (C. Lanczos's economisation, 1938). */
export function economised(series: readonly DoubleDouble[], degree: number): number[] {
  const c = series.map(({ high }) => high);
  for (let n = c.length - 1; n > degree; n--) {
    const factor = (c[n] ?? 0) / 2 ** (n - 1);
    for (const [i, t] of chebyshev(n).entries()) c[i] = (c[i] ?? 0) - factor * t;
  }
  return c.slice(0, degree + 1);
}

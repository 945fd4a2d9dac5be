/** Sample moments of a list of numbers, two passes with compensated sums. */
import { mean, sum } from "./sums.js";

/** Variance with divisor length - 1; NaN for fewer than two values. */
export function variance(values: readonly number[]): number {
  if (values.length < 2) return NaN;
  const centre = mean(values);
  // Corrected two-pass form (Chan, Golub & LeVeque, The American Statistician 37 (1983) 242-247, eq. 1.7).
  const squares = sum(values.map((value) => (value - centre) ** 2));
  const rest = sum(values.map((value) => value - centre));
  return Math.max(0, squares - (rest * rest) / values.length) / (values.length - 1);
}

/** Standard deviation with divisor length - 1; NaN for fewer than two values. */
export function deviation(values: readonly number[]): number {
  return Math.sqrt(variance(values));
}

/** Square root of the mean square. */
export function rootMeanSquare(values: readonly number[]): number {
  return Math.sqrt(mean(values.map((value) => value * value)));
}

/**
 * Kurtosis m4 / m2^2 of the sample (3 for a normal law, not the excess), m_k the central moments with divisor length
 * (Pearson 1905). A sample of R values cannot exceed (R^2 - 3R + 3) / (R - 1), about R - 2. NaN where all values agree.
 */
export function kurtosis(values: readonly number[]): number {
  const centre = mean(values);
  const second = mean(values.map((value) => (value - centre) ** 2));
  const fourth = mean(values.map((value) => (value - centre) ** 4));
  return fourth / (second * second);
}

/** Skewness m3 / m2^(3/2) of the sample, divisors length. NaN where all values agree. */
export function skewness(values: readonly number[]): number {
  const centre = mean(values);
  const second = mean(values.map((value) => (value - centre) ** 2));
  return mean(values.map((value) => (value - centre) ** 3)) / second ** 1.5;
}

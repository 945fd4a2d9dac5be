/** Comparisons of means: one sample, two samples of unequal variance (Welch), several with known variances (Cochran). */
import { chiSquareUpper } from "./chi-square.js";
import { variance } from "./moments.js";
import { studentTwoSided } from "./student.js";
import { mean, sum } from "./sums.js";

export interface TTest {
  readonly t: number;
  readonly degrees: number;
  readonly pValue: number;
}

/** Welch's test of equal means (Welch, Biometrika 34 (1947) 28-35), degrees of freedom after Satterthwaite (1946). */
export function welch(a: readonly number[], b: readonly number[]): TTest {
  const [va, vb] = [variance(a) / a.length, variance(b) / b.length];
  const degrees = (va + vb) ** 2 / (va ** 2 / (a.length - 1) + vb ** 2 / (b.length - 1));
  const t = (mean(a) - mean(b)) / Math.sqrt(va + vb);
  return { t, degrees, pValue: studentTwoSided(t, degrees) };
}

/** Student's one-sample test of mean `expected`; `uncertainty` is a further standard error of `expected` itself. */
export function oneSample(values: readonly number[], expected: number, uncertainty = 0): TTest {
  const degrees = values.length - 1;
  const t = (mean(values) - expected) / Math.sqrt(variance(values) / values.length + uncertainty ** 2);
  return { t, degrees, pValue: studentTwoSided(t, degrees) };
}

/**
 * Two-sided p-value of t = `standardised` from `count` values of skewness `skew`, by Hall's transformation, which takes the
 * first effect of skewness out: with w = t / sqrt(count), g = w + a w^2 + a^2 w^3 / 3 + skew / (6 count), a = skew / 3, and
 * sqrt(count) g is compared with Student's t (Hall, J. R. Statist. Soc. B 54 (1992) 221-228).
 */
export function skewedTwoSided(standardised: number, skew: number, count: number): number {
  const w = standardised / Math.sqrt(count);
  const a = skew / 3;
  const g = w + a * w * w + (a * a * w * w * w) / 3 + skew / (6 * count);
  return studentTwoSided(Math.sqrt(count) * g, count - 1);
}

/** Means with weights 1 / error^2 and their homogeneity. */
export interface Pooled {
  readonly value: number;
  readonly standardError: number;
  readonly q: number;
  readonly pValue: number;
}

/**
 * Inverse-variance mean of `means` with standard errors `errors` > 0, and Cochran's Q = sum (m_i - mean)^2 / e_i^2,
 * chi-square with k - 1 degrees of freedom if all estimate one value (Cochran, Biometrics 10 (1954) 101-129).
 */
export function poolMeans(means: readonly number[], errors: readonly number[]): Pooled {
  // Weights relative to the smallest error, so that none overflows.
  const smallest = Math.min(...errors);
  const weights = errors.map((error) => (smallest / error) ** 2);
  const total = sum(weights);
  const value = sum(means.map((m, i) => m * (weights[i] ?? 0))) / total;
  const q = sum(means.map((m, i) => ((m - value) / (errors[i] ?? NaN)) ** 2));
  const pValue = means.length > 1 ? chiSquareUpper(q, means.length - 1) : 1;
  return { value, standardError: smallest / Math.sqrt(total), q, pValue };
}

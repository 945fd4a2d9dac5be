/**
 * Reads test/published/data/stats.json: statistics computed with mpmath 1.2.1 at 50 digits (22-digit strings) and SciPy
 * 1.10.1 / NumPy 1.24.2 (double-precision strings); the file's `meta` states which is which.
 */
import { readFileSync } from "node:fs";
import { expect } from "vitest";

type Texts = readonly [string, string];

interface Stats {
  normal_quantiles: { p: string; p_as_double: string; quantile_of_p_as_double: string }[];
  normal_cdf: { x: string; cdf: string; sf: string }[];
  t_quantiles: { p: string; df: number; quantile: string }[];
  chi2_quantiles: { p: string; df: number; quantile: string }[];
  chi2_sf: { x: string; df: number; sf: string }[];
  t_interval: {
    values: number[];
    conf: string;
    mean: string;
    sd: string;
    t: string;
    lo: string;
    hi: string;
  }[];
  t_test_one_sample: { data: string; mu0: number; t: string; p_two_sided: string };
  welch_t_test: { a: number[]; b: number[]; t: string; p: string };
  regression: {
    id: string;
    x: number[];
    y: number[];
    conf: string;
    slope: string;
    intercept: string;
    slope_se: string;
    intercept_se: string;
  }[];
  weighted_regression: {
    x: number[];
    y: number[];
    weights: number[];
    slope: string;
    intercept: string;
    slope_se_known_variances: string;
    slope_se_scaled: string;
    weighted_rss: string;
  };
  p_adjust: Record<string, { p: number[]; holm: number[] }>;
  binomial_intervals: { k: number; n: number; conf: string; clopper_pearson: Texts }[];
  binomial_test: { k: number; n: number; p: number; two_sided: string; greater: string; less: string }[];
  moments: { values: number[]; skewness_population: string; excess_kurtosis_population: string }[];
  quantiles_type7: { values: number[]; probs: number[]; numpy_default_linear: string[] };
  poisson_and_F: { what: string; value: string }[];
}

export const stats = JSON.parse(readFileSync(new URL("data/stats.json", import.meta.url), "utf8")) as Stats;

/** Asserts |found - expected| <= tolerance * |expected| (+ `absolute`). */
export function expectClose(found: number, expected: number, tolerance: number, absolute = 0): void {
  const error = Math.abs(found - expected);
  const allowed = tolerance * Math.abs(expected) + absolute;
  expect(error <= allowed, `${found} against ${expected}: off by ${error}, allowed ${allowed}`).toBe(true);
}

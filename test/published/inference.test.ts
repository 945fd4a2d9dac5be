/** Tests, regressions and adjustments against mpmath, SciPy and published examples (test/published/data/stats.json). */
import { describe, expect, it } from "vitest";
import { oneSample, poolMeans, welch } from "../../src/numeric/comparison.js";
import { holm } from "../../src/numeric/holm.js";
import { fitLine } from "../../src/numeric/least-squares.js";
import { deviation, kurtosis, skewness } from "../../src/numeric/moments.js";
import { detectableShift } from "../../src/numeric/power.js";
import { jackknife, keyedIndices, quantileOf } from "../../src/numeric/resampling.js";
import { studentFactor } from "../../src/numeric/student.js";
import { mean, sum } from "../../src/numeric/sums.js";
import { expectClose, stats } from "./stats-data.js";

describe("intervals and tests of means", () => {
  it.each(stats.t_interval)("t interval of $values at $conf (mpmath)", (row) => {
    const factor = studentFactor(Number(row.conf), row.values.length - 1);
    const half = (factor * deviation(row.values)) / Math.sqrt(row.values.length);
    expectClose(mean(row.values), Number(row.mean), 1e-15);
    expectClose(deviation(row.values), Number(row.sd), 1e-14);
    expectClose(factor, Number(row.t), 1e-13);
    expectClose(mean(row.values) - half, Number(row.lo), 1e-13);
    expectClose(mean(row.values) + half, Number(row.hi), 1e-13);
  });

  it("jackknife of a mean is its t interval (an identity of Tukey's, 1958)", () => {
    const { values, lo, hi } = stats.t_interval.find((row) => row.conf === "0.95") ?? expect.fail();
    const without = values.map((_, r) => mean(values.filter((_value, i) => i !== r)));
    const found = jackknife(mean(values), without);
    expectClose(found?.interval[0] ?? NaN, Number(lo), 1e-12);
    expectClose(found?.interval[1] ?? NaN, Number(hi), 1e-12);
  });

  it("one-sample t test (SciPy)", () => {
    const { mu0, t, p_two_sided } = stats.t_test_one_sample;
    const found = oneSample(stats.moments[1]?.values ?? [], mu0);
    expectClose(found.t, Number(t), 0, 1e-12);
    expectClose(found.pValue, Number(p_two_sided), 1e-12);
  });

  it("Welch's t test (SciPy)", () => {
    const found = welch(stats.welch_t_test.a, stats.welch_t_test.b);
    expectClose(found.t, Number(stats.welch_t_test.t), 1e-13);
    expectClose(found.pValue, Number(stats.welch_t_test.p), 1e-13);
  });

  it("pooled means: two means make Q the square of their standardised difference (Cochran 1954)", () => {
    const found = poolMeans([1, 1.6], [0.3, 0.4]);
    expectClose(found.q, 0.6 ** 2 / (0.3 ** 2 + 0.4 ** 2), 1e-14);
    expectClose(found.value, (1 / 0.09 + 1.6 / 0.16) / (1 / 0.09 + 1 / 0.16), 1e-15);
    expectClose(found.standardError, 0.24, 1e-15);
    // Q = 1.44 with one degree of freedom: P(|Z| > 1.2) = 0.230139340443 (Abramowitz & Stegun, table 26.1).
    expectClose(found.pValue, 0.230139340443, 1e-11);
  });
});

describe("regression", () => {
  it.each(stats.regression)("line $id at $conf (mpmath)", (row) => {
    const line = fitLine(row.x, row.y);
    expectClose(line.slope, Number(row.slope), 1e-13);
    expectClose(line.intercept, Number(row.intercept), 1e-13, 1e-13);
    expectClose(line.slopeError, Number(row.slope_se), 1e-10, 1e-14);
    expectClose(line.interceptError, Number(row.intercept_se), 1e-10, 1e-13);
  });

  it("weighted line (mpmath)", () => {
    const row = stats.weighted_regression;
    const line = fitLine(row.x, row.y, row.weights);
    expectClose(line.slope, Number(row.slope), 1e-13);
    expectClose(line.intercept, Number(row.intercept), 1e-13);
    expectClose(line.slopeErrorKnown, Number(row.slope_se_known_variances), 1e-13);
    expectClose(line.slopeError, Number(row.slope_se_scaled), 1e-12);
    expectClose(line.residualSquares, Number(row.weighted_rss), 1e-11);
  });

  it("refuses a single x", () => {
    expect(() => fitLine([2, 2, 2], [1, 2, 3])).toThrow(/two or more different x/);
  });
});

describe("Holm's adjustment", () => {
  it.each(Object.entries(stats.p_adjust))("example %s", (_name, { p, holm: expected }) => {
    holm(p).forEach((value, i) => {
      expectClose(value, expected[i] ?? NaN, 1e-14);
    });
  });

  it("counts tests that are not listed", () => {
    expect(holm([0.01, 0.02], 10)).toEqual([0.1, 0.18]);
  });
});

describe("moments and sums", () => {
  it.each(stats.moments)("skewness and kurtosis of $values (SciPy)", (row) => {
    expectClose(skewness(row.values), Number(row.skewness_population), 1e-12);
    expectClose(kurtosis(row.values) - 3, Number(row.excess_kurtosis_population), 1e-12);
  });

  it("quantiles of a sample (NumPy, linear)", () => {
    const { values, probs, numpy_default_linear } = stats.quantiles_type7;
    const sorted = [...values].sort((a, b) => a - b);
    probs.forEach((p, i) => expectClose(quantileOf(sorted, p), Number(numpy_default_linear[i]), 1e-15));
  });

  it("keeps what a plain sum loses", () => {
    // 1e16 + 1 - 1e16 = 1; a plain sum of doubles gives 0.
    expect(sum([1e16, 1, -1e16])).toBe(1);
    expect(sum([1, 1e100, 1, -1e100])).toBe(2);
    expect(sum([Infinity, 1])).toBe(Infinity);
    expect(sum([Infinity, -Infinity])).toBeNaN();
  });
});

describe("power and resampling", () => {
  it("the detectable shift for a known error is (1.959964 + 0.841621) errors (Abramowitz & Stegun, table 26.5)", () => {
    expectClose(detectableShift(2, 0.05, Infinity), 2 * (1.959963984540054 + 0.8416212335729143), 1e-14);
  });

  it("a key fixes the draws, another key changes them, all indices are equally likely", () => {
    const draw = (key: string, count: number) => {
      const next = keyedIndices(key);
      return Array.from({ length: count }, () => next(8));
    };
    expect(draw("a", 50)).toEqual(draw("a", 50));
    expect(draw("a", 50)).not.toEqual(draw("b", 50));
    const counts = new Array<number>(8).fill(0);
    for (const index of draw("counts", 80_000)) counts[index] = (counts[index] ?? 0) + 1;
    // Chi-square with 7 degrees of freedom; 24.32 is its 99.9 % quantile (Abramowitz & Stegun, table 26.8). Fixed key.
    expect(sum(counts.map((count) => (count - 10_000) ** 2 / 10_000))).toBeLessThan(24.32);
  });
});

/** Distributions of statistics against mpmath and SciPy (test/published/data/stats.json says how each was computed). */
import { describe, expect, it } from "vitest";
import {
  clopperPearson,
  binomialLower,
  binomialTwoSided,
  binomialUpper,
} from "../../src/numeric/binomial.js";
import { chiSquareQuantile, chiSquareUpper } from "../../src/numeric/chi-square.js";
import { incompleteBeta } from "../../src/numeric/incomplete-beta.js";
import { incompleteGamma } from "../../src/numeric/incomplete-gamma.js";
import { normalCdf, normalQuantile, normalUpper } from "../../src/numeric/normal.js";
import {
  studentCdf,
  studentQuantile,
  studentUpper,
  studentUpperQuantile,
} from "../../src/numeric/student.js";
import { expectClose, stats } from "./stats-data.js";
import extremes from "./data/student-extremes.json" with { type: "json" };

describe("normal law (mpmath)", () => {
  it.each(stats.normal_quantiles.filter((row) => Number(row.p_as_double) < 1))(
    "quantile at p = $p",
    ({ p_as_double, quantile_of_p_as_double }) => {
      expectClose(normalQuantile(Number(p_as_double)), Number(quantile_of_p_as_double), 4e-15, 1e-300);
    },
  );

  it.each(stats.normal_cdf)("distribution at x = $x", ({ x, cdf, sf }) => {
    // Below 2.2e-308 doubles themselves carry fewer digits.
    expectClose(normalCdf(Number(x)), Number(cdf), 2e-14, 1e-323);
    expectClose(normalUpper(Number(x)), Number(sf), 2e-14, 1e-323);
  });
});

describe("Student's t (mpmath)", () => {
  it.each(stats.t_quantiles)("quantile at p = $p with $df degrees of freedom", ({ p, df, quantile }) => {
    // p is the decimal as written; 1 - p as a double is off by up to 1.1e-16, which is 2e-13 of 0.0005.
    const tail = Number((1 - Number(p)).toFixed(6));
    expectClose(studentUpperQuantile(tail, df), Number(quantile), 2e-14);
    expectClose(studentCdf(Number(quantile), df), Number(p), 1e-14);
  });

  it.each(extremes.rows)("tail $q with $df degrees of freedom", ({ q, df, quantile }) => {
    const allowed = df > 1000 ? 2e-12 : 1e-13;
    expectClose(studentUpperQuantile(Number(q), df), Number(quantile), allowed);
    expectClose(studentUpper(Number(quantile), df), Number(q), 5 * allowed);
    expectClose(studentQuantile(Number(q), df), -Number(quantile), allowed);
  });
});

describe("chi-square (mpmath)", () => {
  it.each(stats.chi2_quantiles)("quantile at p = $p with $df degrees of freedom", ({ p, df, quantile }) => {
    expectClose(chiSquareQuantile(Number(p), df), Number(quantile), 5e-14);
  });

  it.each(stats.chi2_sf)("upper tail at x = $x with $df degrees of freedom", ({ x, df, sf }) => {
    expectClose(chiSquareUpper(Number(x), df), Number(sf), 2e-13);
  });
});

describe("incomplete gamma and beta (mpmath, through Poisson and F)", () => {
  const value = (text: string) => Number(stats.poisson_and_F.find((row) => row.what.startsWith(text))?.value);

  it("P(X > 3) of a Poisson law of mean 1.2 is P(4, 1.2)", () => {
    expectClose(incompleteGamma(4, 1.2).lower, value("poisson"), 1e-14);
  });

  it("P(F > 2.5) with 3 and 20 degrees of freedom is I_x(10, 1.5), x = 20 / (20 + 3 * 2.5)", () => {
    expectClose(incompleteBeta(10, 1.5, 20 / 27.5).lower, value("F sf"), 1e-14);
  });

  it("I_x(a, 1) = x^a and I_x(1, b) = 1 - (1 - x)^b (DLMF 8.17.7, 8.17.8)", () => {
    for (const x of [1e-6, 0.1, 0.5, 0.9, 0.999]) {
      for (const a of [0.5, 1, 3, 40, 1000]) {
        expectClose(incompleteBeta(a, 1, x).lower, x ** a, 2e-13, 1e-320);
        expectClose(incompleteBeta(1, a, x).lower, -Math.expm1(a * Math.log1p(-x)), 2e-13);
      }
    }
  });
});

describe("binomial law (mpmath, SciPy)", () => {
  it.each(stats.binomial_intervals)(
    "Clopper-Pearson for $k of $n at $conf",
    ({ k, n, conf, clopper_pearson }) => {
      const [low, high] = clopperPearson(k, n, Number(conf));
      expectClose(low, Number(clopper_pearson[0]), 1e-12);
      expectClose(high, Number(clopper_pearson[1]), 1e-12);
    },
  );

  it.each(stats.binomial_test)(
    "exact test of $k in $n against $p",
    ({ k, n, p, two_sided, greater, less }) => {
      expectClose(binomialTwoSided(k, n, p), Number(two_sided), 1e-12);
      expectClose(binomialUpper(k, n, p), Number(greater), 1e-12);
      expectClose(binomialLower(k, n, p), Number(less), 1e-12);
    },
  );

  it("sums probabilities for a hundred million trials (mpmath)", () => {
    // mpmath 1.3.0 at 60 digits: exact ratios of neighbouring probabilities summed from the first term outwards.
    const large = [
      { k: 50_003_000, n: 1e8, p: 0.5, lower: 0.725780203603883, upper: 0.2742864413166415 },
      { k: 1200, n: 1e8, p: 1e-5, lower: 0.999999999611586, upper: 4.683249621466514e-10 },
      { k: 99_998_000, n: 1e8, p: 0.99997, lower: 1, upper: 2.053506118983475e-84 },
    ];
    for (const row of large) {
      expectClose(binomialLower(row.k, row.n, row.p), row.lower, 1e-9);
      expectClose(binomialUpper(row.k, row.n, row.p), row.upper, 1e-9);
    }
  });

  it("refuses what is not a count", () => {
    expect(() => binomialLower(1.5, 10, 0.5)).toThrow(/expected whole numbers/);
    expect(() => binomialTwoSided(1, 10, NaN)).toThrow(/expected p in \(0, 1\)/);
  });
});

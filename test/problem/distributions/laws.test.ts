/**
 * Laws that every distribution obeys, with parameters chosen here: the quantile rises, the density between two quantiles
 * integrates to the difference of their levels (a round trip by another way), and a scrambled Sobol' run gives the exact
 * mean and variance. The net's error for a monotone integrand of d = 1 falls as n^-3/2 (Owen 1997); at 2^14 points 1e-4
 * relative leaves heavy tails some room.
 */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../../src/kernels/instance.js";
import type { ParameterValues } from "../../../src/problem/distributions/contract.js";
import { distributionIds, distributionOf, lawOf } from "../../../src/problem/distributions/registry.js";
import type { DistributionId } from "../../../src/problem/distributions/registry.js";
import { makeKey } from "../../../src/sources/key.js";
import { findSource } from "../../../src/sources/registry.js";
import { quantiles } from "./draw.js";

/** Parameters with finite variance; [] where the defaults do. */
const EXAMPLES: Readonly<Record<DistributionId, readonly ParameterValues[]>> = {
  uniform: [{}, { from: -3, to: 5 }],
  normal: [{}, { mean: 2, deviation: 3 }],
  lognormal: [{ logMean: 0.2, logDeviation: 0.5 }],
  exponential: [{ mean: 3 }],
  weibull: [{ shape: 1.5, scale: 2 }],
  pareto: [{ shape: 6, scale: 2 }],
  logistic: [{ location: -1, scale: 2 }],
  laplace: [{ location: 1, scale: 0.5 }],
  cauchy: [{ location: 1, scale: 2 }],
  gumbel: [{ location: 0.5, scale: 2 }],
  triangular: [{ from: -1, mode: 0, to: 3 }],
  beta: [{ alpha: 2.5, beta: 1.5 }],
  gamma: [{ shape: 2.5, scale: 3 }],
  "chi-squared": [{ degrees: 5 }],
  student: [{ degrees: 9, location: 1, scale: 2 }],
  f: [{ numerator: 5, denominator: 14 }],
  "inverse-gaussian": [{ mean: 2, shape: 3 }],
  "truncated-normal": [{ mean: 1, deviation: 2, from: 0, to: 4 }, { from: 2 }, { to: -1 }],
  bernoulli: [{ probability: 0.3 }],
  binomial: [{ trials: 40, probability: 0.3 }],
  poisson: [{ mean: 6.5 }],
  "negative-binomial": [{ successes: 2.5, probability: 0.4 }],
  geometric: [{ probability: 0.25 }],
  empirical: [{ values: [3, 1, 1, 2] }],
  table: [{ values: [-1, 0.5, 7], probabilities: [0.2, 0.5, 0.3] }],
};

const cases = distributionIds.flatMap((id) =>
  EXAMPLES[id].map((parameters) => [`${id} ${JSON.stringify(parameters)}`, id, parameters] as const),
);

/** Nodes and weights of Gauss and Legendre's rule of five points, Abramowitz & Stegun 1964, table 25.4. */
const GAUSS = [
  [0, 0.5688888888888889],
  [0.5384693101056831, 0.4786286704993665],
  [-0.5384693101056831, 0.4786286704993665],
  [0.906179845938664, 0.2369268850561891],
  [-0.906179845938664, 0.2369268850561891],
] as const;

/** Values of a discrete law up to `last`. */
function atoms({ values }: ParameterValues, last: number): readonly number[] {
  if (typeof values === "object") return [...new Set(values)].filter((x) => x <= last);
  return Array.from({ length: last + 1 }, (_, k) => k);
}

function integral(f: (x: number) => number, from: number, to: number): number {
  const half = (to - from) / 2;
  return GAUSS.reduce((sum, [x, w]) => sum + half * w * f(from + half * (1 + x)), 0);
}

describe.each(cases)("%s", (_, id, parameters) => {
  const law = lawOf(id, parameters);

  test("the quantile rises", () => {
    const level = fc.double({ min: 1e-18, max: 1 - 2 ** -53, noNaN: true });
    fc.assert(
      fc.property(level, level, (a, b) => {
        const [low = NaN, high = NaN] = quantiles(law, [Math.min(a, b), Math.max(a, b)]);
        // neighbouring pieces of a table may differ by their error
        return low <= high + 1e-12 * Math.abs(high) && low >= law.support[0] && high <= law.support[1];
      }),
      { seed: 20260401, numRuns: 300 },
    );
  });

  test("the density between quantiles is the difference of their levels", () => {
    const levels = Array.from({ length: 399 }, (_, i) => (i + 1) / 400);
    const x = quantiles(law, levels);
    if (distributionOf(id).discrete) {
      for (const [i, u] of levels.entries()) {
        const reached = atoms(parameters, x[i] ?? NaN).reduce((sum, k) => sum + law.density(k), 0);
        // the least value whose distribution function reaches u, which the sum of probabilities has to 1e-12
        expect(reached).toBeGreaterThanOrEqual(u - 1e-12);
        expect(reached - law.density(x[i] ?? NaN)).toBeLessThan(u + 1e-12);
      }
      return;
    }
    for (let i = 60; i < 340; i++) {
      const share = integral(law.density, x[i] ?? NaN, x[i + 1] ?? NaN);
      // five points leave 1e-8 of a piece where a density is curved, more where it has a corner
      expect(Math.abs(share - 1 / 400)).toBeLessThan(id === "triangular" || id === "laplace" ? 2e-5 : 1e-8);
    }
  });

  test("a scrambled net gives the moments", () => {
    if (!Number.isFinite(law.variance)) return;
    const kernels = instantiateKernels();
    const n = 2 ** 14;
    const at = kernels.arena.allocate(n * 8);
    const key = makeKey({ seed: 1, purpose: "study", problem: id, source: "sobol+owen", replicate: 0 });
    const source = findSource("sobol");
    if (source === undefined) throw new Error("no Sobol' sequence");
    source.open({ dimension: 1, n, randomisations: ["owen"], key }, kernels).fill(at, n, n);
    const x = quantiles(law, kernels.f64(at, n));
    const mean = x.reduce((sum, value) => sum + value, 0) / n;
    const variance = x.reduce((sum, value) => sum + (value - mean) ** 2, 0) / n;
    const size = Math.abs(law.mean) + Math.sqrt(law.variance);
    expect(Math.abs(mean - law.mean)).toBeLessThan(1e-4 * size);
    expect(Math.abs(variance - law.variance)).toBeLessThan(1e-2 * law.variance);
  });
});

/** The distributions that an input may have. Help, schema, listings, docs and the shared tests come from this table. */
import { beta } from "./beta.js";
import { gamma } from "./gamma.js";
import { chiSquared } from "./chi-squared.js";
import { student } from "./student.js";
import { f } from "./f.js";
import { inverseGaussian } from "./inverse-gaussian.js";
import { truncatedNormal } from "./truncated-normal.js";
import { bernoulli } from "./bernoulli.js";
import { binomial } from "./binomial.js";
import { poisson } from "./poisson.js";
import { negativeBinomial } from "./negative-binomial.js";
import { geometric } from "./geometric.js";
import { table } from "./table.js";
import { cauchy } from "./cauchy.js";
import type { Distribution, Law, ParameterValues } from "./contract.js";
import { empirical } from "./empirical.js";
import { exponential } from "./exponential.js";
import { gumbel } from "./gumbel.js";
import { laplace } from "./laplace.js";
import { logistic } from "./logistic.js";
import { lognormal } from "./lognormal.js";
import { normal } from "./normal.js";
import { pareto } from "./pareto.js";
import { triangular } from "./triangular.js";
import { uniform } from "./uniform.js";
import { weibull } from "./weibull.js";

export const DISTRIBUTIONS = {
  uniform,
  normal,
  lognormal,
  exponential,
  weibull,
  pareto,
  logistic,
  laplace,
  cauchy,
  gumbel,
  triangular,
  beta,
  gamma,
  "chi-squared": chiSquared,
  student,
  f,
  "inverse-gaussian": inverseGaussian,
  "truncated-normal": truncatedNormal,
  bernoulli,
  binomial,
  poisson,
  "negative-binomial": negativeBinomial,
  geometric,
  table,
  empirical,
} as const satisfies Readonly<Record<string, Distribution>>;

export type DistributionId = keyof typeof DISTRIBUTIONS;

export const distributionIds = Object.keys(DISTRIBUTIONS) as DistributionId[];

export function distributionOf(id: DistributionId): Distribution {
  return DISTRIBUTIONS[id];
}

/** Names of all parameters, each with the distributions that take it. */
export function parameterNames(): Map<string, DistributionId[]> {
  const names = new Map<string, DistributionId[]>();
  for (const id of distributionIds) {
    for (const name of Object.keys(distributionOf(id).parameters)) {
      names.set(name, [...(names.get(name) ?? []), id]);
    }
  }
  return names;
}

/** The law of a distribution with `given` parameters, checked before, and defaults for the others. */
export function lawOf(id: DistributionId, given: ParameterValues = {}): Law {
  const values: Record<string, number | readonly number[]> = {};
  for (const [name, parameter] of Object.entries(distributionOf(id).parameters)) {
    if (parameter.default !== undefined) values[name] = parameter.default;
  }
  return distributionOf(id).law({ ...values, ...given });
}

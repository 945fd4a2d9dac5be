/**
 * The consensus that stands in for a missing reference: the inverse-variance mean of the estimates of sound sources of
 * different families on keys of their own, after Cochran's test (1954) that they estimate one value. Each member's
 * variance of the mean is s^2 / R * (R - 1)/(R - 3), the variance of a scaled Student's t (JCGM 101:2008, 6.4.9.4), since
 * s comes from R replicates only.
 */
import { poolMeans } from "../numeric/comparison.js";
import { deviation } from "../numeric/moments.js";
import { mean } from "../numeric/sums.js";
import type { Consensus } from "../record/types.js";

/** What one source contributes: its replicates' estimates at n points. */
export interface Contribution {
  readonly source: string;
  readonly n: number;
  readonly estimates: readonly number[];
  /** Range of the bias at finite n, for quantities with one; the farther end counts as a standard uncertainty. */
  readonly finiteBias?: readonly [number, number] | null;
}

/** Fewer members could agree on the same mistake. */
const FEWEST_MEMBERS = 3;

/** Below this p-value of homogeneity the members contradict each other, and there is no reference. */
const HOMOGENEITY_LEVEL = 0.01;

/** Needs three or more members with at least 4 finite estimates each; otherwise there is no value and `agreed` is false. */
export function consensusOf(problem: string, contributions: readonly Contribution[]): Consensus {
  const members = contributions.map(({ source, n, estimates, finiteBias }) => {
    const centre = mean(estimates);
    const count = estimates.length;
    const [low, high] = finiteBias ?? [0, 0];
    const sampling = deviation(estimates) * Math.sqrt((count - 1) / (count - 3) / count);
    const measured = Math.hypot(sampling, Math.max(-low, high));
    // Members that agree with themselves to the last bit are still rounded.
    const standardError = Math.max(measured, 4 * Number.EPSILON * Math.abs(centre), Number.MIN_VALUE);
    return { source, n, mean: centre, standardError: count > 3 ? standardError : NaN };
  });
  const usable = members.every((one) => Number.isFinite(one.mean) && Number.isFinite(one.standardError));
  if (!usable || members.length < FEWEST_MEMBERS) {
    return { problem, value: null, standardError: null, members, q: NaN, pValue: NaN, agreed: false };
  }
  const pooled = poolMeans(
    members.map((one) => one.mean),
    members.map((one) => one.standardError),
  );
  const agreed = pooled.pValue >= HOMOGENEITY_LEVEL;
  return {
    problem,
    value: agreed ? pooled.value : null,
    standardError: agreed ? pooled.standardError : null,
    members,
    q: pooled.q,
    pValue: pooled.pValue,
    agreed,
  };
}

/** The contract of an estimator: how the moments of a replicate become an estimate. One file each, one registry. */
import type { Moments } from "./moments.js";

export interface Estimate {
  readonly estimate: number;
  /** Variance of one evaluation within the replicate (divisor n - 1); null for n = 1. */
  readonly withinVariance: number | null;
}

export interface Estimator {
  readonly id: string;
  readonly title: string;
  readonly citation: string;
  estimate(moments: Moments): Estimate;
}

/** Which inputs of an integrand matter, as plain data: shares of its variance, with intervals. */

/** A share of the variance. Estimates scatter, so a share near 0 or 1 may lie a little outside. */
export interface Share {
  readonly value: number;
  readonly interval: readonly [number, number];
}

/** A set of coordinates and what it does. */
export interface InputShare {
  /** As the formula writes it: "x", "z[3]", "z[1..8]". */
  readonly label: string;
  /** Index of the first coordinate, 0-based, and how many there are. */
  readonly first: number;
  readonly count: number;
  /** What the set decides alone (closed index; of one coordinate the first-order Sobol' index). */
  readonly alone: Share;
  /** What the set has part in (total index). */
  readonly total: Share;
}

export interface PairShare {
  /** Indices of the two, 0-based, in `units`. */
  readonly i: number;
  readonly j: number;
  /** What the two decide together. */
  readonly closed: Share;
  /** The part of it that neither decides alone. */
  readonly interaction: Share;
}

/** A whole number known by its ends. */
export interface Between {
  readonly atLeast: number;
  readonly atMost: number;
}

/** Slope of the logarithm of the deviation of randomised-net estimates on log n. */
export interface NetOrder {
  readonly order: number;
  readonly interval: readonly [number, number];
}

/** How fast randomised-net estimates settle, beside integrands of the same inputs whose smoothness is known. */
export interface Smoothness {
  readonly source: string;
  readonly sizes: readonly number[];
  readonly replicates: number;
  readonly integrand: NetOrder;
  /** exp, max(.., 0) and a condition of the same weighted sum of uniform coordinates. */
  readonly smooth: NetOrder;
  readonly kinked: NetOrder;
  readonly jumping: NetOrder;
}

export interface SensitivityMeasures {
  readonly source: string;
  /** Points of one replicate, and how many. */
  readonly points: number;
  readonly replicates: number;
  /** Values of the integrand that were taken in all. */
  readonly evaluations: number;
  readonly mean: number;
  readonly variance: number;
  /** Standard error of the variance over the variance. */
  readonly varianceError: number;
  /** Coordinates in order; groups of neighbours where there are too many. */
  readonly units: readonly InputShare[];
  /** True where a unit is more than one coordinate. */
  readonly grouped: boolean;
  /** Whole inputs, where there are several and one is longer than 1. */
  readonly inputs: readonly InputShare[];
  /** Leading pairs of units, largest interaction first. */
  readonly pairs: readonly PairShare[];
  /** Sum over all pairs; null where not all were looked at. */
  readonly allPairs: Share | null;
  /** Sum over units. */
  readonly allAlone: Share;
  /** Mean dimension, in coordinates. */
  readonly meanDimension: Share;
  /** So many first coordinates decide 99 % of the variance. */
  readonly truncation: Between;
  readonly smoothness: Smoothness | null;
}

/** How evenly a net covers pairs: t of the first base^digits points, for each of `pairs` of the measures. */
export interface NetPairs {
  readonly source: string;
  readonly base: number;
  readonly digits: number;
  readonly t: readonly number[];
}

/** One problem x output; `measures` is null where `reason` says why. */
export interface Sensitivity {
  readonly problem: string;
  readonly output: string;
  readonly confidence: number;
  readonly measures: SensitivityMeasures | null;
  /** The digital nets among the sources of the study. */
  readonly nets: readonly NetPairs[];
  readonly reason: string | null;
}

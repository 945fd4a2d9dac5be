/**
 * The record: the hinge between computing and reading. Everything left of it computes, everything right of it only
 * reads it; a record on disk is enough to redraw every report. Absent is null, never 0; a non-finite number is written
 * as the string "NaN", "Infinity" or "-Infinity" (see json.ts).
 */
import type { Problem, SourceSpec } from "../problem/contract.js";
import type { SourceDescription } from "../sources/contract.js";
import type { ProblemMeasurements } from "./measurements.js";
import type { Sensitivity } from "./sensitivity.js";
import type { Explanation } from "./explanation.js";

export const RECORD_SCHEMA = "tolerand/record/1";

/** What was asked, resolved: the canonical text of this, hashed, names the study. */
export interface StudySpec {
  /** Present for the pilot of a plan, whose points have keys of their own; absent for a study. */
  readonly purpose?: "pilot";
  /** Present where each source stops at the first of its sizes at which it is inside the tolerance. */
  readonly until?: "tolerance";
  readonly problems: readonly Problem[];
  /** For each problem id: the sources, as canonical ids or the user's own descriptions. */
  readonly sources: Readonly<Record<string, readonly SourceSpec[]>>;
  readonly sizes: Readonly<Record<string, readonly number[]>>;
  readonly replicates: Readonly<Record<string, number>>;
  readonly estimators: Readonly<Record<string, readonly string[]>>;
  /** Level of the family of bias tests, e.g. 0.01. */
  readonly falseAlarms: number;
  readonly seed: number;
}

export interface Environment {
  readonly program: string;
  readonly node: string;
  readonly platform: string;
  readonly threads: number;
  readonly started: string;
  readonly finished: string;
  readonly seconds: number;
  /** The command line that repeats the study. */
  readonly command: string;
  /** False after an interruption: cells hold what was done. */
  readonly complete: boolean;
}

/** A source as the record describes it. */
export interface RecordSource extends Omit<SourceDescription, "id" | "period" | "randomisations" | "fixed"> {
  /** Canonical id, randomisations included. */
  readonly id: string;
  /** Decimal digits, or null. */
  readonly period: string | null;
  /** True for an unrandomised quasi-random source: one row, no error bar, no verdict. */
  readonly deterministic: boolean;
  /** Randomisations in force. */
  readonly randomisations: readonly string[];
}

export interface NonFinite {
  /** Points with a non-finite value, over all replicates. */
  readonly count: number;
  /** The first offending point, and what the integrand was given there, in order of coordinates. */
  readonly first: {
    readonly replicate: number;
    readonly index: number;
    readonly inputs: readonly number[];
    readonly value: string;
  };
}

/** What running gives for one problem x source x estimator x output x n. */
export interface RawCell {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly output: string;
  /** Points per replicate really used. */
  readonly n: number;
  readonly dimension: number;
  /** True where f is a condition (0 or 1): the mean is a probability, estimate x n a number of hits. */
  readonly indicator: boolean;
  /** One estimate per replicate, in order of replicates. */
  readonly estimates: readonly number[];
  /** Variance of f within each replicate (divisor n - 1); null for n = 1. */
  readonly withinVariances: readonly (number | null)[];
  /**
   * Range in which the finite-n bias of sound points lies, mean over the replicates (twice the leading term, of order
   * 1/n, and 0); null where it cannot be told; absent for means, which have none.
   */
  readonly finiteBias?: readonly [number, number] | null;
  readonly secondsPerPoint: number | null;
  readonly nonFinite: NonFinite | null;
}

/** A raw cell and its statistics (findings/cells.ts). Standard errors and deviations are in units of the quantity. */
export interface Cell extends RawCell {
  readonly replicates: number;
  readonly reference: number | null;
  readonly mean: number | null;
  /** mean - reference. */
  readonly bias: number | null;
  /** sqrt(s^2 / R + u^2), u the standard uncertainty of the reference; null for a deterministic source. */
  readonly biasStandardError: number | null;
  readonly rmse: number | null;
  /** 95 % interval by jackknife of log RMSE; null where there is no error bar. */
  readonly rmseInterval: readonly [number, number] | null;
  /** Standard deviation s of the estimates over replicates (divisor R - 1). */
  readonly replicateDeviation: number | null;
  /** Standard deviation of f, pooled from the within variances. */
  readonly integrandDeviation: number | null;
  /** s^2 n / sigma^2, 1 for independent points; sigma from a sound source. */
  readonly varianceAgainstCrude: number | null;
  /** 95 % interval of it by bootstrap, at the largest n of a series; null elsewhere. */
  readonly varianceAgainstCrudeInterval: readonly [number, number] | null;
  /** Share of claimed intervals that held the reference; null where not assessed. */
  readonly coverage: number | null;
  /** Sample kurtosis of the errors above 6: the RMSE is a lower bound only. */
  readonly heavyTailed: boolean;
  /** SHA-256 of the cell's estimates and within variances, to the bit. */
  readonly digest: string;
}

/** The consensus that stands in for a missing reference. */
export interface Consensus {
  readonly problem: string;
  readonly value: number | null;
  readonly standardError: number | null;
  readonly members: readonly {
    readonly source: string;
    readonly n: number;
    readonly mean: number;
    readonly standardError: number;
  }[];
  /** Cochran's Q and its p-value for homogeneity. */
  readonly q: number;
  readonly pValue: number;
  readonly agreed: boolean;
}

/** The one bias test of a problem x source x estimator x output, at its largest n. */
export interface BiasTest {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly output: string;
  readonly n: number;
  readonly kind: "student" | "binomial" | "none";
  readonly pValue: number | null;
  readonly pValueAdjusted: number | null;
  /** Smallest bias that the test would have found with 80 % power. */
  readonly detectableBias: number | null;
  readonly candidate: boolean;
  /** Fresh keys, R = 256; null where no confirmation was needed. */
  readonly confirmation: {
    readonly replicates: number;
    readonly estimates: readonly number[];
    readonly bias: number;
    readonly standardError: number;
    readonly pValue: number;
  } | null;
  readonly confirmed: boolean;
  /** Why no test was made, or what is unusual about it, in words; null otherwise. */
  readonly reason: string | null;
}

/** The test of a pseudo-random source's spread at its largest n: do its replicates differ as independent points would? */
export interface SpreadTest {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly output: string;
  readonly n: number;
  /** n s^2 / w, w the mean variance of f within the replicates: 1 for independent points. */
  readonly ratio: number | null;
  readonly pValue: number | null;
  readonly pValueAdjusted: number | null;
  readonly candidate: boolean;
  /** Fresh keys, R = 256; null where no confirmation was needed. */
  readonly confirmation: {
    readonly replicates: number;
    readonly estimates: readonly number[];
    readonly withinVariances: readonly (number | null)[];
    readonly ratio: number;
    /** 95 %, jackknife of the logarithm. */
    readonly interval: readonly [number, number] | null;
    readonly pValue: number;
  } | null;
  readonly confirmed: boolean;
  /** Why no test was made, in words; null otherwise. */
  readonly reason: string | null;
}

/** Convergence of one problem x source x estimator x output over n. */
export interface Convergence {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly output: string;
  /** Slope of log RMSE on log n, negative when the error falls. */
  readonly order: number | null;
  readonly orderInterval: readonly [number, number] | null;
  /** Level below which the error does not fall, and the lower limit of it. */
  readonly floor: number | null;
  readonly floorLower: number | null;
  /** n at which the tolerance is reached, with a 95 % interval; null where never or not known. */
  readonly reach: {
    readonly n: number;
    readonly interval: readonly [number, number] | null;
    readonly extrapolated: boolean;
  } | null;
  readonly never: boolean;
  /** Seconds to reach the tolerance with one replicate. */
  readonly cost: number | null;
}

export type Verdict = "within" | "outside" | "undecided" | "none";

export interface BudgetLine {
  /** Name of a line of findings/budget/registry.ts, or of a contribution that the problem declares. */
  readonly line: string;
  readonly kind: "bias" | "random" | "probability";
  /**
   * Size: a bound for a bias line, one standard deviation for a random line; a probability is not part of the total. null
   * where it could not be assessed.
   */
  readonly value: number | null;
  readonly interval: readonly [number, number] | null;
  /** How it was found. */
  readonly basis: string;
  /** What would reduce it; null where there is nothing to reduce. */
  readonly remedy: string | null;
}

/** What the tolerance is spent on at the stated n. */
export interface Budget {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly output: string;
  readonly n: number;
  readonly tolerance: number | null;
  readonly confidence: number;
  readonly lines: readonly BudgetLine[];
  readonly total: number | null;
  readonly totalInterval: readonly [number, number] | null;
  readonly verdict: Verdict;
  /** tolerance - total. */
  readonly headroom: number | null;
  readonly largestLine: string | null;
  /** Coverage factor of the random lines together, and its effective degrees of freedom (null: known deviations). */
  readonly coverageFactor: number | null;
  readonly degrees: number | null;
  /** Why, in words, when the verdict is `undecided` or `none`. */
  readonly reason: string | null;
  /** True for the budget of what is in use. */
  readonly inUse: boolean;
}

/** The integrand averaged over every valid starting state of a source. */
export interface FullCycleAverage {
  readonly states: number;
  readonly mean: number;
  /** The exact seed-averaged bias: the mean less the reference; null without one. */
  readonly bias: number | null;
  readonly referenceUncertainty: number | null;
  /** Standard deviation of the integrand over the states; null for a single one. */
  readonly deviation: number | null;
  /** States with a non-finite value; the mean then is not finite either. */
  readonly nonFinite: number;
  /** The first of them by its index in the order of states. */
  readonly offending: {
    readonly index: number;
    readonly inputs: readonly number[];
    readonly value: string;
  } | null;
  /** Coordinates that were exactly 0 or 1, of sources where they may be. */
  readonly endpoints: number;
}

/** Where a study that stops at the tolerance left one source. */
export interface Stop {
  readonly problem: string;
  readonly source: string;
  /** The last n looked at. */
  readonly n: number;
  /** Looks made, and sizes declared. */
  readonly look: number;
  readonly looks: number;
  /** False where the limit of points came first. */
  readonly inside: boolean;
}

export interface StudyRecord {
  readonly schema: typeof RECORD_SCHEMA;
  readonly spec: StudySpec;
  /** SHA-256 of the canonical spec. */
  readonly specDigest: string;
  /** SHA-256 over the digests of all cells. */
  readonly digest: string;
  readonly environment: Environment;
  readonly problems: readonly Problem[];
  readonly sources: readonly RecordSource[];
  readonly consensus: readonly Consensus[];
  readonly cells: readonly Cell[];
  readonly tests: readonly BiasTest[];
  readonly spreadTests: readonly SpreadTest[];
  /** Size of the family of all these tests and its level. */
  readonly family: { readonly tests: number; readonly level: number };
  readonly convergence: readonly Convergence[];
  readonly budgets: readonly Budget[];
  /** Pairs whose source has known structure: what it does to the integrand, or could do. */
  readonly explanations: readonly Explanation[];
  /** Only of a study that stops at the tolerance. */
  readonly stops?: readonly Stop[];
  /** What the budgets' lines need beside the cells, per problem. */
  readonly measurements: readonly ProblemMeasurements[];
  /** Which inputs matter, per problem and output. */
  readonly sensitivity: readonly Sensitivity[];
  readonly warnings: readonly string[];
}

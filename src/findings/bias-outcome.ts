/**
 * The test of one mean against its reference: exact binomial for counted hits (findings/bias.ts says when), Student's t
 * otherwise. What is tested and at which level is the business of bias.ts.
 */
import { binomialTwoSided } from "../numeric/binomial.js";
import { chiSquareUpper } from "../numeric/chi-square.js";
import { skewedTwoSided } from "../numeric/comparison.js";
import { deviation, skewness } from "../numeric/moments.js";
import { studentTwoSided } from "../numeric/student.js";
import { mean, sum } from "../numeric/sums.js";
import { ROUNDING } from "./cells.js";
import { beyond } from "./finite-bias.js";
import type { KnownReference } from "./reference.js";

/** Fewest expected hits (and misses) for a test of a probability. */
const FEWEST_HITS = 100;

/** Below this p-value the spread of the hits contradicts independent points, and Student's t takes the binomial's place. */
const DISPERSION_LEVEL = 0.001;

export interface Outcome {
  readonly kind: "student" | "binomial" | "none";
  readonly pValue: number | null;
  readonly bias: number;
  readonly standardError: number;
  /** Degrees of freedom of the standard error; Infinity for the binomial. */
  readonly degrees: number;
  /** Why there is no test, or what is unusual about it. */
  readonly reason: string | null;
}

/** The deviation of a sound source at the same n, for a source that shows none. */
export interface Borrowed {
  readonly source: string;
  readonly deviation: number;
  readonly degrees: number;
}

export interface Subject {
  readonly estimates: readonly number[];
  readonly n: number;
  /** True for a crude probability of a pseudo-random source: exact binomial counts. */
  readonly counts: boolean;
  readonly indicator: boolean;
  readonly reference: KnownReference;
  readonly borrowed: Borrowed | null;
  /** Range in which a bias is no fault of the source; absent for means. */
  readonly finiteBias?: readonly [number, number] | null;
}

export function untested(reason: string): Outcome {
  return { kind: "none", pValue: null, bias: NaN, standardError: NaN, degrees: NaN, reason };
}

/** One test of a mean against its reference; `confirming` at stage 2. */
export function examine(subject: Subject, confirming: boolean): Outcome {
  const { estimates, n, reference, indicator } = subject;
  if (!estimates.every(Number.isFinite)) return untested("non-finite values of the integrand");
  if (subject.finiteBias === null)
    return untested("too few points beyond the level: the bias at finite n is not known");
  const trials = n * estimates.length;
  const expected = Math.min(reference.value, 1 - reference.value) * trials;
  if (indicator && !(expected >= FEWEST_HITS)) {
    return untested(
      `${Math.max(0, expected).toPrecision(2)} hits or misses expected, fewer than ${FEWEST_HITS}`,
    );
  }
  const binomial = subject.counts ? binomialOutcome(subject) : null;
  if (binomial !== null) return binomial;
  const bias = mean(estimates) - reference.value;
  const size = Math.max(Math.abs(reference.value), Math.abs(mean(estimates)));
  // The reference as a double and the integrand's last places are uncertain by some units of rounding themselves.
  const uncertainty = Math.hypot(reference.uncertainty, 4 * Number.EPSILON * size);
  const spread = deviation(estimates);
  if (!(spread > ROUNDING * size)) return constantOutcome(subject, bias, uncertainty, ROUNDING * size);
  const standardError = Math.hypot(spread / Math.sqrt(estimates.length), uncertainty);
  const degrees = estimates.length - 1;
  const t = beyond(bias, subject.finiteBias) / standardError;
  const plain = studentTwoSided(t, degrees);
  const pValue = confirming
    ? Math.max(plain, skewedTwoSided(t, skewness(estimates), estimates.length))
    : plain;
  return { kind: "student", pValue, bias, standardError, degrees, reason: null };
}

/** All replicates gave the same value: a test with a borrowed deviation where that value is wrong, else none. */
function constantOutcome(subject: Subject, bias: number, uncertainty: number, rounding: number): Outcome {
  const { borrowed, estimates } = subject;
  const same = "all replicates gave the same value";
  const excess = beyond(bias, subject.finiteBias);
  if (Math.abs(excess) <= 4 * rounding) return untested(`${same}, the reference to rounding`);
  if (borrowed === null) return untested(same);
  const standardError = Math.hypot(borrowed.deviation / Math.sqrt(estimates.length), uncertainty);
  const pValue = studentTwoSided(excess / standardError, borrowed.degrees);
  const reason = `${same}; tested with the deviation of ${borrowed.source}`;
  return { kind: "student", pValue, bias, standardError, degrees: borrowed.degrees, reason };
}

/**
 * Exact test of all hits together. Null where it does not apply: the reference is uncertain by more than a hundredth of
 * the binomial standard error, or the hits spread more from replicate to replicate than independent points would (a bad
 * source's doing, which is no bias).
 */
function binomialOutcome({ estimates, n, reference }: Subject): Outcome | null {
  const p = reference.value;
  const trials = n * estimates.length;
  const standardError = Math.sqrt((p * (1 - p)) / trials);
  if (reference.uncertainty > standardError / 100) return null;
  const hits = estimates.map((estimate) => Math.round(estimate * n));
  const all = sum(hits);
  const rate = all / trials;
  if (rate > 0 && rate < 1) {
    const dispersion = sum(hits.map((k) => (k - n * rate) ** 2)) / (n * rate * (1 - rate));
    if (chiSquareUpper(dispersion, estimates.length - 1) < DISPERSION_LEVEL) return null;
  }
  const pValue = binomialTwoSided(all, trials, p);
  return { kind: "binomial", pValue, bias: rate - p, standardError, degrees: Infinity, reason: null };
}

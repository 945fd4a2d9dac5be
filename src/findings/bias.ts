/**
 * Bias tests, two stages. Every problem x source x estimator x output is tested once, at its largest n.
 *
 * Stage 1, the screen, on the study's own replicates: Holm (1979) over the whole family at level sqrt(falseAlarms).
 * What it rejects is a candidate. Stage 2, the confirmation, on fresh keys with R = 256: Holm over the candidates at level
 * falseAlarms, and the bias must have the sign that it had at stage 1.
 *
 * Why this split. Given stage 1, the confirmation data are independent of the choice of candidates, so stage 2 alone
 * holds the rate of studies with any falsely confirmed bias at falseAlarms, however wrong the p-values of stage 1 may
 * be (with 64 rare payments, 0.26 expected in each of 32 replicates, 98 % of null studies have a candidate at level 0.1).
 * The agreement of signs makes stage 2 one-sided at half its level. Where all p-values are exact the rate is at most
 * sqrt(falseAlarms) * falseAlarms / 2; so the claim is "at most", and there is room for p-values that are not. A stricter
 * stage 1 would only cost power: at 144 tests, level 0.01 in place of 0.1 makes the detectable bias 18 % larger.
 *
 * Stage 2 takes the larger of Student's p-value and that of Hall's transformation, which allows for the skewness of the
 * estimates [64 rare payments as above: 3.3 % of null studies confirmed a bias by Student's t alone, 0.3 % with both].
 *
 * The independence fails where references are uncertain: both stages then share the reference's error. In such a family
 * stage 2 divides by the size of the whole family in place of the number of candidates, and the union bound holds the
 * level whatever the dependence.
 */
import { binomialTwoSided } from "../numeric/binomial.js";
import { chiSquareUpper } from "../numeric/chi-square.js";
import { skewedTwoSided } from "../numeric/comparison.js";
import { holm } from "../numeric/holm.js";
import { deviation, skewness } from "../numeric/moments.js";
import { detectableShift } from "../numeric/power.js";
import { studentTwoSided } from "../numeric/student.js";
import { mean, sum } from "../numeric/sums.js";
import type { BiasTest } from "../record/types.js";
import type { Context } from "./cells.js";
import type { KnownReference } from "./reference.js";
import { namesOf, seriesKey, type Series, type SeriesName } from "./series.js";

/** Replicates of a confirmation. */
export const CONFIRMATION_REPLICATES = 256;

/** Fewest expected hits (and misses) for a test of a probability. */
export const FEWEST_HITS = 100;

/** Below this p-value the spread of the hits contradicts independent points, and Student's t takes the binomial's place. */
const DISPERSION_LEVEL = 0.001;

/** Estimates on fresh keys for one candidate, at the n of its test. */
export interface Confirmation extends SeriesName {
  readonly n: number;
  readonly estimates: readonly number[];
}

export function screeningLevel(falseAlarms: number): number {
  return Math.sqrt(falseAlarms);
}

interface Outcome {
  readonly kind: "student" | "binomial" | "none";
  readonly pValue: number | null;
  readonly bias: number;
  readonly standardError: number;
  /** Degrees of freedom of the standard error; Infinity for the binomial. */
  readonly degrees: number;
  readonly reason: string | null;
}

interface Subject {
  readonly estimates: readonly number[];
  readonly n: number;
  /** True for a crude probability of a pseudo-random source: exact binomial counts. */
  readonly counts: boolean;
  readonly indicator: boolean;
  readonly reference: KnownReference;
}

/** Stage 1: one test per series; `candidate` marks those that need a confirmation. */
export function findCandidates(series: readonly Series[], context: Context, falseAlarms: number): BiasTest[] {
  const outcomes = series.map((one) => screen(one, context));
  const family = outcomes.filter((outcome) => outcome.kind !== "none").length;
  const adjusted = adjust(outcomes, family);
  const level = screeningLevel(falseAlarms);
  return series.map((one, i) => {
    const outcome = outcomes[i] ?? untested("not tested");
    const pValueAdjusted = adjusted[i] ?? null;
    return {
      ...namesOf(one),
      n: one.last.n,
      kind: outcome.kind,
      pValue: outcome.pValue,
      pValueAdjusted,
      detectableBias: outcome.kind === "none" ? null : detectable(outcome, one, context, family, falseAlarms),
      candidate: pValueAdjusted !== null && pValueAdjusted <= level,
      confirmation: null,
      confirmed: false,
      reason: outcome.reason,
    };
  });
}

/** Stage 2: completes the candidates' rows; a candidate without fresh estimates stays unconfirmed. */
export function confirmCandidates(
  tests: readonly BiasTest[],
  confirmations: readonly Confirmation[],
  series: readonly Series[],
  context: Context,
  falseAlarms: number,
): BiasTest[] {
  const fresh = new Map(confirmations.map((one) => [seriesKey(one), one]));
  const origins = new Map(series.map((one) => [seriesKey(one), one]));
  const candidates = tests.filter((test) => test.candidate);
  const tested = tests.filter((test) => test.kind !== "none");
  const shared = tested.some((test) => (context.references.get(test.problem)?.uncertainty ?? 0) > 0);
  const outcomes = candidates.map((test): Outcome => {
    const origin = origins.get(seriesKey(test));
    const again = fresh.get(seriesKey(test));
    const subject = origin === undefined ? null : subjectOf(origin, context);
    if (again === undefined || subject === null) return untested("not confirmed: the study stopped before");
    return examine({ ...subject, estimates: again.estimates, n: again.n }, true);
  });
  const adjusted = adjust(outcomes, shared ? tested.length : candidates.length);
  return tests.map((test) => {
    const at = candidates.indexOf(test);
    const outcome = outcomes[at];
    const again = fresh.get(seriesKey(test));
    if (outcome === undefined) return test;
    if (again === undefined || outcome.pValue === null) return { ...test, reason: outcome.reason };
    const before = origins.get(seriesKey(test))?.last.bias ?? NaN;
    const sameSign = Math.sign(outcome.bias) === Math.sign(before);
    return {
      ...test,
      confirmation: {
        replicates: again.estimates.length,
        estimates: again.estimates,
        bias: outcome.bias,
        standardError: outcome.standardError,
        pValue: outcome.pValue,
      },
      confirmed: sameSign && (adjusted[at] ?? 1) <= falseAlarms,
    };
  });
}

function untested(reason: string): Outcome {
  return { kind: "none", pValue: null, bias: NaN, standardError: NaN, degrees: NaN, reason };
}

/** Holm over the outcomes that have a p-value, in a family of `family` tests. */
function adjust(outcomes: readonly Outcome[], family: number): (number | null)[] {
  const known = outcomes.flatMap((outcome) => (outcome.pValue === null ? [] : [outcome.pValue]));
  const values = holm(known, Math.max(family, known.length));
  let next = 0;
  return outcomes.map((outcome) => (outcome.pValue === null ? null : (values[next++] ?? null)));
}

function subjectOf(series: Series, context: Context): Subject | null {
  const { last } = series;
  const reference = context.references.get(series.problem);
  if (reference === undefined) return null;
  const family = context.sources.get(series.source)?.family;
  const counts = last.indicator && series.estimator === "crude" && family === "pseudo-random";
  return { estimates: last.estimates, n: last.n, counts, indicator: last.indicator, reference };
}

function screen(series: Series, context: Context): Outcome {
  const { last } = series;
  if (context.sources.get(series.source)?.deterministic === true) {
    return untested("deterministic source: one error, no error bar");
  }
  const subject = subjectOf(series, context);
  if (subject === null) return untested("no reference value");
  if (last.mean === null) return untested("non-finite values of the integrand");
  if (last.replicates < 2) return untested("one replicate: no error bar");
  return examine(subject, false);
}

function examine(subject: Subject, confirming: boolean): Outcome {
  const { estimates, n, reference, indicator } = subject;
  if (!estimates.every(Number.isFinite)) return untested("non-finite values of the integrand");
  const trials = n * estimates.length;
  const expected = Math.min(reference.value, 1 - reference.value) * trials;
  if (indicator && !(expected >= FEWEST_HITS)) {
    return untested(
      `${Math.max(0, expected).toPrecision(2)} hits or misses expected, fewer than ${FEWEST_HITS}`,
    );
  }
  const spread = deviation(estimates);
  const rounding = Number.EPSILON * Math.max(Math.abs(reference.value), Math.abs(mean(estimates)));
  if (!(spread > 16 * rounding)) return untested("all replicates gave the same value");
  const binomial = subject.counts ? binomialOutcome(subject) : null;
  if (binomial !== null) return binomial;
  // The reference as a double and the integrand's last places are uncertain by some units of rounding themselves.
  const uncertainty = Math.hypot(reference.uncertainty, 4 * rounding);
  const standardError = Math.hypot(spread / Math.sqrt(estimates.length), uncertainty);
  const degrees = estimates.length - 1;
  const bias = mean(estimates) - reference.value;
  const t = bias / standardError;
  const plain = studentTwoSided(t, degrees);
  const pValue = confirming
    ? Math.max(plain, skewedTwoSided(t, skewness(estimates), estimates.length))
    : plain;
  return { kind: "student", pValue, bias, standardError, degrees, reason: null };
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

/** Smallest bias found with 80 % power by both stages, at the most severe step of Holm's procedure. */
function detectable(
  outcome: Outcome,
  series: Series,
  context: Context,
  family: number,
  falseAlarms: number,
): number {
  const uncertainty = context.references.get(series.problem)?.uncertainty ?? 0;
  const first = detectableShift(outcome.standardError, screeningLevel(falseAlarms) / family, outcome.degrees);
  const sampling = Math.sqrt(Math.max(0, outcome.standardError ** 2 - uncertainty ** 2));
  const shrink = Math.sqrt(series.last.replicates / CONFIRMATION_REPLICATES);
  const later = Math.hypot(sampling * shrink, uncertainty);
  const degrees = outcome.kind === "binomial" ? Infinity : CONFIRMATION_REPLICATES - 1;
  return Math.max(first, detectableShift(later, falseAlarms / family, degrees));
}

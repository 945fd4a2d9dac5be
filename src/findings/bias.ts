/**
 * Bias tests, two stages. Every problem x source x estimator x output is tested once, at its largest n. They are one
 * family with the tests of spread (family.ts), which takes the same two stages.
 *
 * Stage 1, the screen, on the study's own replicates: Holm (1979) over the whole family at level sqrt(falseAlarms).
 * What it rejects is a candidate. Stage 2, the confirmation, on fresh keys with R = 256: Holm over the candidates at the
 * share of level falseAlarms that the tests of bias have in the family, and the bias must have the sign of stage 1.
 *
 * Why this split. Given stage 1, the confirmation data are independent of the choice of candidates, so stage 2 alone
 * holds the rate of studies with any falsely confirmed bias at falseAlarms, however wrong the p-values of stage 1 may
 * be (with 64 rare payments, 0.26 expected in each of 32 replicates, 99 % of null studies have a candidate at level 0.1).
 * The agreement of signs makes stage 2 one-sided at half its level. Where all p-values are exact the rate is at most
 * sqrt(falseAlarms) * falseAlarms / 2; so the claim is "at most", and there is room for p-values that are not. A stricter
 * stage 1 would only cost power: at 144 tests, level 0.01 in place of 0.1 makes the detectable bias 18 % larger.
 *
 * Stage 2 takes the larger of Student's p-value and that of Hall's transformation, which allows for the skewness of the
 * estimates [64 rare payments as above: 3.3 % of null studies confirmed a bias by Student's t alone, 0.3 % or fewer with both].
 *
 * A source whose replicates all gave the same wrong value (an integrand in step with its lattice) has no deviation of its
 * own. What is tested then is that it behaves as a sound source does: the deviation of one on the same problem takes the
 * place of s. Where both show no deviation, or the value is right to rounding, there is no test.
 *
 * The independence fails where references are uncertain: both stages then share the reference's error. In such a family
 * stage 2 divides by the size of the whole family in place of the number of candidates, and the union bound holds the
 * level whatever the dependence.
 */
import { holm } from "../numeric/holm.js";
import { detectableShift } from "../numeric/power.js";
import type { BiasTest } from "../record/types.js";
import { examine, untested, type Borrowed, type Outcome, type Subject } from "./bias-outcome.js";
import { isRounding, type Context } from "./cells.js";
import { namesOf, seriesKey, type Series, type SeriesName } from "./series.js";

/** Replicates of a confirmation. */
export const CONFIRMATION_REPLICATES = 256;

/** Estimates on fresh keys for one candidate, at the n of its test, and their variances within replicates. */
export interface Confirmation extends SeriesName {
  readonly n: number;
  readonly estimates: readonly number[];
  readonly withinVariances?: readonly (number | null)[];
}

export function screeningLevel(falseAlarms: number): number {
  return Math.sqrt(falseAlarms);
}

/** The outcome of stage 1 for each series, before it is held against the others. */
export function screenBiases(series: readonly Series[], context: Context): Outcome[] {
  return series.map((one) => screen(one, series, context));
}

/** Stage 1: one row per series; `adjusted` are the p-values of `outcomes` in a family of `family` tests. */
export function biasRows(
  series: readonly Series[],
  outcomes: readonly Outcome[],
  adjusted: readonly (number | null)[],
  family: number,
  context: Context,
  falseAlarms: number,
): BiasTest[] {
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

/** Stage 2 at `level`: completes the candidates' rows; a candidate without fresh estimates stays unconfirmed. */
export function confirmCandidates(
  tests: readonly BiasTest[],
  confirmations: readonly Confirmation[],
  series: readonly Series[],
  context: Context,
  level: number,
): BiasTest[] {
  const fresh = new Map(confirmations.map((one) => [seriesKey(one), one]));
  const origins = new Map(series.map((one) => [seriesKey(one), one]));
  const candidates = tests.filter((test) => test.candidate);
  const tested = tests.filter((test) => test.kind !== "none");
  const shared = tested.some((test) => (context.references.get(test.problem)?.uncertainty ?? 0) > 0);
  const outcomes = candidates.map((test): Outcome => {
    const origin = origins.get(seriesKey(test));
    const again = fresh.get(seriesKey(test));
    const subject = origin === undefined ? null : subjectOf(origin, series, context);
    if (again === undefined || subject === null)
      return untested("not confirmed: there are no fresh replicates");
    return examine({ ...subject, estimates: again.estimates, n: again.n }, true);
  });
  const adjusted = adjustTogether(
    outcomes.map((outcome) => outcome.pValue),
    shared ? tested.length : candidates.length,
  );
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
      reason: outcome.reason ?? test.reason,
      confirmed: sameSign && (adjusted[at] ?? 1) <= level,
    };
  });
}

/** Holm over the p-values that there are, in a family of `family` tests. */
export function adjustTogether(pValues: readonly (number | null)[], family: number): (number | null)[] {
  const known = pValues.filter((value) => value !== null);
  const values = holm(known, Math.max(family, known.length));
  let next = 0;
  return pValues.map((value) => (value === null ? null : (values[next++] ?? null)));
}

function subjectOf(one: Series, series: readonly Series[], context: Context): Subject | null {
  const { last } = one;
  const reference = context.references.get(one.problem);
  if (reference === undefined) return null;
  const family = context.sources.get(one.source)?.family;
  const counts = last.indicator && one.estimator === "crude" && family === "pseudo-random";
  const { estimates, n, indicator, finiteBias } = last;
  const borrowed = borrowedFor(one, series, context);
  const subject = { estimates, n, counts, indicator, reference, borrowed };
  return finiteBias === undefined ? subject : { ...subject, finiteBias };
}

/** The deviation that a sound pseudo-random source shows on the same problem, carried to the same n by n^-1/2. */
function borrowedFor(one: Series, series: readonly Series[], context: Context): Borrowed | null {
  const lenders = series.filter((other) => {
    const source = context.sources.get(other.source);
    const same = seriesKey({ ...other, source: one.source }) === seriesKey(one);
    const sound = source?.family === "pseudo-random" && source.knownStructure === null;
    return same && sound && other.source !== one.source && !isRounding(other.last);
  });
  const [best] = lenders.sort((a, b) => b.last.n * b.last.replicates - a.last.n * a.last.replicates);
  const spread = best?.last.replicateDeviation ?? null;
  if (best === undefined || spread === null) return null;
  const deviation = spread * Math.sqrt(best.last.n / one.last.n);
  return { source: best.source, deviation, degrees: best.last.replicates - 1 };
}

function screen(one: Series, series: readonly Series[], context: Context): Outcome {
  if (context.sources.get(one.source)?.deterministic === true) {
    return untested("deterministic source: one error, no error bar");
  }
  const divergent = context.divergent.get(one.problem);
  if (divergent !== undefined) return untested(divergent);
  const subject = subjectOf(one, series, context);
  if (subject === null) return untested("no reference value");
  if (one.last.mean === null) return untested("non-finite values of the integrand");
  if (one.last.replicates < 2) return untested("one replicate: no error bar");
  return examine(subject, false);
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

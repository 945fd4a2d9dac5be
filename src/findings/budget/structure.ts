/**
 * The budget's line for the structure of the source: a bound on the bias that the source itself brings.
 *
 * - A confirmed bias: |b| + t sqrt(s^2/R + u^2) from the confirmation's fresh replicates, and as its lower limit the same
 *   with a minus sign.
 * - The same bias where the structure of the source explains it and predicts it more sharply: the limits of the prediction.
 * - A randomisation that makes every single point uniform makes the mean exactly unbiased: 0, "theorem, implementation
 *   checked", where "checked" is the bias test of this study. The tests that could have contradicted it are named.
 * - Otherwise the same upper limit from the best-resolved estimate at hand. For a sound pseudo-random source that bound is
 *   the noise of the study alone, |b| + t s/sqrt(R), about (0.14 + 0.49) s at R = 32 and 99 %: always smaller than the
 *   sampling line of the same n, and smaller the more replicates there are. It says what the study could not exclude, so
 *   its lower limit is 0 and it can make a verdict `undecided`, never `outside`.
 */
import { studentFactor } from "../../numeric/student.js";
import type { BiasTest, RecordSource } from "../../record/types.js";
import type { Context } from "../cells.js";
import { beyond, rangeAt } from "../finite-bias.js";
import { formatCount, formatPercent, formatValue } from "../format.js";
import { seriesKey, type Series } from "../series.js";
import type { Line, LineMaker } from "./line.js";

export interface StructureLine extends Line {
  readonly confirmed: boolean;
}

const ANOTHER = "another source: this bias stays at any number of points";
const MORE = "more replicates: the bias is not resolved";

/** Randomisations under which each point, taken alone, is uniform on the unit cube; the paper that proves it. */
const UNBIASED: Readonly<Record<string, string>> = {
  shift: "Cranley & Patterson 1976",
  "digital-shift": "Owen 2003",
  linear: "Matoušek 1998",
  owen: "Owen 1995",
  permuted: "Owen 2017",
};

/** The theorem by which the mean is exactly unbiased; null where none applies. */
export function unbiasedBy(source: RecordSource | undefined): string | null {
  for (const name of source?.randomisations ?? []) {
    const paper = UNBIASED[name];
    if (paper !== undefined) return `${name}: every point is uniform, ${paper}`;
  }
  return null;
}

export function structureLine(
  series: Series,
  test: BiasTest | undefined,
  context: Context,
  confidence: number,
): StructureLine {
  const line = { line: "source structure", kind: "bias" } as const;
  const found = test?.confirmation ?? null;
  if (test?.confirmed === true && found !== null) {
    const half = studentFactor(confidence, found.replicates - 1) * found.standardError;
    const size = Math.abs(beyond(found.bias, series.last.finiteBias));
    const [value, lower] = [size + half, Math.max(0, size - half)];
    const predicted = sharperPrediction(series, context, value - lower, confidence);
    if (predicted !== null) return { ...line, ...predicted, confirmed: true, remedy: ANOTHER };
    const basis =
      `confirmed bias ${formatValue(found.bias, found.standardError)} ` +
      `(standard error ${formatValue(found.standardError)}) on ${found.replicates} fresh replicates ` +
      `of ${formatCount(test.n)} points`;
    return { ...line, value, interval: [lower, value], lower, confirmed: true, basis, remedy: ANOTHER };
  }
  const theorem = unbiasedBy(context.sources.get(series.source));
  if (theorem !== null) {
    const basis = `theorem (${theorem}), ${checkOf(test)}`;
    return { ...line, value: 0, interval: null, lower: 0, confirmed: false, basis, remedy: null };
  }
  const best = bestResolved(series, test);
  if (best === null) {
    const basis = `not assessed: ${test?.reason ?? "no reference value or no error bar"}`;
    return { ...line, value: null, interval: null, lower: 0, confirmed: false, basis, remedy: MORE };
  }
  const value = Math.abs(best.bias) + studentFactor(confidence, best.replicates - 1) * best.error;
  const basis =
    `no bias confirmed; upper limit of |bias| from ${best.replicates} replicates of ` +
    `${formatCount(best.n)} points, the resolution of this study`;
  return { ...line, value, interval: [0, value], lower: 0, confirmed: false, basis, remedy: MORE };
}

/** The limits of an explained bias's prediction, where they lie closer together than `width`. */
function sharperPrediction(series: Series, context: Context, width: number, confidence: number) {
  const explanation = context.explanations.get(seriesKey(series));
  const predicted = explanation?.explained === true ? explanation.predicted : null;
  if (predicted === null || predicted.confidence < confidence) return null;
  const ends = predicted.interval.map(Math.abs);
  const [lower, value] = [Math.min(...ends), Math.max(...ends)];
  if (!(value - lower < width)) return null;
  const basis =
    `predicted from the structure of the source: ${formatValue(predicted.value, predicted.standardError)} ` +
    `(${formatPercent(predicted.confidence)} interval), sharper than the confirmed bias, which it explains`;
  return { value, interval: [lower, value] as const, lower, basis };
}

function checkOf(test: BiasTest | undefined): string {
  if (test === undefined || test.detectableBias === null) {
    return `implementation not checked here: ${test?.reason ?? "no test"}`;
  }
  return `implementation checked: no bias found, ${formatValue(test.detectableBias)} would have been with 80 % power`;
}

/** The estimate of the bias with the smallest standard error: by that and not by its bound, which would be a selection. */
function bestResolved(series: Series, test: BiasTest | undefined) {
  const choices = series.cells.flatMap(({ n, replicates, bias, biasStandardError: error }) =>
    bias === null || error === null
      ? []
      : [{ n, replicates, bias: beyond(bias, rangeAt(series.last, n)), error }],
  );
  const again = test?.confirmation ?? null;
  if (test !== undefined && again !== null) {
    const bias = beyond(again.bias, rangeAt(series.last, test.n));
    choices.push({ n: test.n, replicates: again.replicates, bias, error: again.standardError });
  }
  choices.sort((a, b) => a.error - b.error || b.n - a.n);
  return choices[0] ?? null;
}

export const structureBudgetLine: LineMaker = ({ series, test, context, confidence }) => [
  structureLine(series, test, context, confidence),
];

/**
 * The budget's line for the structure of the source: a bound on the bias that the source itself brings.
 *
 * - A confirmed bias: |b| + t sqrt(s^2/R + u^2) from the confirmation's fresh replicates, and as its lower limit the same
 *   with a minus sign.
 * - A randomisation that makes every single point uniform makes the mean exactly unbiased: 0, "theorem, implementation
 *   checked", where "checked" is the bias test of this study. The tests that could have contradicted it are named.
 * - Otherwise the same upper limit from the best-resolved estimate at hand. For a sound pseudo-random source that bound is
 *   the noise of the study alone, |b| + t s/sqrt(R), about (0.14 + 0.49) s at R = 32 and 99 %: always smaller than the
 *   sampling line of the same n, and smaller the more replicates there are. It says what the study could not exclude, so
 *   its lower limit is 0 and it can make a verdict `undecided`, never `outside`.
 */
import { studentFactor } from "../numeric/student.js";
import type { BiasTest, BudgetLine, RecordSource } from "../record/types.js";
import type { Context } from "./cells.js";
import { formatCount, formatValue } from "./format.js";
import type { Series } from "./series.js";

export interface StructureLine extends BudgetLine {
  /** Lower limit of the bias: above 0 only for a confirmed one. */
  readonly lower: number;
  readonly confirmed: boolean;
}

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
    const [value, lower] = [Math.abs(found.bias) + half, Math.max(0, Math.abs(found.bias) - half)];
    const basis =
      `confirmed bias ${formatValue(found.bias, found.standardError)} ` +
      `(standard error ${formatValue(found.standardError)}) on ${found.replicates} fresh replicates ` +
      `of ${formatCount(test.n)} points`;
    return { ...line, value, interval: [lower, value], lower, confirmed: true, basis };
  }
  const theorem = unbiasedBy(context.sources.get(series.source));
  if (theorem !== null) {
    const basis = `theorem (${theorem}), ${checkOf(test)}`;
    return { ...line, value: 0, interval: null, lower: 0, confirmed: false, basis };
  }
  const best = bestResolved(series, test);
  if (best === null) {
    const basis = `not assessed: ${test?.reason ?? "no reference value or no error bar"}`;
    return { ...line, value: null, interval: null, lower: 0, confirmed: false, basis };
  }
  const value = Math.abs(best.bias) + studentFactor(confidence, best.replicates - 1) * best.error;
  const basis =
    `no bias confirmed; upper limit of |bias| from ${best.replicates} replicates of ` +
    `${formatCount(best.n)} points, the resolution of this study`;
  return { ...line, value, interval: [0, value], lower: 0, confirmed: false, basis };
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
    bias === null || error === null ? [] : [{ n, replicates, bias, error }],
  );
  const again = test?.confirmation ?? null;
  if (test !== undefined && again !== null) {
    choices.push({ n: test.n, replicates: again.replicates, bias: again.bias, error: again.standardError });
  }
  choices.sort((a, b) => a.error - b.error || b.n - a.n);
  return choices[0] ?? null;
}

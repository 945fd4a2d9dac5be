/**
 * Stopping at the tolerance: a study looks at growing sizes and stops a source where its budget says `within`. Looking J
 * times and stopping at the first success claims too much at the confidence of one look, so each look is held to
 * 1 - (1 - confidence) / J: by Bonferroni's inequality (O. J. Dunn, "Multiple comparisons among means", Journal of the
 * American Statistical Association 56 (1961) 52-64) the chance that any look passes while a run of its n misses the tolerance
 * is then at most 1 - confidence, however the looks depend on one another. J is the number of sizes declared, whether or
 * not all are looked at. Group-sequential boundaries would be sharper, but need the joint law of the looks, which quasi-random
 * sources do not have.
 */
import type { Problem } from "../problem/contract.js";
import type { ProblemMeasurements } from "../record/measurements.js";
import type { Consensus, RawCell, RecordSource, Stop, StudySpec } from "../record/types.js";
import { budgetOf } from "./budget/total.js";
import { toCells } from "./cells.js";
import { makeContext } from "./context.js";
import { formatCount, formatPercent } from "./format.js";
import { seriesOf } from "./series.js";

/** The confidence of each of `looks` looks. */
export function lookConfidence(confidence: number, looks: number): number {
  return 1 - (1 - confidence) / looks;
}

/** The problems with the confidence that each look is held to; as they are where a study does not stop early. */
export function judgedProblems(spec: StudySpec, problems: readonly Problem[]): readonly Problem[] {
  if (spec.until === undefined) return problems;
  return problems.map((problem) => {
    const looks = spec.sizes[problem.id]?.length ?? 1;
    const confidence = lookConfidence(problem.tolerance.confidence, Math.max(1, looks));
    return { ...problem, tolerance: { ...problem.tolerance, confidence } };
  });
}

export interface Looked {
  readonly spec: StudySpec;
  readonly problems: readonly Problem[];
  readonly sources: readonly RecordSource[];
  readonly rawCells: readonly RawCell[];
  readonly consensus: readonly Consensus[];
  readonly measurements: readonly ProblemMeasurements[];
}

/** Text that tells pairs apart. */
export function pairKey({ problem, source }: { readonly problem: string; readonly source: string }): string {
  return JSON.stringify([problem, source]);
}

/** The pairs of problem and source (as `pairKey`) whose budgets at their largest n all say `within`. */
export function insidePairs(looked: Looked): ReadonlySet<string> {
  const { spec, sources, rawCells, consensus, measurements } = looked;
  const problems = judgedProblems(spec, looked.problems);
  const context = makeContext(problems, sources, consensus, [], measurements, rawCells);
  const inside = new Map<string, boolean>();
  for (const series of seriesOf(toCells(rawCells, context, false))) {
    const within = budgetOf(series, undefined, context)?.verdict === "within";
    inside.set(pairKey(series), (inside.get(pairKey(series)) ?? true) && within);
  }
  return new Set([...inside].flatMap(([key, within]) => (within ? [key] : [])));
}

/** Where each pair stopped, in whole sentences: inside the tolerance, or at the limit of points without it. */
export function stopSentences(stops: readonly Stop[], spec: StudySpec): string[] {
  return stops.map(({ problem, source, n, look, looks, inside }) => {
    const given = spec.problems.find(({ id }) => id === problem)?.tolerance.confidence ?? NaN;
    const where = `${problem}, ${source}`;
    return inside
      ? `${where}: stopped inside the tolerance at ${formatCount(n)} points, look ${look} of ${looks}; each look is held to ` +
          `${formatPercent(Number(lookConfidence(given, looks).toPrecision(6)))}, so that all together keep ${formatPercent(given)}.`
      : `${where}: not shown to be inside the tolerance when the limit of ${formatCount(n)} points came (${look} looks); ` +
          "more points (--sizes) or replicates may do.";
  });
}

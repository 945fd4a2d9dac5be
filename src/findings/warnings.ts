/** What a reader must know beside the figures, in words. */
import type { Cell, Consensus, RecordSource } from "../record/types.js";
import type { Problem } from "../problem/contract.js";
import { formatCount, formatPValue, formatValue } from "./format.js";
import { HEAVY_TAIL, type Context } from "./cells.js";
import { seriesKey, type Series } from "./series.js";

/** Two replicates share their points with probability about R^2 / (2 states); above this it is said. */
const COINCIDENCE = 1e-6;

export function warningsOf(
  series: readonly Series[],
  consensus: readonly Consensus[],
  context: Context,
): string[] {
  const warnings = new Set<string>();
  for (const { problem, agreed, members, pValue } of consensus) {
    if (!agreed) warnings.add(disagreement(problem, members, pValue));
  }
  for (const [problem, why] of context.divergent) warnings.add(`${problem}: ${why}`);
  for (const { problem, tail } of context.measurements.values()) {
    if (tail?.constant === true)
      warnings.add(
        `${problem}: the integrand had one value at all of ${formatCount(tail.points)} points; if it is constant there is nothing to integrate`,
      );
  }
  for (const one of series) {
    const source = context.sources.get(one.source);
    const problem = context.problems.get(one.problem);
    if (source === undefined || problem === undefined) continue;
    for (const text of sourceWarnings(source, problem, one.last)) warnings.add(text);
    const broken = one.cells.find((cell) => cell.nonFinite !== null);
    if (broken !== undefined) warnings.add(nonFiniteWarning(broken));
    const { replicates, replicateDeviation } = one.last;
    const constant = context.measurements.get(one.problem)?.tail?.constant === true;
    if (replicates > 1 && replicateDeviation === 0 && !constant) {
      warnings.add(
        `${one.problem}, ${one.source}: all ${formatCount(replicates)} replicates gave the same value at ` +
          `${formatCount(one.last.n)} points; their deviation says nothing of the error`,
      );
    }
    if (one.last.heavyTailed && context.divergent.has(one.problem) !== true) {
      warnings.add(
        `${one.problem}, ${one.source}: errors are heavy-tailed (sample kurtosis above ${HEAVY_TAIL} at ` +
          `${formatCount(one.last.n)} points); their deviation is a lower bound only`,
      );
    }
  }
  return [...warnings];
}

function disagreement(problem: string, members: Consensus["members"], pValue: number): string {
  const values = members.map(
    (one) =>
      `${one.source} ${formatValue(one.mean, one.standardError)} \u00b1 ${formatValue(one.standardError)}`,
  );
  const why = Number.isNaN(pValue) ? "not enough usable estimates" : `p = ${formatPValue(pValue)}`;
  return (
    `${problem}: no reference: the sources of the consensus do not agree (${why}; standard errors: ` +
    `${values.join(", ")}); give a reference in the problem file`
  );
}

function sourceWarnings(source: RecordSource, problem: Problem, last: Cell): string[] {
  const texts: string[] = [];
  if (source.deterministic) {
    texts.push(`${source.id}: deterministic source: no error bar`);
    const normal = problem.inputs.some((input) => input.distribution === "normal");
    if (normal && source.method === "digital net") {
      texts.push(
        `${problem.id}, ${source.id}: an unscrambled net on normal inputs puts its first point near z = \u22128 in ` +
          "every coordinate; use a scrambled one",
      );
    }
  }
  if (source.repeatable === false) {
    texts.push(`${source.id}: cannot be repeated: another run has other points`);
  }
  const replicates = last.replicates;
  if (source.family === "pseudo-random" && source.period !== null && !source.deterministic) {
    const coincidences = (replicates * (replicates - 1)) / 2 / Number(source.period);
    if (replicates ** 2 / Number(source.period) >= COINCIDENCE) {
      texts.push(
        `${source.id}: ${formatCount(replicates)} replicates among ${formatCount(Number(source.period))} states: ` +
          `${formatValue(coincidences)} pairs with the same points are expected`,
      );
    }
  }
  return texts;
}

function nonFiniteWarning(cell: Cell): string {
  const { problem, source, n, nonFinite } = cell;
  if (nonFinite === null) return seriesKey(cell);
  const { count, first } = nonFinite;
  const inputs = first.inputs.slice(0, 8).map((value) => String(value));
  if (first.inputs.length > inputs.length) inputs.push("\u2026");
  return (
    `${problem}, ${source}: ${formatCount(count)} values are not finite at ${formatCount(n)} points; the first is ` +
    `${first.value} at replicate ${first.replicate}, point ${first.index}, inputs ${inputs.join(", ")}`
  );
}

/** The verdicts of a subject in words: the same cells for the terminal, the summary and the page. */
import type { Budget, Convergence } from "../record/types.js";
import { VERDICT_SHAPES, VERDICT_WORDS } from "./look.js";
import {
  duration,
  orDash,
  percentage,
  plainNumber,
  rounded,
  roughNumber,
  wholeNumber,
  withUncertainty,
} from "./numbers.js";
import type { Row, Subject } from "./view.js";

export interface VerdictRow {
  readonly row: Row;
  readonly shape: string;
  readonly word: string;
  readonly n: string;
  readonly total: string;
  readonly largestLine: string;
  readonly reach: string;
  readonly cost: string;
  /** Why there is no verdict or an undecided one; empty otherwise. */
  readonly reason: string;
}

/** n to tolerance in words: `8,192`, `≈ 2.0 million` where extrapolated, `never`, or `–` where it is not known. */
export function reachWords(convergence: Convergence | null): string {
  if (convergence === null) return "–";
  if (convergence.never) return "never";
  const reach = convergence.reach;
  if (reach === null) return "–";
  return reach.extrapolated ? roughNumber(reach.n) : wholeNumber(reach.n);
}

/** The total error of a budget with the digits that its interval supports. */
export function totalWords(budget: Budget | null): string {
  if (budget === null || budget.total === null) return "–";
  const interval = budget.totalInterval;
  const half = interval === null ? null : (interval[1] - interval[0]) / 2;
  return half !== null && half > 0 ? withUncertainty(budget.total, half) : rounded(budget.total, 2);
}

/** How sources are ranked: by cost to tolerance, then by n, then those that never reach it, then those without a row. */
export function ranked(rows: readonly Row[]): Row[] {
  const place = (row: Row): [number, number] => {
    const c = row.convergence;
    if (c !== null && !c.never && c.reach !== null) return [c.cost === null ? 1 : 0, c.cost ?? c.reach.n];
    return [c?.never ? 3 : 2, row.budget?.total ?? Number.MAX_VALUE];
  };
  return rows
    .map((row, at) => ({ row, at, place: place(row) }))
    .sort((a, b) => a.place[0] - b.place[0] || a.place[1] - b.place[1] || a.at - b.at)
    .map(({ row }) => row);
}

/** The rows of a subject, cheapest first. */
export function verdictRows(subject: Subject): VerdictRow[] {
  return ranked(subject.rows).map((row): VerdictRow => {
    const verdict = row.budget?.verdict ?? "none";
    return {
      row,
      shape: VERDICT_SHAPES[verdict],
      word: VERDICT_WORDS[verdict],
      n: wholeNumber(row.budget?.n ?? row.last?.n ?? 0),
      total: totalWords(row.budget),
      largestLine: row.budget?.largestLine ?? "–",
      reach: reachWords(row.convergence),
      cost: row.convergence?.never === true ? "–" : orDash(row.convergence?.cost, duration),
      reason: row.budget?.reason ?? row.test?.reason ?? "",
    };
  });
}

/** What estimates are held against: `4.05174 (closed form)`. */
export function referenceWords(subject: Subject): string {
  if (subject.reference === null) return "no reference";
  const own = subject.problem.reference;
  if (own !== null) return withUncertainty(own.value, own.uncertainty > 0 ? own.uncertainty : null);
  const error = subject.consensus?.standardError ?? null;
  const members = subject.consensus?.members.length ?? 0;
  return `${withUncertainty(subject.reference, error)} (consensus of ${members} sources)`;
}

/** `tolerance ±0.01 at 99 %`. */
export function toleranceWords(subject: Subject): string {
  const { relative, to } = subject.problem.tolerance;
  if (subject.tolerance !== null)
    return `±${plainNumber(subject.tolerance, 4)} at ${percentage(subject.confidence)}`;
  if (relative !== null)
    return `${plainNumber(relative, 4)} of the ${to} at ${percentage(subject.confidence)}`;
  return "none given";
}

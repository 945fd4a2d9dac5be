/** The verdicts of a subject in words: the same cells for the terminal, the summary and the page. */
import { byEffort } from "../findings/answer.js";
import {
  formatCount,
  formatReach,
  formatPercent,
  formatSeconds,
  formatValue,
  orDash,
  plainNumber,
  withInterval,
} from "../findings/format.js";
import { VERDICT_MARKS, referenceText } from "../findings/headline.js";
import type { Budget, Convergence } from "../record/types.js";
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
}

/** n to tolerance in words: `≈ 8,200`, `≈ 2.0 million, extrapolated`, `never`, or `–` where it is not known. */
export function reachWords(convergence: Convergence | null): string {
  if (convergence === null) return "–";
  if (convergence.never) return "never";
  const { reach } = convergence;
  return reach === null ? "–" : `${formatReach(reach)}${reach.extrapolated ? ", extrapolated" : ""}`;
}

/** The total error of a budget with the digits that its interval supports. */
export function totalWords(budget: Budget | null): string {
  return orDash(budget?.total, (total) => withInterval(total, budget?.totalInterval ?? null));
}

/** Rows by cost to tolerance, then those where it is not known, then those that never reach it. */
export function ranked(rows: readonly Row[]): Row[] {
  const reaching = byEffort(rows.flatMap((row) => row.convergence ?? []));
  const known = reaching.flatMap((one) => rows.filter((row) => row.convergence === one));
  const rest = rows.filter((row) => !known.includes(row));
  const never = rest.filter((row) => row.convergence?.never === true);
  return [...known, ...rest.filter((row) => !never.includes(row)), ...never];
}

/** The rows of a subject, cheapest first. */
export function verdictRows(subject: Subject): VerdictRow[] {
  return ranked(subject.rows).map((row): VerdictRow => {
    const verdict = row.budget?.verdict ?? "none";
    return {
      row,
      shape: VERDICT_MARKS[verdict],
      word: verdict,
      n: formatCount(row.budget?.n ?? row.last?.n ?? 0),
      total: totalWords(row.budget),
      largestLine: row.budget?.largestLine ?? "–",
      reach: reachWords(row.convergence),
      cost: row.convergence?.never === true ? "–" : orDash(row.convergence?.cost, formatSeconds),
    };
  });
}

/** What estimates are held against: `4.05174`, or with a consensus `6.0519 (consensus of 3 sources)`. */
export function referenceWords(subject: Subject): string {
  const { reference, consensus } = subject;
  if (reference === null) return "not known";
  const text = referenceText(reference.value, reference.uncertainty);
  const members = consensus?.members.length ?? 0;
  return reference.consensus ? `${text} (consensus of ${formatCount(members)} sources)` : text;
}

/** `±0.01 at 99 %`. */
export function toleranceWords(subject: Subject): string {
  const confidence = formatPercent(subject.confidence);
  if (subject.tolerance !== null) return `±${plainNumber(subject.tolerance, 3)} at ${confidence}`;
  const { relative, to } = subject.problem.tolerance;
  return `${formatValue(relative ?? NaN)} of the ${to}, which is not known, at ${confidence}`;
}

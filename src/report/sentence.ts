/** The answer of a subject in one sentence. */
import { duration, plainNumber, percentage, roughNumber, rounded, wholeNumber } from "./numbers.js";
import { listed } from "./charts/chart.js";
import { ranked } from "./verdict-row.js";
import type { Row, Subject } from "./view.js";

function needs(row: Row): string {
  const reach = row.convergence?.reach;
  if (!reach) return "";
  const n = reach.extrapolated ? roughNumber(reach.n) : wholeNumber(reach.n);
  const cost = row.convergence?.cost;
  return `${n} points${typeof cost !== "number" ? "" : ` (${duration(cost)})`}`;
}

/** What the record says of the subject, in a sentence. */
export function sentenceFor(subject: Subject): string {
  if (subject.tolerance === null) return "No tolerance is known, so nothing is judged.";
  const goal = `inside ±${plainNumber(subject.tolerance, 4)} at ${percentage(subject.confidence)}`;
  const rows = ranked(subject.rows);
  const reaching = rows.filter((row) => needs(row) !== "" && row.convergence?.never !== true);
  const never = rows.filter((row) => row.convergence?.never === true);
  const [best, ...others] = reaching;
  const parts: string[] = [];
  if (best === undefined) parts.push(`No source is known to stay ${goal}`);
  else parts.push(`${best.label} stays ${goal} with ${needs(best)}`);
  const dearest = others[others.length - 1];
  if (dearest !== undefined) parts.push(`${dearest.label} needs ${needs(dearest)}`);
  for (const row of never.slice(0, 2)) {
    const bias = row.test?.confirmed === true ? row.last?.bias : null;
    parts.push(
      `${row.label} never does${typeof bias !== "number" ? "" : `: it is off by ${rounded(bias)} whatever n`}`,
    );
  }
  if (never.length > 2) parts.push(`nor do ${listed(never.slice(2).map((row) => row.label))}`);
  return `${parts.join("; ")}.`;
}

/** The verdict on what is in use, in a sentence; empty where nothing is stated to be in use. */
export function inUseSentence(subject: Subject): string {
  const budget = subject.inUse;
  if (budget === null) return "";
  const total =
    budget.total === null
      ? ""
      : ` (${rounded(budget.total)}${budget.tolerance === null ? "" : ` against ${plainNumber(budget.tolerance, 4)}`})`;
  return `In use: ${budget.source}, ${wholeNumber(budget.n)} points: ${budget.verdict}${total}.`;
}

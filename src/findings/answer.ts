/** The answer for one problem in one sentence: what reaches its tolerance, at what effort, and what never does. */
import type { Problem } from "../problem/contract.js";
import type { Convergence, StudyRecord } from "../record/types.js";
import { formatCount, formatPercent, formatSeconds, formatValue } from "./format.js";
import { formatReach } from "./headline.js";
import { referencesOf, toleranceOf } from "./reference.js";
import { seriesKey } from "./series.js";

/** Names that are given in full; the others are counted. */
const NAMED = 3;

function effort(one: Convergence): string {
  if (one.reach === null) return "";
  const notes = [
    ...(one.cost === null ? [] : [formatSeconds(one.cost)]),
    ...(one.reach.extrapolated ? ["extrapolated"] : []),
  ];
  return `${formatReach(one.reach)} points${notes.length === 0 ? "" : ` (${notes.join(", ")})`}`;
}

function names(all: readonly Convergence[]): string {
  const texts = all.map((one) => one.source);
  if (texts.length > NAMED) return `${texts.slice(0, NAMED).join(", ")} and ${texts.length - NAMED} more`;
  return texts.length < 2 ? texts.join("") : `${texts.slice(0, -1).join(", ")} and ${texts.at(-1) ?? ""}`;
}

/** By cost, then by n: those that reach the tolerance. */
export function byEffort(all: readonly Convergence[]): Convergence[] {
  const reaching = all.filter((one) => one.reach !== null && !one.never);
  const cost = (one: Convergence): number => one.cost ?? Infinity;
  const compared = (a: Convergence, b: Convergence): number =>
    cost(a) === cost(b) ? (a.reach?.n ?? 0) - (b.reach?.n ?? 0) : cost(a) - cost(b);
  return reaching.sort(compared);
}

/** The sentence for one problem and output of `record`. */
export function answerOf(problem: Problem, output: string, record: StudyRecord): string {
  const tolerance = toleranceOf(problem, referencesOf([problem], record.consensus).get(problem.id));
  if (tolerance === null)
    return "The tolerance is not known, because there is no reference; nothing is judged.";
  const held = `\u00b1${String(Number(tolerance.toPrecision(3)))} at ${formatPercent(problem.tolerance.confidence)}`;
  const here = record.convergence.filter((one) => one.problem === problem.id && one.output === output);
  const [best, ...others] = byEffort(here);
  const never = here.filter((one) => one.never);
  const parts: string[] = [];
  if (best === undefined) parts.push(`No source is known to stay inside ${held}`);
  else parts.push(`${best.source} stays inside ${held} with ${effort(best)}`);
  const dearest = others.at(-1);
  if (dearest !== undefined) parts.push(`${dearest.source} needs ${effort(dearest)}`);
  const first = never[0];
  if (first !== undefined) {
    const test = record.tests.find((one) => seriesKey(one) === seriesKey(first));
    const found = test?.confirmed === true ? test.confirmation : null;
    const off =
      never.length === 1 && found !== null
        ? `: it is off by ${formatValue(found.bias, found.standardError)} whatever n`
        : "";
    parts.push(`${names(never)} never ${never.length === 1 ? "does" : "do"}${off}`);
  }
  const judged = record.budgets.filter(
    (one) => one.problem === problem.id && one.output === output && !one.inUse,
  );
  const undecided = judged.filter((one) => one.verdict === "undecided").length;
  if (undecided > 0)
    parts.push(`${formatCount(undecided)} of ${formatCount(judged.length)} verdicts undecided`);
  return `${parts.join("; ")}.`;
}

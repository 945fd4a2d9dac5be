/** The answer for one problem in one sentence: what reaches its tolerance, at what effort, and what never does. */
import type { Problem } from "../problem/contract.js";
import type { Explanation } from "../record/explanation.js";
import type { Convergence, StudyRecord } from "../record/types.js";
import { planesText, vectorText } from "./explanation-words.js";
import { formatCount, formatPercent, formatReach, formatSeconds, formatValue } from "./format.js";
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

/**
 * Those that may be recommended, by effort: a source of known structure, or with a fault that this study confirmed, is no
 * advice, however cheap it is here; unless there is no other.
 */
export function recommended(all: readonly Convergence[], record: StudyRecord): Convergence[] {
  const faults = new Set(
    [...record.tests, ...record.spreadTests].filter((test) => test.confirmed).map((test) => seriesKey(test)),
  );
  const structured = new Set(record.sources.filter((s) => s.knownStructure !== null).map((s) => s.id));
  const ordered = byEffort(all);
  const sound = ordered.filter((one) => !structured.has(one.source) && !faults.has(seriesKey(one)));
  return sound.length > 0 ? sound : ordered;
}

/** The least effort, and the least of another family than the best, which is what a reader compares it with. */
function efforts(here: readonly Convergence[], record: StudyRecord): Convergence[] {
  const family = (one: Convergence) => record.sources.find((source) => source.id === one.source)?.family;
  const [best, ...others] = recommended(here, record);
  if (best === undefined) return [];
  const other = others.find((one) => family(one) !== family(best)) ?? others[0];
  return other === undefined ? [best] : [best, other];
}

function becauseOf(explanation: Explanation | undefined): string {
  const alias = explanation?.explained === true ? explanation.aliases[0] : undefined;
  return alias === undefined
    ? ""
    : ` (${alias.walsh === null ? "its points lie on the planes of " : ""}${vectorText(alias)}: ${planesText(alias)})`;
}

/** The sentence for one problem and output of `record`. */
export function answerOf(problem: Problem, output: string, record: StudyRecord): string {
  const tolerance = toleranceOf(problem, referencesOf([problem], record.consensus).get(problem.id));
  if (tolerance === null)
    return "The tolerance is not known, because there is no reference; nothing is judged.";
  const here = <T extends { problem: string; output: string }>(all: readonly T[]): T[] =>
    all.filter((one) => one.problem === problem.id && one.output === output);
  const convergence = here(record.convergence);
  const held = `\u00b1${String(Number(tolerance.toPrecision(3)))} at ${formatPercent(problem.tolerance.confidence)}`;
  const [best, other] = efforts(convergence, record);
  const parts: string[] = [];
  if (best === undefined) parts.push(`No source is known to stay inside ${held}`);
  else parts.push(`${best.source} stays inside ${held} with ${effort(best)}`);
  if (other !== undefined) parts.push(`${other.source} needs ${effort(other)}`);
  const confirmed = here(record.tests).filter((test) => test.confirmed);
  for (const { source, confirmation } of confirmed.slice(0, NAMED)) {
    if (confirmation === null) continue;
    const { bias, standardError } = confirmation;
    const why = becauseOf(here(record.explanations).find((one) => one.source === source));
    parts.push(
      `${source} is off by ${bias > 0 ? "+" : ""}${formatValue(bias, standardError)} whatever n${why}`,
    );
  }
  if (confirmed.length > NAMED) parts.push(`${confirmed.length - NAMED} more sources are biased`);
  const flat = convergence.filter(
    (one) => one.never && !confirmed.some((test) => seriesKey(test) === seriesKey(one)),
  );
  if (flat.length > 0) parts.push(`${names(flat)} never ${flat.length === 1 ? "does" : "do"}`);
  const judged = here(record.budgets).filter((one) => !one.inUse && one.verdict !== "none");
  const undecided = judged.filter((one) => one.verdict === "undecided").length;
  if (undecided > 0)
    parts.push(`${formatCount(undecided)} of ${formatCount(judged.length)} verdicts undecided`);
  return `${parts.join("; ")}.`;
}

/**
 * The verdicts in words, and the exit code that follows from them. Shared by the command line, the summary and the report.
 */
import { titleWithQuantity } from "../problem/quantity.js";
import type { Problem } from "../problem/contract.js";
import type { BiasTest, Budget, StudyRecord, Verdict } from "../record/types.js";
import { referencesOf, toleranceOf } from "./reference.js";
import { recommended } from "./answer.js";
import {
  formatCount,
  formatInterval,
  formatPercent,
  formatReach,
  formatSeconds,
  formatValue,
} from "./format.js";
import { seriesKey, type SeriesName } from "./series.js";

/** A verdict's mark; the word always stands beside it. */
export const VERDICT_MARKS: Readonly<Record<Verdict, string>> = {
  within: "\u25cf",
  outside: "\u25c6",
  undecided: "\u25d0",
  none: "\u2013",
};

/** What is said of one problem. */
export interface Headline {
  readonly problem: string;
  readonly title: string;
  /** E.g. "tolerance ±0.010 at 99 %, reference 4.05174 (closed form)". */
  readonly task: string;
  /** Whole sentences: verdicts over the sources, confirmed biases, what the tests could have found. */
  readonly sentences: readonly string[];
  /** The verdict on what is in use; null where the problem does not say what that is. */
  readonly inUse: { readonly verdict: Verdict; readonly sentence: string } | null;
}

/** One headline per problem, in the record's order. */
export function headlinesOf(record: StudyRecord): Headline[] {
  return record.problems.map((problem) => ({
    problem: problem.id,
    title: titleWithQuantity(problem),
    task: taskOf(problem, record),
    sentences: [
      ...verdictSentences(problem, record),
      ...biasSentences(problem, record),
      ...spreadSentences(problem, record),
    ],
    inUse: inUseHeadline(problem, record),
  }));
}

/** Exit code of a completed study: 1 where what is in use is outside its tolerance, else 0. */
export function exitCodeOf(record: StudyRecord, undecidedFails = false): 0 | 1 {
  const fails = record.budgets.some(
    ({ inUse, verdict }) => inUse && (verdict === "outside" || (undecidedFails && verdict === "undecided")),
  );
  return fails ? 1 : 0;
}

function taskOf(problem: Problem, record: StudyRecord): string {
  const reference = referencesOf([problem], record.consensus).get(problem.id);
  const tolerance = toleranceOf(problem, reference);
  const held = tolerance === null ? "tolerance not known" : `tolerance \u00b1${formatValue(tolerance)}`;
  const known =
    reference === undefined
      ? "no reference value"
      : `reference ${referenceText(reference.value, reference.uncertainty)} (${reference.basis})`;
  return `${held} at ${formatPercent(problem.tolerance.confidence)}, ${known}`;
}

/** Six digits of an exact reference, or those that its uncertainty supports. */
export function referenceText(value: number, uncertainty: number): string {
  return uncertainty > 0 ? formatValue(value, uncertainty) : String(Number(value.toPrecision(6)));
}

function budgetsOf(problem: Problem, record: StudyRecord): Budget[] {
  return record.budgets.filter((budget) => budget.problem === problem.id && !budget.inUse);
}

function verdictSentences(problem: Problem, record: StudyRecord): string[] {
  const budgets = budgetsOf(problem, record);
  const named = (verdict: Verdict, detail: (one: Budget) => string) =>
    budgets.filter((one) => one.verdict === verdict).map((one) => nameOf(one, budgets) + detail(one));
  const sentences: string[] = [];
  const within = named("within", () => "");
  const outside = named("outside", (one) => ` (${whatHelps(one, record)})`);
  const undecided = named("undecided", () => "");
  if (within.length > 0)
    sentences.push(`Within the tolerance at the largest number of points: ${list(within)}.`);
  if (outside.length > 0) sentences.push(`Outside it: ${list(outside)}.`);
  if (undecided.length > 0) sentences.push(`Undecided: ${list(undecided)}.`);
  const cheapest = cheapestReach(problem, record);
  if (cheapest !== null) sentences.push(cheapest);
  return sentences;
}

/** The largest line of a budget outside its tolerance, and how many points would do. */
function whatHelps(budget: Budget, record: StudyRecord): string {
  const key = seriesKey(budget);
  const found = record.convergence.find((one) => seriesKey(one) === key);
  const line = budget.largestLine ?? "no line";
  if (found?.never === true) return `${line}; no number of points would do`;
  if (found === undefined || found.reach === null) {
    const remedy = lineRemedy(budget);
    return remedy === null || line === "sampling" ? line : `${line}: ${remedy}`;
  }
  return `${line}; ${formatReach(found.reach)} points would do`;
}

/** A source's id; its estimator and output only where there are several of them. */
function nameOf(one: SeriesName, among: readonly SeriesName[]): string {
  const estimators = new Set(among.map((other) => other.estimator));
  const outputs = new Set(among.map((other) => other.output));
  const extra = [estimators.size > 1 ? one.estimator : "", outputs.size > 1 ? one.output : ""].filter(
    Boolean,
  );
  return extra.length > 0 ? `${one.source} (${extra.join(", ")})` : one.source;
}

function list(names: readonly string[]): string {
  return names.length < 2 ? names.join("") : `${names.slice(0, -1).join(", ")} and ${names.at(-1) ?? ""}`;
}

/** The least effort among sources that may be recommended, as in the answer. */
function cheapestReach(problem: Problem, record: StudyRecord): string | null {
  const reached = record.convergence.filter((one) => one.problem === problem.id && one.reach !== null);
  const best = recommended(reached, record)[0];
  if (best === undefined || best.reach === null || reached.length < 2) return null;
  const time = best.cost === null ? "" : `, ${formatSeconds(best.cost)}`;
  const far = best.reach.extrapolated ? ", extrapolated" : "";
  return `The least effort for it: ${best.source} with ${formatReach(best.reach)} points${time}${far}.`;
}

/** What the tests of one problem found: each confirmed bias, then what they could have found elsewhere. */
export function biasSentences(problem: Problem, record: StudyRecord): string[] {
  const tests = record.tests.filter((test) => test.problem === problem.id);
  const confirmed = tests.filter((test) => test.confirmed);
  const clear = tests.filter((test) => test.kind !== "none" && !test.confirmed);
  const sentences = confirmed.map((test) => {
    const { bias, standardError, replicates } = test.confirmation ?? {
      bias: NaN,
      standardError: 0,
      replicates: 0,
    };
    return (
      `${nameOf(test, tests)} is biased: ${formatValue(bias, standardError)} ` +
      `(standard error ${formatValue(standardError)}), confirmed on ${replicates} fresh replicates.`
    );
  });
  const detectable = clear.map((test) => test.detectableBias ?? 0);
  if (clear.length > 0) {
    const most = Math.max(...detectable);
    const least = Math.min(...detectable);
    const range = most === least ? formatValue(least) : `${formatValue(least)} to ${formatValue(most)}`;
    const names = list(clear.map((test) => nameOf(test, tests)));
    sentences.push(`No bias found in ${names}; a bias of ${range} would have been found with 80 % power.`);
  }
  return sentences;
}

/** What the tests of spread found: each confirmed fault. */
export function spreadSentences(problem: Problem, record: StudyRecord): string[] {
  const tests = record.spreadTests.filter((test) => test.problem === problem.id);
  return tests.flatMap((test) => {
    const { confirmation: found } = test;
    if (!test.confirmed || found === null) return [];
    const width = found.interval === null ? null : (found.interval[1] - found.interval[0]) / 4;
    const interval = found.interval === null ? "" : ` (95 % interval ${formatInterval(found.interval)})`;
    return [
      `${nameOf(test, tests)} spreads ${formatValue(found.ratio, width)} times what independent points would` +
        `${interval}, confirmed on ${found.replicates} fresh replicates: its points are not independent.`,
    ];
  });
}

function inUseHeadline(problem: Problem, record: StudyRecord): Headline["inUse"] {
  const { inUse } = problem;
  if (inUse === null) return null;
  const opening = `In use: ${inUse.source}, ${formatCount(inUse.points)} points: `;
  const budgets = record.budgets.filter((one) => one.problem === problem.id && one.inUse);
  // Several outputs: the worst of them speaks.
  const rank: readonly Verdict[] = ["outside", "undecided", "none", "within"];
  const worst = rank.flatMap((verdict) => budgets.filter((one) => one.verdict === verdict))[0];
  if (worst === undefined) {
    const sentence = `${opening}not judged, because ${inUse.source} is not among the sources of this study.`;
    return { verdict: "none", sentence };
  }
  return { verdict: worst.verdict, sentence: opening + judgement(worst, record) };
}

function judgement(budget: Budget, record: StudyRecord): string {
  const { verdict, total, tolerance, reason } = budget;
  if (verdict === "none" || total === null || tolerance === null) {
    return `no verdict${reason === null ? "" : `: ${reason}`}.`;
  }
  const sign = total > tolerance ? ">" : "\u2264";
  const figures = `(${formatValue(total)} ${sign} ${formatValue(tolerance)})`;
  if (verdict === "within") return `within ${figures}.`;
  if (verdict === "undecided") {
    const remedy = lineRemedy(budget);
    const help = remedy === null ? "" : ` What would help: ${remedy}.`;
    return `undecided ${figures}${reason === null ? "" : `: ${reason}`}.${help}`;
  }
  return `outside ${figures}.${remedyOf(budget, record)}`;
}

/** What would help: more points of the same source, or another source of the study. */
function remedyOf(budget: Budget, record: StudyRecord): string {
  const key = seriesKey(budget);
  const own = record.convergence.find((one) => seriesKey(one) === key);
  const choices: string[] = [];
  const times = (own?.reach?.n ?? NaN) / budget.n;
  if (times > 1) choices.push(`${formatCount(Math.max(2, Math.ceil(times)), true)} times the points`);
  const others = recommended(record.convergence, record)
    .filter(
      (one) => one.problem === budget.problem && one.source !== budget.source && one.output === budget.output,
    )
    .filter((one) => one.reach !== null && !one.reach.extrapolated)
    .filter((one) => record.budgets.some((b) => seriesKey(b) === seriesKey(one) && b.verdict === "within"))
    .sort((a, b) => (a.reach?.n ?? 0) - (b.reach?.n ?? 0));
  const best = others[0];
  if (best !== undefined && best.reach !== null)
    choices.push(`${best.source} with ${formatReach(best.reach)} points`);
  if (choices.length > 0) return ` Take ${choices.join(", or ")}.`;
  if (own?.never === true) return ` Take another source: its floor is ${formatValue(own.floor ?? NaN)}.`;
  const remedy = lineRemedy(budget);
  return remedy === null ? "" : ` What would help: ${remedy}.`;
}

/** What would reduce the largest line. */
function lineRemedy({ lines, largestLine }: Budget): string | null {
  return lines.find(({ line }) => line === largestLine)?.remedy ?? null;
}

/** For each test: was it judged, and how. Used by tables and by the bias map. */
export function biasWord(test: BiasTest): "biased" | "no bias found" | "not confirmed yet" | "undecided" {
  if (test.confirmed) return "biased";
  if (test.kind === "none") return "undecided";
  return test.candidate && test.confirmation === null ? "not confirmed yet" : "no bias found";
}

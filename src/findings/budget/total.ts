/**
 * The error budget: what a tolerance is spent on. Bias lines add, random lines are added in quadrature and multiplied by
 * the coverage factor: total = sum |bias| + k sqrt(sum sigma^2). That is conservative; the GUM (JCGM 100:2008) would put
 * all in quadrature. k is Student's factor at the problem's confidence with the effective degrees of freedom of the random
 * lines together (Welch & Satterthwaite; JCGM 100:2008, G.4.1): sampling is known from R replicates, R - 1 degrees, declared
 * deviations are taken as known. It assumes normal errors and says so. Probabilities are shown and not spent.
 *
 * The interval of the total (95 %) runs from the lower limits of all lines to their upper ones. A tolerance above it is
 * kept (`within`), one below it is broken (`outside`), one inside it is `undecided`. Where the errors are heavy-tailed the
 * upper end takes Chebyshev's factor 1/sqrt(1 - confidence) (Chebyshev 1867), which needs no law of the errors.
 */
import { normalUpperQuantile } from "../../numeric/normal.js";
import { studentFactor } from "../../numeric/student.js";
import type { Problem } from "../../problem/contract.js";
import type { BiasTest, Budget, BudgetLine, Verdict } from "../../record/types.js";
import { isRounding, type Context } from "../cells.js";
import { formatCount, formatValue } from "../format.js";
import { toleranceOf, type KnownReference } from "../reference.js";
import { namesOf, type Series } from "../series.js";
import { spreadOf, type Estimated, type Spread } from "../spread.js";
import { contributionsOf } from "./contributions.js";
import { ESSENTIAL, type Line } from "./line.js";
import { LINES } from "./registry.js";
import { EXTRAPOLATION, isExtrapolated } from "./sampling.js";
import type { StructureLine } from "./structure.js";

/** The budget of one series at n points: its largest n by default. */
export function budgetOf(
  series: Series,
  test: BiasTest | undefined,
  context: Context,
  n = series.last.n,
  inUse = false,
): Budget | null {
  const problem = context.problems.get(series.problem);
  if (problem === undefined) return null;
  const reference = context.references.get(series.problem);
  const { confidence } = problem.tolerance;
  const empty: Budget = {
    ...namesOf(series),
    n,
    tolerance: toleranceOf(problem, reference),
    confidence,
    lines: [],
    total: null,
    totalInterval: null,
    verdict: "none",
    headroom: null,
    largestLine: null,
    coverageFactor: null,
    degrees: null,
    reason: null,
    inUse,
  };
  const source = context.sources.get(series.source);
  const spread = spreadOf(series, source?.family === "pseudo-random");
  const obstacle = obstacleOf(series, problem, reference, context);
  if (obstacle !== null) return { ...empty, reason: obstacle };
  const sigma = samplingAt(series, spread, n);
  if (sigma === null) return { ...empty, reason: "the deviation of the estimates could not be measured" };
  const given = { series, problem, source, reference, test, context, n, confidence, spread, sigma };
  const lines = LINES.flatMap((make) => make(given));
  return { ...empty, ...judge({ lines, sigma, spread, series, empty }) };
}

/** Why there can be no verdict at all; null where there can be one. */
function obstacleOf(
  series: Series,
  problem: Problem,
  reference: KnownReference | undefined,
  context: Context,
): string | null {
  if (context.sources.get(series.source)?.deterministic === true)
    return "deterministic source: one error, no error bar, no statistical verdict";
  if (series.last.mean === null) return "the integrand gave values that are not finite";
  const divergent = context.divergent.get(series.problem);
  if (divergent !== undefined) return divergent;
  if (series.last.replicates < 3) return "fewer than 3 replicates: no usable error bar";
  if (toleranceOf(problem, reference) === null) {
    return "no tolerance: it is relative to a value that is zero or not known";
  }
  return null;
}

/** s at n; what it was at the largest n where the replicates agree to rounding there. */
function samplingAt(series: Series, spread: Spread | null, n: number): Estimated | null {
  const { last } = series;
  if (isRounding(last) && n >= last.n) {
    const value = last.replicateDeviation ?? 0;
    return { value, interval: [0, value] };
  }
  return spread?.at(n) ?? null;
}

interface Case {
  readonly lines: readonly Line[];
  readonly sigma: Estimated;
  readonly spread: Spread | null;
  readonly series: Series;
  readonly empty: Budget;
}

/** Effective degrees of freedom of all random lines together; Infinity where none is estimated. */
function effectiveDegrees(lines: readonly Line[], replicates: number): number {
  const squares = lines.filter((line) => line.kind === "random").map((line) => (line.value ?? 0) ** 2);
  const [sampling = 0] = squares;
  const total = squares.reduce((sum, square) => sum + square, 0);
  // In two steps, since fourth powers of small deviations underflow.
  return sampling > 0 ? (replicates - 1) * (total / sampling) ** 2 : Infinity;
}

function judge(given: Case): Partial<Budget> {
  const { lines, sigma, series, empty } = given;
  const { tolerance, confidence } = empty;
  const degrees = effectiveDegrees(lines, series.last.replicates);
  const factor = Number.isFinite(degrees)
    ? studentFactor(confidence, degrees)
    : normalUpperQuantile((1 - confidence) / 2);
  const sum = (pick: (line: Line) => number): number =>
    lines.reduce((all, line) => all + (line.kind === "bias" ? pick(line) : 0), 0);
  const biases = sum((line) => line.value ?? 0);
  // Random lines in quadrature, with the sampling line at the value given.
  const [, ...declared] = lines.filter((line) => line.kind === "random").map((line) => line.value ?? 0);
  const random = (value: number) => Math.hypot(value, ...declared);
  const heavy = series.last.heavyTailed;
  const widest = heavy ? Math.max(factor, 1 / Math.sqrt(1 - confidence)) : factor;
  const upper = random(sigma.interval?.[1] ?? Infinity);
  const total = biases + factor * random(sigma.value);
  const low = sum((line) => line.lower) + factor * random(sigma.interval?.[0] ?? 0);
  const high = biases + widest * upper;
  const contributions = contributionsOf(lines, factor);
  const largest = contributions.indexOf(Math.max(...contributions));
  const { verdict, reason } = decide(given, low, high, biases + factor * upper);
  return {
    lines: lines.map(({ line, kind, value, interval, basis, remedy }): BudgetLine => {
      return { line, kind, value, interval, basis, remedy };
    }),
    total,
    totalInterval: Number.isFinite(high) ? [low, high] : null,
    verdict,
    headroom: tolerance === null ? null : tolerance - total,
    largestLine: (contributions[largest] ?? 0) > 0 ? (lines[largest]?.line ?? null) : null,
    coverageFactor: factor,
    degrees: Number.isFinite(degrees) ? degrees : null,
    reason,
  };
}

function decide(
  given: Case,
  low: number,
  high: number,
  /** Upper end of the total if the errors were normal. */
  normalHigh: number,
): { verdict: Verdict; reason: string | null } {
  const { lines, spread, series, empty } = given;
  const tolerance = empty.tolerance ?? NaN;
  if (low > tolerance) return { verdict: "outside", reason: null };
  if (lines.some((line) => ESSENTIAL.has(line.line) && line.value === null)) {
    return { verdict: "undecided", reason: "no reference value: a bias could not be assessed" };
  }
  if (spread?.fixedOrder === false && isExtrapolated(spread, empty.n)) {
    const reason = `${formatCount(empty.n)} points lie beyond ${EXTRAPOLATION} times the sizes measured`;
    return { verdict: "undecided", reason };
  }
  if (high <= tolerance) return { verdict: "within", reason: null };
  if (series.last.heavyTailed && normalHigh <= tolerance) {
    const reason = "the errors are heavy-tailed: their measured deviation is a lower bound only";
    return { verdict: "undecided", reason };
  }
  const structure = lines.find((line): line is StructureLine => line.line === "source structure");
  const bound = structure?.value ?? 0;
  if (structure?.confirmed !== true && bound > 0 && high - bound <= tolerance) {
    const reason =
      `no bias was confirmed, but this study cannot exclude one of up to ${formatValue(bound)}; ` +
      "more replicates or more points would";
    return { verdict: "undecided", reason };
  }
  const reason = `the 95 % interval of the total, ${formatValue(low)} to ${formatValue(high)}, holds the tolerance`;
  return { verdict: "undecided", reason };
}

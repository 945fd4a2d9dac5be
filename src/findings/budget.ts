/**
 * The error budget: what a tolerance is spent on. Bias lines add, random lines are added in quadrature and multiplied by
 * the coverage factor: total = sum |bias| + k sqrt(sum sigma^2). That is conservative; the GUM (JCGM 100:2008) would put
 * all in quadrature. k is Student's factor at the problem's confidence with R - 1 degrees of freedom, since sigma is known
 * from R replicates only; it assumes normal errors and says so.
 *
 * The interval of the total (95 %) runs from the lower limits of all lines to their upper ones. A tolerance above it is
 * kept (`within`), one below it is broken (`outside`), one inside it is `undecided`. Where the errors are heavy-tailed the
 * upper end takes Chebyshev's factor 1/sqrt(1 - confidence) (Chebyshev 1867), which needs no law of the errors.
 */
import { normalUpperQuantile } from "../numeric/normal.js";
import { studentFactor } from "../numeric/student.js";
import type { Problem } from "../problem/contract.js";
import type { BiasTest, Budget, BudgetLine, Verdict } from "../record/types.js";
import { isRounding, type Context } from "./cells.js";
import { formatCount, formatPercent, formatValue } from "./format.js";
import { toleranceOf, type KnownReference } from "./reference.js";
import { namesOf, type Series } from "./series.js";
import { spreadOf, type Estimated, type Spread } from "./spread.js";
import { structureLine, type StructureLine } from "./structure-line.js";

/** Beyond this multiple of the largest measured n (or below its inverse of the smallest) a figure is extrapolated. */
export const EXTRAPOLATION = 4;

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
    reason: null,
    inUse,
  };
  const source = context.sources.get(series.source);
  const spread = spreadOf(series, source?.family === "pseudo-random");
  const obstacle = obstacleOf(series, problem, reference, source?.deterministic === true);
  if (obstacle !== null) return { ...empty, reason: obstacle };
  const sigma = samplingAt(series, spread, n);
  if (sigma === null) return { ...empty, reason: "the deviation of the estimates could not be measured" };
  const factor = studentFactor(confidence, series.last.replicates - 1);
  const structure = structureLine(series, test, context, confidence);
  const lines = [
    samplingLine(series, sigma, n, spread, factor, confidence),
    structure,
    referenceLine(reference, confidence),
    ...declaredLines(problem),
  ];
  return { ...empty, ...judge({ lines, structure, sigma, factor, spread, series, empty }) };
}

/** Why there can be no verdict at all; null where there can be one. */
function obstacleOf(
  series: Series,
  problem: Problem,
  reference: KnownReference | undefined,
  deterministic: boolean,
): string | null {
  if (deterministic) return "deterministic source: one error, no error bar, no statistical verdict";
  if (series.last.mean === null) return "the integrand gave values that are not finite";
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

function samplingLine(
  series: Series,
  sigma: Estimated,
  n: number,
  spread: Spread | null,
  factor: number,
  confidence: number,
): BudgetLine {
  const measured = series.cells.some((cell) => cell.n === n);
  const how = measured
    ? `standard deviation of ${series.last.replicates} replicates`
    : `${isExtrapolated(spread, n) ? "extrapolated" : "read"} from the deviations at ` +
      `${formatCount(spread?.smallest ?? n)} to ${formatCount(spread?.largest ?? n)} points`;
  const basis =
    `one run of ${formatCount(n)} points; ${how}; counted ${factor.toFixed(2)} times (Student's t, ` +
    `${formatPercent(confidence)}, assumes normal errors)`;
  return { line: "sampling", kind: "random", value: sigma.value, interval: sigma.interval, basis };
}

function referenceLine(reference: KnownReference | undefined, confidence: number): BudgetLine {
  const line = { line: "reference", kind: "bias" } as const;
  if (reference === undefined) return { ...line, value: null, interval: null, basis: "no reference value" };
  const value = reference.uncertainty * normalUpperQuantile((1 - confidence) / 2);
  const basis =
    reference.uncertainty === 0
      ? `exact to double precision: ${reference.basis}`
      : `${formatPercent(confidence)} limit of its standard uncertainty ` +
        `${formatValue(reference.uncertainty)}: ${reference.basis}`;
  return { ...line, value, interval: value === 0 ? null : [0, value], basis };
}

/** The user's own contributions (a time step, model inputs), taken at their word. */
function declaredLines(problem: Problem): BudgetLine[] {
  return (problem.declared ?? []).map(({ line, kind, value, basis }) => {
    return { line, kind, value, interval: null, basis: `declared: ${basis}` };
  });
}

function isExtrapolated(spread: Spread | null, n: number): boolean {
  return spread !== null && (n > EXTRAPOLATION * spread.largest || n * EXTRAPOLATION < spread.smallest);
}

interface Case {
  readonly lines: readonly BudgetLine[];
  readonly structure: StructureLine;
  readonly sigma: Estimated;
  readonly factor: number;
  readonly spread: Spread | null;
  readonly series: Series;
  readonly empty: Budget;
}

function judge(given: Case): Partial<Budget> {
  const { lines, structure, sigma, factor, series, empty } = given;
  const { tolerance, confidence } = empty;
  const sizes = (kind: BudgetLine["kind"]) =>
    lines.filter((line) => line.kind === kind).map((line) => line.value ?? 0);
  const biases = sizes("bias").reduce((sum, value) => sum + value, 0);
  const declaredBiases = biases - (structure.value ?? 0);
  // Random lines in quadrature, with the sampling line at the value given.
  const others = Math.sqrt(Math.max(0, Math.hypot(...sizes("random")) ** 2 - sigma.value ** 2));
  const random = (value: number) => Math.hypot(value, others);
  const heavy = series.last.heavyTailed;
  const widest = heavy ? Math.max(factor, 1 / Math.sqrt(1 - confidence)) : factor;
  const upper = random(sigma.interval?.[1] ?? Infinity);
  const total = biases + factor * random(sigma.value);
  // Declared biases count in full at both ends; the reference's error may as well be nothing.
  const reference = lines.find((line) => line.line === "reference")?.value ?? 0;
  const low = structure.lower + (declaredBiases - reference) + factor * random(sigma.interval?.[0] ?? 0);
  const high = biases + widest * upper;
  const contribution = (line: BudgetLine) => (line.value ?? 0) * (line.kind === "random" ? factor : 1);
  const largest = lines.reduce((a, b) => (contribution(b) > contribution(a) ? b : a));
  const { verdict, reason } = decide(given, low, high, biases + factor * upper);
  return {
    lines: lines.map(({ line, kind, value, interval, basis }) => ({ line, kind, value, interval, basis })),
    total,
    totalInterval: Number.isFinite(high) ? [low, high] : null,
    verdict,
    headroom: tolerance === null ? null : tolerance - total,
    largestLine: contribution(largest) > 0 ? largest.line : null,
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
  const { structure, spread, series, empty } = given;
  const tolerance = empty.tolerance ?? NaN;
  if (low > tolerance) return { verdict: "outside", reason: null };
  if (structure.value === null || given.lines.some((line) => line.value === null)) {
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
  if (!structure.confirmed && structure.value > 0 && high - structure.value <= tolerance) {
    const reason =
      `no bias was confirmed, but this study cannot exclude one of up to ${formatValue(structure.value)}; ` +
      "more replicates or more points would";
    return { verdict: "undecided", reason };
  }
  const reason = `the 95 % interval of the total, ${formatValue(low)} to ${formatValue(high)}, holds the tolerance`;
  return { verdict: "undecided", reason };
}

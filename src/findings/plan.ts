/**
 * Planning: from a record (a pilot's, or any study's) to the number of points that brings the total of the error budget
 * inside the tolerance, and what they cost.
 *
 * Where the budget of n points is known, planning is a search: the total is sum |bias| + k sqrt(sum sigma^2)
 * (budget.ts), the fitted deviation falls with n, and the smallest valid n whose total is inside is wanted. Three n are
 * found: where the lower end of the total's 95 % interval comes inside, where the total does, and where its upper end does.
 * The last one is recommended, because a study of that n is then expected to say `within`; the first and last are the
 * interval. The upper end is that of the interval which such a study would print: its own R replicates scatter too, so
 * that the relative errors of the pilot's deviation and of the study's own add in quadrature, on the logarithmic scale,
 * and its interval reaches above its deviation. (Taking the pilot's error alone, the cheapest of several sources is the
 * one whose deviation came out too small.)
 *
 * Two lines are not taken from the budget as they stand. A bias that was not excluded is a matter of the pilot's size; the
 * plan takes what a study of n points with R replicates would leave of it, E|b| + t s(n)/sqrt(R) with
 * E|b| = sqrt(2/pi) s/sqrt(R) (mean of a half-normal; 1.96 s/sqrt(R) at the upper end), where that is smaller. And with M randomisations averaged the
 * sampling line is s(n')/sqrt(M), n = M n' evaluations in all.
 *
 * Quasi-random sources are planned at the sizes measured and their doublings: between those the error does not lie on
 * the fitted curve (a net in base 2 is balanced at powers of two). Pseudo-random n are rounded up to two digits, which is
 * what a fitted number supports.
 */
import { titleWithQuantity } from "../problem/quantity.js";
import { chiSquareQuantile } from "../numeric/chi-square.js";
import { studentFactor } from "../numeric/student.js";
import type { Problem } from "../problem/contract.js";
import type { BiasTest, Budget, Convergence, RecordSource, StudyRecord } from "../record/types.js";
import { ESSENTIAL } from "./budget/line.js";
import { EXTRAPOLATION } from "./budget/sampling.js";
import { budgetOf } from "./budget/total.js";
import type { Context } from "./cells.js";
import { recordContext } from "./context.js";
import { formatCount, formatValue } from "./format.js";
import { toleranceOf } from "./reference.js";
import { namesOf, seriesKey, seriesOf, type Series, type SeriesName } from "./series.js";

/** The largest number of points that a plan looks at: that of a study. */
const MOST_POINTS = 2 ** 40;

export interface PlanOptions {
  /** Seconds per evaluation of the user's own program; null: `inUse.secondsPerPoint` where given, else this machine's. */
  readonly secondsPerPoint: number | null;
  /** M >= 1 independent randomisations of n' points whose mean is the estimate. */
  readonly randomisations: number;
  /** A time budget in seconds, for which the smallest reachable total is found; null without one. */
  readonly seconds: number | null;
  /** The nearest valid size of a source, by its id (sources/choice.ts). */
  readonly nearestSize: (source: string, n: number) => number;
}

/** n points, and the total of the budget there. */
export interface PlanPoint {
  /** Evaluations in all, M n'. */
  readonly n: number;
  readonly total: number;
  /** 95 %. */
  readonly interval: readonly [number, number];
}

export interface SourcePlan extends SeriesName {
  /** `planned`: a number of points is known; `never`: none helps; `unknown`: the record cannot tell. */
  readonly status: "planned" | "never" | "unknown";
  /** Why there is no plan; null where there is one. */
  readonly reason: string | null;
  /** The plan: n at which the upper end of the total is inside the tolerance. */
  readonly point: PlanPoint | null;
  /** n at which the lower and the upper end of the total come inside (95 %). */
  readonly interval: readonly [number, number] | null;
  /** n at which the total itself comes inside. */
  readonly expected: number | null;
  readonly randomisations: number;
  /** Replicates of a study of this n that is expected to say `within`. */
  readonly replicates: number;
  readonly extrapolated: boolean;
  /** The largest n measured, times M. */
  readonly largestMeasured: number;
  /** On this machine, measured; null where not known. */
  readonly secondsPerPoint: number | null;
  /** One run of n points on this machine. */
  readonly seconds: number | null;
  /** One run of n points at the user's seconds per point; null where none was given. */
  readonly userSeconds: number | null;
  /** Why this source is not recommended whatever it costs; null where it is held to be sound. */
  readonly unsound: string | null;
  /** What the time budget buys; null without one, or where not known. */
  readonly affordable: PlanPoint | null;
  /** Totals over n, for charts. */
  readonly curve: readonly PlanPoint[];
}

export interface ProblemPlan {
  readonly problem: string;
  readonly title: string;
  readonly dimension: number;
  readonly tolerance: number | null;
  readonly confidence: number;
  /** The user's seconds per point; null where the measured ones hold. */
  readonly userSecondsPerPoint: number | null;
  /** Cheapest first; then those without a plan. */
  readonly sources: readonly SourcePlan[];
  /** The cheapest sound source with a plan; null where there is none. */
  readonly recommended: SourcePlan | null;
}

/** The plans of every problem of a record, in its order. Pure. */
export function planOf(record: StudyRecord, options: PlanOptions): ProblemPlan[] {
  const context = recordContext(record);
  const all = seriesOf(record.cells);
  return record.problems.map((problem) => {
    const sources = all
      .filter((series) => series.problem === problem.id)
      .map((series) => planSeries(series, problem, record, context, options));
    const ranked = sources.sort((a, b) => costRank(a) - costRank(b) || pointRank(a) - pointRank(b));
    return {
      problem: problem.id,
      title: titleWithQuantity(problem),
      dimension: problem.dimension,
      tolerance: toleranceOf(problem, context.references.get(problem.id)),
      confidence: problem.tolerance.confidence,
      userSecondsPerPoint: userSeconds(problem, options),
      sources: ranked,
      recommended: ranked.find((plan) => plan.status === "planned" && plan.unsound === null) ?? null,
    };
  });
}

function costRank({ status, seconds, userSeconds: user }: SourcePlan): number {
  if (status !== "planned") return status === "unknown" ? 1e300 : Number.MAX_VALUE;
  return user ?? seconds ?? 1e299;
}

function pointRank({ point }: SourcePlan): number {
  return point?.n ?? 0;
}

export function userSeconds(problem: Problem, options: PlanOptions): number | null {
  return options.secondsPerPoint ?? problem.inUse?.secondsPerPoint ?? null;
}

function planSeries(
  series: Series,
  problem: Problem,
  record: StudyRecord,
  context: Context,
  options: PlanOptions,
): SourcePlan {
  const source = context.sources.get(series.source);
  const same = <T extends SeriesName>(rows: readonly T[]): T | undefined =>
    rows.find((row) => seriesKey(row) === seriesKey(series));
  const test = same(record.tests);
  const { randomisations } = options;
  const replicates = series.last.replicates;
  const spp = series.last.secondsPerPoint;
  const user = userSeconds(problem, options);
  const none = {
    ...namesOf(series),
    status: "unknown",
    reason: null,
    point: null,
    interval: null,
    expected: null,
    randomisations,
    replicates,
    extrapolated: false,
    largestMeasured: series.last.n * randomisations,
    secondsPerPoint: spp,
    seconds: null,
    userSeconds: null,
    unsound: unsoundness(source, test),
    affordable: null,
    curve: [],
  } satisfies SourcePlan;
  const totals = totalsOf(series, test, context, randomisations);
  const first = totals(series.last.n);
  if (typeof first === "string") return { ...none, reason: first };
  const tolerance = toleranceOf(problem, context.references.get(problem.id)) ?? NaN;
  const grid = gridOf(series, source, (n) => options.nearestSize(series.source, n));
  const at = (perRun: number): PlanPoint | null => {
    const found = totals(perRun);
    return typeof found === "string" ? null : found.point;
  };
  const found = {
    low: grid.smallest((n) => (at(n)?.interval[0] ?? Infinity) <= tolerance),
    total: grid.smallest((n) => (at(n)?.total ?? Infinity) <= tolerance),
    high: grid.smallest((n) => (at(n)?.interval[1] ?? Infinity) <= tolerance),
  };
  const price = user ?? spp;
  const affordable =
    options.seconds === null || price === null
      ? null
      : grid.largest(options.seconds / price / randomisations);
  const common = {
    ...none,
    affordable: affordable === null ? null : at(affordable),
    curve: grid.sample(found.high).flatMap((n) => at(n) ?? []),
  };
  if (found.high === null) {
    return { ...common, ...refusal(first, tolerance, same(record.convergence)) };
  }
  const n = found.high * randomisations;
  return {
    ...common,
    status: "planned",
    point: at(found.high),
    interval: [(found.low ?? found.high) * randomisations, n],
    expected: (found.total ?? found.high) * randomisations,
    extrapolated: found.high > EXTRAPOLATION * series.last.n,
    seconds: spp === null ? null : n * spp,
    userSeconds: user === null ? null : n * user,
  };
}

/** Why a source is not recommended; null where it is held to be sound. */
export function unsoundness(source: RecordSource | undefined, test: BiasTest | undefined): string | null {
  if (source === undefined) return "not described in the record";
  if (test?.confirmed === true) return "biased on this problem, confirmed on fresh replicates";
  if (source.knownStructure !== null) return `known structure: ${source.knownStructure}`;
  if (source.family === "own") return "a source of your own, whose structure a pilot does not examine";
  if (source.repeatable === false) return "gives other points every time and cannot be repeated";
  return null;
}

interface Totals {
  readonly point: PlanPoint;
  /** Lines that do not fall with n, by size. */
  readonly fixed: readonly { readonly line: string; readonly value: number }[];
}

/**
 * The total at n' points in each of M randomisations, with its interval; a reason in words where the budget has none.
 */
function totalsOf(series: Series, test: BiasTest | undefined, context: Context, randomisations: number) {
  return (perRun: number): Totals | string => {
    const budget = budgetOf(series, test, context, perRun);
    if (budget === null) return "the record does not hold its problem";
    const { total, totalInterval: ends, lines } = budget;
    if (total === null) return budget.reason ?? "its total is not known";
    const missing = lines.find(({ line, value }) => ESSENTIAL.has(line) && value === null);
    if (missing !== undefined) return `${missing.line}: ${missing.basis}`;
    if (ends === null) return "the deviation of its estimates has no interval";
    return scaled({ budget, total, ends, test, series, randomisations });
  };
}

interface Scaling {
  readonly budget: Budget;
  readonly total: number;
  readonly ends: readonly [number, number];
  readonly test: BiasTest | undefined;
  readonly series: Series;
  readonly randomisations: number;
}

/** Upper 97.5 % point of the normal law. */
const UPPER = 1.959964;

/** Logarithms of how far above the truth the deviation of `replicates` normal values may come out, and its interval above it. */
function ownSpread(replicates: number): { readonly scatter: number; readonly reach: number } {
  const degrees = replicates - 1;
  if (degrees < 1) return { scatter: 0, reach: 0 };
  return {
    scatter: Math.log(chiSquareQuantile(0.975, degrees) / degrees) / 2,
    reach: -Math.log(chiSquareQuantile(0.025, degrees) / degrees) / 2,
  };
}

/** The budget's total and interval with the structure line of the plan and the sampling line of M randomisations. */
function scaled({ budget, total, ends, test, series, randomisations }: Scaling): Totals {
  const { replicates } = series.last;
  const factor = studentFactor(budget.confidence, replicates - 1);
  const value = (name: string) => budget.lines.find(({ line }) => line === name)?.value ?? 0;
  const sampling = budget.lines.find(({ line }) => line === "sampling");
  const sigma = sampling?.value ?? 0;
  const biases = budget.lines.filter(({ kind }) => kind === "bias");
  const randoms = budget.lines.filter(({ kind }) => kind === "random").map((line) => line.value ?? 0);
  const bias = biases.reduce((sum, line) => sum + (line.value ?? 0), 0);
  const others = Math.sqrt(Math.max(0, Math.hypot(...randoms) ** 2 - sigma ** 2));
  const root = Math.sqrt(randomisations);
  /** The random part for a deviation s, as M randomisations leave it of `part`, the part for one. */
  const shrunk = (part: number, s: number): number =>
    part > 0 && randomisations > 1 ? (part * Math.hypot(s / root, others)) / Math.hypot(s, others) : part;
  const structure = value("source structure");
  const kept = (spread: number, of: number): number =>
    test?.confirmed === true
      ? structure
      : Math.min(structure, ((spread + factor) * of) / Math.sqrt(replicates));
  const fixed = bias - structure + kept(Math.sqrt(2 / Math.PI), sigma);
  const [from, to] = sampling?.interval ?? [sigma, sigma];
  const own = ownSpread(replicates);
  const shown = sigma > 0 ? sigma * Math.exp(Math.hypot(Math.log(to / sigma), own.scatter) + own.reach) : to;
  const fixedAbove = bias - structure + kept(UPPER, shown);
  const randomAbove = (budget.coverageFactor ?? factor) * Math.hypot(shown, others);
  const lowRandom = (budget.coverageFactor ?? factor) * Math.hypot(from, others);
  const lowBias = Math.max(0, ends[0] - lowRandom);
  return {
    point: {
      n: budget.n * randomisations,
      total: fixed + shrunk(total - bias, sigma),
      interval: [
        Math.min(lowBias, fixed) + shrunk(lowRandom, from),
        Math.max(fixed, fixedAbove) + shrunk(Math.max(randomAbove, ends[1] - bias), shown),
      ],
    },
    fixed: [
      ...biases.map((line) => ({
        line: line.line,
        value: line.line === "source structure" && test?.confirmed !== true ? 0 : (line.value ?? 0),
      })),
      { line: "declared and other random lines", value: (budget.coverageFactor ?? factor) * others },
    ].filter((line) => line.value > 0),
  };
}

/** Why no number of points brings the total inside. */
function refusal(
  { fixed }: Totals,
  tolerance: number,
  convergence: Convergence | undefined,
): Pick<SourcePlan, "status" | "reason"> {
  const largest = fixed.reduce((a, b) => (b.value > a.value ? b : a), { line: "", value: 0 });
  const sum = fixed.reduce((total, line) => total + line.value, 0);
  if (largest.value >= tolerance) {
    return {
      status: "never",
      reason: `${largest.line} alone takes ${formatValue(largest.value)}, whatever n`,
    };
  }
  if (sum >= tolerance) {
    const names = fixed.map(({ line }) => line).join(", ");
    return { status: "never", reason: `${names} together take ${formatValue(sum)}, whatever n` };
  }
  if (convergence?.never === true) {
    const level = formatValue(convergence.floor ?? NaN);
    return { status: "never", reason: `its error has a floor of ${level}: it no longer falls with n` };
  }
  return { status: "unknown", reason: `not reached with ${formatCount(MOST_POINTS, true)} points` };
}

interface Grid {
  /** The smallest n' from which on the condition holds; null where it never does. */
  smallest(holds: (n: number) => boolean): number | null;
  /** The largest n' of at most `limit`; null where even the smallest is above it. */
  largest(limit: number): number | null;
  /** Some n' from the smallest measured to well beyond `chosen`, for a chart. */
  sample(chosen: number | null): number[];
}

/** Sizes that a plan may name: measured ones and doublings, and for pseudo-random sources anything between. */
function gridOf(series: Series, source: RecordSource | undefined, nearest: (n: number) => number): Grid {
  const sizes = series.cells.map(({ n }) => n);
  for (let n = 2 * series.last.n; n <= MOST_POINTS; n *= 2) {
    const valid = nearest(n);
    if (valid > (sizes.at(-1) ?? 0)) sizes.push(valid);
  }
  const measured = series.cells.length;
  const anyN = source?.family === "pseudo-random" && source.nesting === "sequence";
  return {
    smallest(holds) {
      let i = sizes.findIndex((n, j) => j >= measured - 1 && holds(n));
      if (i < 0) return null;
      while (i > 0 && holds(sizes[i - 1] ?? 0)) i--;
      const [below, above] = [sizes[i - 1], sizes[i] ?? NaN];
      if (!anyN || below === undefined) return above;
      let [low, high] = [below, above];
      while (high / low > 1.005) {
        const middle = Math.round(Math.sqrt(low * high));
        if (middle <= low || middle >= high) break;
        if (holds(middle)) high = middle;
        else low = middle;
      }
      return Math.min(above, roundedUp(high));
    },
    largest(limit) {
      if (anyN && limit >= (sizes[0] ?? Infinity)) return Math.min(MOST_POINTS, Math.floor(limit));
      return sizes.findLast((n) => n <= limit) ?? null;
    },
    sample(chosen) {
      const last = Math.max(EXTRAPOLATION * series.last.n, 2 * (chosen ?? 0));
      return sizes.filter((n) => n <= last);
    },
  };
}

/** Up to two significant digits. */
function roundedUp(n: number): number {
  const unit = 10 ** Math.max(0, Math.floor(Math.log10(n)) - 1);
  return Math.ceil(n / unit) * unit;
}

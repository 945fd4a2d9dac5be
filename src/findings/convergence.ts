/**
 * Convergence of one series: order, floor, and the points and cost to reach the tolerance.
 *
 * - Order: slope of ln RMSE on ln n by weighted least squares, weights R - 1 (spread.ts says why); 95 % interval
 *   by jackknife over replicates, left out at all n together, because errors at nested n are correlated.
 * - Floor: the larger of the upper limit of |bias| and the plateau of s (spread.ts); its lower limit counts a bias only
 *   where it is confirmed. "Never" needs a lower limit above the tolerance and last three doublings that reject decay.
 * - Reach: the n at which k s(n) and the known bias lines together keep the tolerance. The resolution of the study (the
 *   bound of a bias that was not confirmed) is left out: it would fall with more replicates, not with more points.
 */
import { jackknife } from "../numeric/resampling.js";
import { studentFactor } from "../numeric/student.js";
import { normalUpperQuantile } from "../numeric/normal.js";
import type { BiasTest, Convergence } from "../record/types.js";
import { COUNTLESS } from "./format.js";
import { EXTRAPOLATION } from "./budget/sampling.js";
import { isRounding, type Context } from "./cells.js";
import { toleranceOf } from "./reference.js";
import { namesOf, type Series } from "./series.js";
import { decayRejected, logErrors, slopeOver, spreadOf, type Spread } from "./spread.js";
import { arithmeticLine } from "./budget/arithmetic.js";
import { resolutionLine } from "./budget/resolution.js";
import { transformLine } from "./budget/transform.js";
import type { Problem } from "../problem/contract.js";
import { structureLine, unbiasedBy } from "./budget/structure.js";

const FLOOR_CONFIDENCE = 0.95;

const UNKNOWN = 1000;

export function convergenceOf(series: Series, test: BiasTest | undefined, context: Context): Convergence {
  const source = context.sources.get(series.source);
  const none: Convergence = {
    ...namesOf(series),
    order: null,
    orderInterval: null,
    floor: null,
    floorLower: null,
    reach: null,
    never: false,
    cost: null,
  };
  if (source === undefined || source.deterministic || series.last.mean === null) return none;
  if (context.divergent.has(series.problem) === true) return none;
  const spread = spreadOf(series, source.family === "pseudo-random");
  const { floor, floorLower } = floorOf(series, test, context, spread);
  const tolerance = toleranceIn(series, context);
  const never =
    tolerance !== null && floorLower !== null && floorLower > tolerance && stalled(series, context, spread);
  const reach = never ? null : reachOf(series, test, context, spread);
  const seconds = series.last.secondsPerPoint;
  return {
    ...none,
    ...orderOf(series, context),
    floor,
    floorLower,
    reach,
    never,
    cost: reach === null || reach.n > COUNTLESS || seconds === null ? null : reach.n * seconds,
  };
}

function toleranceIn(series: Series, context: Context): number | null {
  const problem = context.problems.get(series.problem);
  return problem === undefined ? null : toleranceOf(problem, context.references.get(series.problem));
}

function orderOf(series: Series, context: Context): Pick<Convergence, "order" | "orderInterval"> {
  const reference = context.references.get(series.problem);
  if (reference === undefined) return { order: null, orderInterval: null };
  const { sizes, logs } = logErrors(series, reference.value);
  if (sizes.length < 3 || !logs.every((log) => Number.isFinite(log.all))) {
    return { order: null, orderInterval: null };
  }
  const slope = slopeOver(sizes, logs);
  return { order: slope.all, orderInterval: jackknife(slope.all, slope.without)?.interval ?? null };
}

function floorOf(series: Series, test: BiasTest | undefined, context: Context, spread: Spread | null) {
  const bound = structureLine(series, test, context, FLOOR_CONFIDENCE);
  const unbiased = !bound.confirmed && unbiasedBy(context.sources.get(series.source)) !== null;
  const plateau = spread?.plateau ?? null;
  if (plateau === null && (unbiased || bound.value === null)) return { floor: null, floorLower: null };
  return {
    floor: Math.max(unbiased ? 0 : (bound.value ?? 0), plateau?.value ?? 0),
    floorLower: Math.max(bound.lower, plateau?.lower ?? 0),
  };
}

/** True where the RMSE has stopped falling over the last three doublings. */
function stalled(series: Series, context: Context, spread: Spread | null): boolean {
  if (spread?.plateau) return true;
  const reference = context.references.get(series.problem);
  if (reference === undefined) return false;
  const { sizes, logs } = logErrors(series, reference.value);
  return decayRejected(sizes, logs);
}

function reachOf(
  series: Series,
  test: BiasTest | undefined,
  context: Context,
  spread: Spread | null,
): Convergence["reach"] {
  const tolerance = toleranceIn(series, context);
  const problem = context.problems.get(series.problem);
  if (tolerance === null || problem === undefined) return null;
  // One and the same wrong value whatever n: no number of points is known to help.
  if (isRounding(series.last) && Math.abs(series.last.bias ?? 0) > tolerance) return null;
  const exact = isRounding(series.last) ? firstExact(series) : Infinity;
  const certain = { n: exact, interval: [exact, exact] as const, extrapolated: false };
  if (spread === null) return Number.isFinite(exact) ? certain : null;
  const { confidence } = problem.tolerance;
  const structure = structureLine(series, test, context, confidence);
  const uncertainty = context.references.get(series.problem)?.uncertainty ?? 0;
  const measured = fixedBiases(series, context, problem, test);
  const declared = (kind: "bias" | "random") =>
    (problem.declared ?? []).filter((line) => line.kind === kind).map((line) => line.value);
  const bias =
    (structure.confirmed ? (structure.value ?? 0) : 0) +
    uncertainty * normalUpperQuantile((1 - confidence) / 2) +
    measured +
    declared("bias").reduce((sum, value) => sum + value, 0);
  const factor = studentFactor(confidence, series.last.replicates - 1);
  const room = Math.max(0, tolerance - bias) / factor;
  const found = spread.reach(Math.sqrt(Math.max(0, room ** 2 - Math.hypot(...declared("random")) ** 2)));
  if (Number.isFinite(exact) && !((found?.value ?? Infinity) < exact)) return certain;
  if (found === null) return null;
  // An n that is not known within a factor of a thousand is not known.
  if (found.interval === null || found.interval[1] > UNKNOWN * found.interval[0]) return null;
  // Below the smallest size nothing was measured: it is enough that the smallest keeps the tolerance.
  const atLeast = (n: number) => Math.max(Math.ceil(n), spread.smallest);
  return {
    n: atLeast(found.value),
    interval: [atLeast(found.interval[0]), atLeast(found.interval[1])],
    extrapolated: found.value > EXTRAPOLATION * spread.largest,
  };
}

/** The bias lines that were measured once for the problem and do not fall with n. */
function fixedBiases(series: Series, context: Context, problem: Problem, test: BiasTest | undefined): number {
  const given = {
    series,
    context,
    problem,
    test,
    source: context.sources.get(series.source),
    reference: context.references.get(series.problem),
    n: series.last.n,
    confidence: problem.tolerance.confidence,
    spread: null,
    sigma: { value: 0, interval: null },
  };
  const lines = [resolutionLine, transformLine, arithmeticLine].flatMap((make) => make(given));
  return lines.reduce((sum, line) => sum + (line.value ?? 0), 0);
}

/** The n from which on the replicates agree to rounding. */
function firstExact(series: Series): number {
  const last = series.cells.findLast((cell) => !isRounding(cell));
  return series.cells.find((cell) => cell.n > (last?.n ?? 0))?.n ?? series.last.n;
}

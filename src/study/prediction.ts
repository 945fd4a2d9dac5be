/**
 * The truncated sum S_K of Fourier coefficients at dual vectors, as an estimate with an interval. K is chosen on points of its own,
 * as the smallest number of pairs to which none of twice, four times, ... as many adds anything that shows; S_K and S_2K
 * then come from fresh points, as many as make the prediction sharper than the measurement, within a fixed amount of
 * work. If the second half still adds something there, K is doubled.
 */
import { studentFactor } from "../numeric/student.js";
import type { Estimated, MeasuredBias, PredictedBias } from "../record/explanation.js";
import type { AliasEstimator, AliasSums } from "./alias-estimate.js";
import { evaluateAt } from "./evaluate-at.js";
import type { RunnableProblem } from "./runnable.js";
import type { Wave } from "./waves.js";

/** Points that K is chosen on. */
export const PILOT = { replicates: 16, points: 4096 };
/** Points of one step of learning where the integrand is large. */
const LEARNING_POINTS = 32_768;

const REPLICATES = 32;
/** Points of a replicate, from the first to the last attempt. */
const POINTS = [2 ** 12, 2 ** 14, 2 ** 16, 2 ** 18];

/** Work in all at most, about: points times (coordinates and waves, weighted by what they cost); some 2 s. */
const MOST_WORK = 2e9;
const WORK = { coordinate: 10, wave: 6, walsh: 30 };

/** The prediction's standard error that is aimed at: this share of the measured bias, or the measurement's own. */
const WANTED_SHARE = 0.01;

/** A tail within this share of the sum does not matter. */
const SMALL_TAIL = 0.05;

/** First replicates of the purpose "explain", so that no step of the work shares points with another. */
export const FIRST = { pilot: 0, learning: 100, choosing: 200, profile: 300, final: 1000 };

export interface PredictionRequest {
  readonly problem: RunnableProblem;
  readonly seed: number;
  readonly confidence: number;
  /** Something near the integral. */
  readonly centre: number;
  readonly measured: MeasuredBias | null;
}

export interface Prediction {
  readonly predicted: PredictedBias;
  /** The pairs of S_2K, and what each adds, by replicate. */
  readonly waves: readonly Wave[];
  readonly contributions: readonly Float64Array[];
}

/** `waves` in order of importance; `states`: see `AliasSet`. */
export function predictBias(
  estimator: AliasEstimator,
  waves: readonly Wave[],
  states: number | null,
  request: PredictionRequest,
): Prediction {
  const { seed, centre } = request;
  estimator.learn({ seed, first: FIRST.learning, points: LEARNING_POINTS, centre });
  const pilot = estimator.estimate(waves, { seed, first: FIRST.choosing, ...PILOT, centre });
  let left = MOST_WORK;
  for (let pairs = choosePairs(pilot, waves.length); ; pairs *= 2) {
    const chosen = waves.slice(0, 2 * pairs);
    const final = estimateToGoal(estimator, chosen, pairs, request, left);
    left -= final.work;
    const predicted = predictedOf(final, pairs, states, { ...request, source: estimator.source.id });
    if (predicted.stable || !shows(predicted.tail) || 4 * pairs > waves.length || left <= 0)
      return { predicted, waves: chosen, contributions: final.sums.contributions };
  }
}

function shows({ interval: [low, high] }: Estimated): boolean {
  return low > 0 || high < 0;
}

/** Sums over the first `count` contributions, by replicate. */
function firstOf({ contributions }: AliasSums, count: number, from = 0): number[] {
  return contributions.map((row) => row.subarray(from, count).reduce((sum, value) => sum + value, 0));
}

export interface Spread {
  readonly mean: number;
  readonly error: number;
}

function spreadOf(values: readonly number[]): Spread {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { mean, error: Math.sqrt(squares / (values.length - 1) / values.length) };
}

export function aroundOf({ mean, error }: Spread, confidence: number, degrees: number): Estimated {
  const half = studentFactor(confidence, degrees) * error;
  return { value: mean, interval: [mean - half, mean + half] };
}

/**
 * The smallest power of two of pairs after which nothing shows any more, neither together nor any pair by itself (a single
 * large one deep in the order drowns in the noise of a long sum), and that has something to show.
 */
function choosePairs(sums: AliasSums, available: number): number {
  const ladder: number[] = [];
  for (let pairs = 1; 2 * pairs <= available; pairs *= 2) ladder.push(pairs);
  if (ladder.length === 0) return available;
  const degrees = PILOT.replicates - 1;
  const factor = studentFactor(0.99, degrees);
  const total = spreadOf(firstOf(sums, available));
  // Bonferroni over all pairs
  const single = studentFactor(1 - 0.01 / available, degrees);
  const loud = Array.from({ length: available }, (_, i) => i).filter((i) => {
    const { mean, error } = spreadOf(firstOf(sums, i + 1, i));
    return Math.abs(mean) > Math.max(single * error, SMALL_TAIL * Math.abs(total.mean));
  });
  const last = loud.at(-1) ?? -1;
  const quiet = (pairs: number): boolean =>
    pairs > last &&
    ladder.every((later) => {
      if (later < pairs) return true;
      const { mean, error } = spreadOf(firstOf(sums, 2 * later, pairs));
      const both = spreadOf(firstOf(sums, 2 * later));
      return Math.abs(mean) <= Math.max(factor * error, SMALL_TAIL * Math.abs(both.mean));
    });
  return ladder.find(quiet) ?? ladder.at(-1) ?? available;
}

interface Final {
  readonly sums: AliasSums;
  readonly points: number;
  /** Of all attempts. */
  readonly work: number;
}

/** As many points as the goal takes, within the work allowed; the fewest in any case. */
function estimateToGoal(
  estimator: AliasEstimator,
  waves: readonly Wave[],
  pairs: number,
  { seed, centre, measured, problem }: PredictionRequest,
  allowed: number,
): Final {
  const perWave = (waves[0]?.walsh ?? null) === null ? WORK.wave : WORK.walsh;
  const perPoint = problem.formula.dimension * WORK.coordinate + waves.length * perWave;
  const [first = 0, ...more] = POINTS;
  const at = (points: number, before: number): Final => {
    const sample = { seed, first: FIRST.final, replicates: REPLICATES, points, centre };
    const work = before + points * REPLICATES * perPoint;
    return { sums: estimator.estimate(waves, sample), points, work };
  };
  let final = at(first, 0);
  for (const points of more) {
    const { mean, error } = spreadOf(firstOf(final.sums, pairs));
    const goal = Math.max(WANTED_SHARE * Math.abs(measured?.value ?? mean), measured?.standardError ?? 0);
    if (error <= goal || final.work + points * REPLICATES * perPoint > allowed) break;
    final = at(points, final.work);
  }
  return final;
}

function predictedOf(
  { sums, points }: Final,
  pairs: number,
  states: number | null,
  { problem, confidence, source }: PredictionRequest & { readonly source: string },
): PredictedBias {
  const degrees = REPLICATES - 1;
  const doubled = sums.contributions[0]?.length ?? 0;
  const mean = spreadOf(sums.means).mean;
  const withOrigin = ({ value, interval: [low, high] }: Estimated): Estimated & { origin: number } => {
    const origin = missingOrigin(problem, states, mean + value);
    return { value: value + origin, interval: [low + origin, high + origin], origin };
  };
  const first = spreadOf(firstOf(sums, pairs));
  const tail = aroundOf(spreadOf(firstOf(sums, doubled, pairs)), confidence, degrees);
  const { origin: _, ...both } = withOrigin(aroundOf(spreadOf(firstOf(sums, doubled)), confidence, degrees));
  const half = (tail.interval[1] - tail.interval[0]) / 2;
  const small = Math.abs(tail.value) <= Math.max(half, SMALL_TAIL * Math.abs(both.value));
  return {
    ...withOrigin(aroundOf(first, confidence, degrees)),
    standardError: first.error,
    confidence,
    pairs,
    doubled: { ...both, pairs: doubled },
    tail,
    // a tail that is lost in noise as large as half the sum says nothing
    stable: small && half <= Math.abs(both.value) / 2,
    source,
    points,
    replicates: REPLICATES,
  };
}

/** (m (I + S) - f(0)) / (m - 1) - (I + S): what the state that is never taken changes; `average` is I + S. */
function missingOrigin(problem: RunnableProblem, states: number | null, average: number): number {
  if (states === null || !(states < Number.MAX_SAFE_INTEGER)) return 0;
  const origin = evaluateAt(
    problem,
    Array.from({ length: problem.formula.dimension }, () => 0),
  ).value;
  return Number.isFinite(origin) ? (average - origin) / (states - 1) : 0;
}

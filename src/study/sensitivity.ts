/**
 * Which inputs matter: first-order and total Sobol' indices, closed indices of leading pairs, mean dimension (R. Liu &
 * A. B. Owen, Journal of the American Statistical Association 101 (2006) 712-721: the sum of all total indices) and the
 * truncation dimension at 99 % (R. E. Caflisch, W. Morokoff & A. B. Owen, Journal of Computational Finance 1 (1997) 27-46: the
 * smallest s whose first s coordinates decide so much). A function of the seed and the problem alone.
 */
import { deviation } from "../numeric/moments.js";
import { mean, sum } from "../numeric/sums.js";
import { ratioOf } from "../numeric/ratio.js";
import type { Problem } from "../problem/contract.js";
import { makeKey } from "../sources/key.js";
import type {
  Between,
  InputShare,
  PairShare,
  Sensitivity,
  SensitivityMeasures,
  Share,
} from "../record/sensitivity.js";
import { PickFreeze, type CoordinateSet } from "./pick-freeze.js";
import type { RunnableProblem } from "./runnable.js";
import { measureSmoothness } from "./smoothness.js";

export interface SensitivityRequest {
  readonly seed: number;
  /** Points in all replicates together; fewer where `coordinates` says so. */
  readonly points: number;
  /** Coordinates of points evaluated in all, about. */
  readonly coordinates: number;
  readonly confidence?: number;
}

export const SENSITIVITY = { points: 2 ** 15, coordinates: 2 ** 28 };

const REPLICATES = 16;
/** Fewer points in a replicate tell nothing. */
const FEWEST_POINTS = 64;
/** In all replicates together. */
export const FEWEST_BASE_POINTS = REPLICATES * FEWEST_POINTS;
/** Coordinates beyond these are taken in groups of neighbours. */
const MOST_UNITS = 64;
/** Units whose pairs are looked at: those with the largest part that they do not decide alone. */
const PAIRED_UNITS = 7;
/** Share that a truncation leaves over. */
const LEFT_OVER = 0.01;
const SMOOTHNESS = { from: 5, to: 13, replicates: 32, mostPerPoint: 8 };

interface Unit {
  readonly label: string;
  readonly first: number;
  readonly count: number;
}

const setOf = ({ first, count }: Unit): CoordinateSet => Array.from({ length: count }, (_, k) => first + k);

/** Inputs as units: a whole vector is one. */
function inputUnits(problem: Problem): Unit[] {
  return problem.inputs.map(({ name, first }, k) => {
    const next = problem.inputs[k + 1]?.first ?? problem.dimension;
    return { label: name, first, count: next - first };
  });
}

/** Coordinates one by one, or neighbours inside an input in groups of equal size, so that there are not too many. */
export function unitsOf(problem: Problem): Unit[] {
  const size = Math.ceil(problem.dimension / MOST_UNITS);
  return inputUnits(problem).flatMap((input, k) => {
    if (problem.inputs[k]?.length === null) return [input];
    const units: Unit[] = [];
    for (let at = 0; at < input.count; at += size) {
      const count = Math.min(size, input.count - at);
      const index = count === 1 ? `${at + 1}` : `${at + 1}..${at + count}`;
      units.push({ label: `${input.label}[${index}]`, first: input.first + at, count });
    }
    return units;
  });
}

/** Pure: the same request, the same bits. Throws RangeError for a confidence outside (0, 1). */
export function measureSensitivity(
  problem: RunnableProblem,
  described: Problem,
  request: SensitivityRequest,
): Sensitivity {
  const { confidence = 0.95 } = request;
  if (!(confidence > 0 && confidence < 1))
    throw new RangeError(`confidence: expected a number between 0 and 1, found ${confidence}`);
  const answer = { problem: described.id, output: "mean", confidence, nets: [] };
  const refused = (reason: string): Sensitivity => ({ ...answer, measures: null, reason });
  const { dimension } = problem.formula;
  const units = unitsOf(described);
  // each unit, about 30 pairs and truncations, and A and B twice
  const each = (units.length + 34) * dimension;
  const afforded = Math.min(request.points, request.coordinates / each) / REPLICATES;
  const points = 2 ** Math.floor(Math.log2(Math.max(1, afforded)));
  if (points < FEWEST_POINTS)
    return refused("which inputs matter was not asked: it would cost more than a small part of this study");

  const runner = new PickFreeze(problem, { seed: request.seed, points, replicates: REPLICATES });
  const { means, variances } = runner.whole();
  if (runner.nonFinite > 0)
    return refused(`the integrand is not finite at ${runner.nonFinite} of ${runner.evaluations} points`);
  const variance = mean(variances);
  const size = Math.max(...means.map(Math.abs));
  if (!(variance > 2 ** -80 * size * size)) return refused("the integrand does not vary");
  if (!Number.isFinite(variance)) return refused("the variance of the integrand is not finite");
  const measures = new Measures(runner, variances, confidence);
  const shares = measures.shares(units);
  const pairs = measures.pairs(units, shares);
  const found: Omit<SensitivityMeasures, "evaluations" | "smoothness"> = {
    source: runner.source.id,
    points,
    replicates: REPLICATES,
    mean: mean(means),
    variance,
    varianceError: deviation(variances) / Math.sqrt(REPLICATES) / variance,
    units: shares,
    grouped: units.some(({ count }) => count > 1),
    inputs:
      units.length > described.inputs.length && described.inputs.length > 1
        ? measures.shares(inputUnits(described))
        : [],
    ...pairs,
    allAlone: measures.sumOf(units, "closed"),
    meanDimension: measures.meanDimension(units, request.seed, described.id),
    truncation: measures.truncation(units, dimension),
  };
  if (runner.nonFinite > 0)
    return refused(`the integrand is not finite at ${runner.nonFinite} of ${runner.evaluations} points`);
  const sizes: number[] = [];
  for (let m = SMOOTHNESS.from; m <= SMOOTHNESS.to; m++)
    if (2 ** m <= SMOOTHNESS.mostPerPoint * points) sizes.push(2 ** m);
  const smoothness =
    sizes.length < 4
      ? null
      : measureSmoothness(problem, {
          seed: request.seed,
          sizes,
          replicates: SMOOTHNESS.replicates,
          confidence,
          shares: shares.flatMap(({ count, total }) =>
            Array.from({ length: count }, () => total.value / count),
          ),
        });
  const inNets = smoothness === null ? 0 : sum(sizes) * SMOOTHNESS.replicates;
  return {
    ...answer,
    reason: null,
    measures: { ...found, evaluations: runner.evaluations + inNets, smoothness },
  };
}

/** Shares of the variance from sums by replicate. */
class Measures {
  readonly #runner: PickFreeze;
  readonly #variances: readonly number[];
  readonly #confidence: number;

  constructor(runner: PickFreeze, variances: readonly number[], confidence: number) {
    this.#runner = runner;
    this.#variances = variances;
    this.#confidence = confidence;
  }

  #share(variances: readonly number[]): Share {
    return ratioOf(variances, this.#variances, this.#confidence);
  }

  shares(units: readonly Unit[]): InputShare[] {
    const sums = this.#runner.measure(units.map(setOf));
    return units.map((unit, k) => ({
      ...unit,
      alone: this.#share(sums[k]?.closed ?? []),
      total: this.#share(sums[k]?.total ?? []),
    }));
  }

  sumOf(units: readonly Unit[], kind: "closed" | "total"): Share {
    const sums = this.#runner.measure(units.map(setOf));
    return this.#share(this.#variances.map((_, r) => sum(sums.map((one) => one[kind][r] as number))));
  }

  /** The sum of the total indices of all coordinates, also of those in groups. */
  meanDimension(units: readonly Unit[], seed: number, problem: string): Share {
    const single = units.every(({ count }) => count === 1);
    if (single) return this.sumOf(units, "total");
    // one coordinate of every group, drawn afresh in every replicate, stands for the group
    const sums = this.#runner.measureBy(units.length, (replicate, k) => {
      const { first, count } = units[k] as Unit;
      const source = `coordinate of group ${k}`;
      const key = makeKey({ seed, purpose: "sensitivity", problem, source, replicate });
      return [first + Number(key.below(BigInt(count)))];
    });
    return this.#share(
      this.#variances.map((_, r) =>
        sum(sums.map((one, k) => (one.total[r] as number) * (units[k]?.count ?? 1))),
      ),
    );
  }

  pairs(
    units: readonly Unit[],
    shares: readonly InputShare[],
  ): Pick<SensitivityMeasures, "pairs" | "allPairs"> {
    const apart = ({ alone, total }: InputShare): number => total.value - alone.value;
    const leading = [...shares.keys()]
      .sort((a, b) => apart(shares[b] as InputShare) - apart(shares[a] as InputShare) || a - b)
      .slice(0, PAIRED_UNITS)
      .sort((a, b) => a - b);
    const indices = leading.flatMap((i, k) => leading.slice(k + 1).map((j): [number, number] => [i, j]));
    const at = (k: number): CoordinateSet => setOf(units[k] as Unit);
    const sums = this.#runner.measure(indices.map(([i, j]) => [...at(i), ...at(j)]));
    const alone = this.#runner.measure(units.map(setOf));
    const together = indices.map(([i, j], k) =>
      this.#variances.map(
        (_, r) => (sums[k]?.closed[r] ?? NaN) - (alone[i]?.closed[r] ?? NaN) - (alone[j]?.closed[r] ?? NaN),
      ),
    );
    const pairs = indices.map(([i, j], k): PairShare => ({
      i,
      j,
      closed: this.#share(sums[k]?.closed ?? []),
      interaction: this.#share(together[k] ?? []),
    }));
    const all = this.#variances.map((_, r) => sum(together.map((one) => one[r] as number)));
    return {
      pairs: pairs.sort((a, b) => b.interaction.value - a.interaction.value),
      allPairs: leading.length === units.length && indices.length > 0 ? this.#share(all) : null,
    };
  }

  /**
   * The coordinates behind the first s have part in at most 1 % of the variance: their total index is looked at where units
   * end, by bisection for its upper and for its lower limit.
   */
  truncation(units: readonly Unit[], dimension: number): Between {
    const ends = units.map(({ first, count }) => first + count);
    // least k (units kept) whose remainder has `limit` of its interval at or below the share left over
    const least = (limit: 0 | 1): number => {
      let [low, high] = [0, units.length];
      while (high - low > 1) {
        const middle = (low + high) >> 1;
        const kept = ends[middle - 1] ?? 0;
        const rest = Array.from({ length: dimension - kept }, (_, j) => kept + j);
        const [sums] = this.#runner.measure([rest]);
        const share = this.#share(sums?.total ?? []);
        if (share.interval[limit] <= LEFT_OVER) high = middle;
        else low = middle;
      }
      return high;
    };
    const [lower, upper] = [least(0), least(1)];
    return { atLeast: (ends[lower - 2] ?? 0) + 1, atMost: ends[upper - 1] ?? dimension };
  }
}

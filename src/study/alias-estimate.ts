/**
 * What dual vectors add to an integral, estimated jointly: for each pair h, -h the mean of 2 |w| (f - c) cos 2 pi (h.x - phase)
 * over randomised points of a sound source (f^(h) w(h) and its conjugate). The constant c takes most of f's variance out and
 * changes nothing, since the waves integrate to 0. All waves see the same points, so any sum of contributions has its own
 * spread over the replicates.
 */
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { makeKey } from "../sources/key.js";
import { Integrator } from "./integrator.js";
import type { RunnableProblem } from "./runnable.js";
import { emptyHistograms, tally, Warp } from "./warp.js";
import { factorOf, openWaves, type Wave } from "./waves.js";

export interface AliasRequest {
  readonly seed: number;
  /** First replicate of the purpose "explain" that is taken. */
  readonly first: number;
  readonly replicates: number;
  /** Points of each, a power of two from 64 on. */
  readonly points: number;
  readonly centre: number;
}

export interface AliasSums {
  /** contributions[r][k]: what pair k adds, by replicate r. */
  readonly contributions: readonly Float64Array[];
  /** Means of f, one for each replicate; not finite where a value of f is not. */
  readonly means: readonly number[];
  /** Largest |f - centre| that was met. */
  readonly reach: number;
}

/** A peak that few points of the first step meet is seen well in the second. */
const LEARNING_STEPS = 3;

/** The source that coefficients are estimated with. */
export function trustedSource(dimension: number): SourceChoice {
  const sobol = parseSource("sobol+owen");
  return dimension <= sobol.source.largestDimension ? sobol : parseSource("philox4x32");
}

/** Estimates contributions on one problem, keeping its kernels, and what it has learnt of it, between calls. */
export class AliasEstimator {
  readonly source: SourceChoice;
  readonly #problem: RunnableProblem;
  readonly #integrator: Integrator;
  readonly #coordinates: number;
  #warp: Warp;

  constructor(problem: RunnableProblem) {
    const { dimension, blockPoints } = problem.formula;
    this.source = trustedSource(dimension);
    this.#problem = problem;
    this.#integrator = new Integrator(problem);
    this.#coordinates = this.#integrator.kernels.arena.allocate(blockPoints * dimension * 8);
    this.#warp = Warp.uniform(dimension);
  }

  /** Looks where |f - centre| is large; later estimates put more points there if that halves their variance at least. */
  learn({ seed, first, points, centre }: Omit<AliasRequest, "replicates">): void {
    const { dimension } = this.#problem.formula;
    for (let step = 0; step < LEARNING_STEPS; step++) {
      const histograms = emptyHistograms(dimension);
      this.#replicate(first + step, { seed, points, centre }, (values, weights, count, rows, stride) => {
        for (let i = 0; i < count; i++) {
          tally(histograms, rows, stride, i, Math.abs(values[i] ?? 0) * (weights[i] ?? 1));
        }
      });
      this.#warp = Warp.learnt(histograms);
      if (this.#warp.isUniform) return;
    }
    const [plain, warped] = this.#squares(first + LEARNING_STEPS, { seed, points, centre });
    if (!(warped < plain / 2)) this.#warp = Warp.uniform(dimension);
  }

  /** Mean squares of f - centre under uniform points, and of what counts under moved ones. */
  #squares(replicate: number, request: Sample): [number, number] {
    let [plain, warped] = [0, 0];
    this.#replicate(replicate, request, (values, weights, count) => {
      for (let i = 0; i < count; i++) {
        const [value, weight] = [values[i] ?? 0, weights[i] ?? 1];
        plain += value * value * weight;
        warped += (value * weight) ** 2;
      }
    });
    return [plain, warped];
  }

  estimate(waves: readonly Wave[], request: AliasRequest): AliasSums {
    const { arena } = this.#integrator.kernels;
    const mark = arena.mark();
    const add = openWaves(waves, this.#integrator.kernels);
    const contributions: Float64Array[] = [];
    const means: number[] = [];
    let reach = 0;
    for (let r = request.first; r < request.first + request.replicates; r++) {
      const sums = new Float64Array(waves.length);
      let total = 0;
      this.#replicate(r, request, (values, weights, count, rows, stride) => {
        for (let i = 0; i < count; i++) {
          const value = values[i] ?? 0;
          reach = Math.max(reach, Math.abs(value));
          total += values[i] = value * (weights[i] ?? 1);
        }
        add(values, rows, stride, count, sums);
      });
      contributions.push(sums.map((sum, k) => (factorOf(waves[k] as Wave) * sum) / request.points));
      means.push(request.centre + total / request.points);
    }
    arena.release(mark);
    return { contributions, means, reach };
  }

  /** The mean of f over planes: in each of equal bins of h.u - phase (`binOf` says which), averaged over replicates. */
  profile(bins: number, binOf: BinOf, { replicates, ...sample }: AliasRequest): number[] {
    const sums = Array.from({ length: bins }, () => 0);
    for (let r = sample.first; r < sample.first + replicates; r++) {
      this.#replicate(r, sample, (values, weights, count, rows, stride) => {
        for (let i = 0; i < count; i++) {
          const bin = binOf(rows, stride, i);
          sums[bin] = (sums[bin] ?? 0) + (values[i] ?? 0) * (weights[i] ?? 1);
        }
      });
    }
    // h.u mod 1 is uniform, so each bin has the share 1 / bins of the cube
    return sums.map((sum) => sample.centre + (sum * bins) / (sample.points * replicates));
  }

  /** Takes the points of one replicate block by block: f - centre, weights, coordinates (row j from j * stride on). */
  #replicate(replicate: number, { seed, points, centre }: Sample, take: Take): void {
    const { kernels } = this.#integrator;
    const { id, formula } = this.#problem;
    const { dimension, blockPoints } = formula;
    const mark = kernels.arena.mark();
    const key = makeKey({ seed, purpose: "explain", problem: id, source: this.source.id, replicate });
    const plain = this.source.open({ dimension, n: points, key, replicate }, kernels);
    const { stream, weights } = this.#warp.over(plain, kernels);
    for (let begin = 0; begin < points; begin += blockPoints) {
      const count = Math.min(blockPoints, points - begin);
      const at = this.#integrator.evaluate(stream, count, this.#coordinates);
      const values = kernels.f64(at, count);
      for (let i = 0; i < count; i++) values[i] = (values[i] ?? 0) - centre;
      take(values, weights(), count, kernels.f64(this.#coordinates, blockPoints * dimension), blockPoints);
    }
    kernels.arena.release(mark);
  }
}

/** The bin of point i, whose coordinate j stands in rows[j * stride + i]. */
export type BinOf = (rows: Float64Array, stride: number, i: number) => number;

type Sample = Pick<AliasRequest, "seed" | "points" | "centre">;

type Take = (
  values: Float64Array,
  weights: Float64Array,
  count: number,
  rows: Float64Array,
  stride: number,
) => void;

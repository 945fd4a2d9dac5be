/**
 * Pick-freeze sums: f at points made of two independent point sets A and B with coordinates exchanged (I. M. Sobol',
 * Mathematical Modelling and Computational Experiments 1 (1993) 407-414). For a set u of coordinates, with A_B the points of
 * A that have their coordinates in u from B:
 *
 *   closed variance of u   mean of (f(B) - c) (f(A_B) - f(A))      (A. Saltelli et al., Computer Physics Communications
 *                                                                   181 (2010) 259-270, table 2 (b))
 *   total variance of u    mean of (f(A) - f(A_B))^2 / 2           (M. J. W. Jansen, ibid. 117 (1999) 35-43)
 *
 * c is near the mean and comes from a replicate that is used for nothing else, so all stay unbiased while the first loses
 * most of its variance. A and B are the two halves of the coordinates of one randomised source in 2 d dimensions.
 */
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { makeKey } from "../sources/key.js";
import type { PointStream } from "../sources/contract.js";
import { Integrator } from "./integrator.js";
import type { RunnableProblem } from "./runnable.js";

export interface PickFreezeRequest {
  readonly seed: number;
  /** Points of each replicate: a power of two. */
  readonly points: number;
  /** At least 2. */
  readonly replicates: number;
}

/** Coordinates that are exchanged together, ascending, 0-based. */
export type CoordinateSet = readonly number[];

/** For each replicate: variances, in squares of the integrand's unit. */
export interface SetSums {
  readonly closed: readonly number[];
  readonly total: readonly number[];
}

export interface Whole {
  readonly means: readonly number[];
  readonly variances: readonly number[];
}

export class PickFreeze {
  readonly source: SourceChoice;
  /** Values taken so far, and those that were not finite. */
  evaluations = 0;
  nonFinite = 0;
  readonly #problem: RunnableProblem;
  readonly #request: PickFreezeRequest;
  readonly #integrator: Integrator;
  readonly #both: number;
  readonly #mixed: number;
  readonly #known = new Map<string, SetSums>();
  #centre = 0;
  #whole: Whole | null = null;

  /** Throws RangeError for no points or fewer than 2 replicates. */
  constructor(problem: RunnableProblem, request: PickFreezeRequest) {
    const { points, replicates } = request;
    if (!(Number.isInteger(points) && points >= 2 && Number.isInteger(Math.log2(points))))
      throw new RangeError(`points: expected a power of two from 2 on, found ${points}`);
    if (!(Number.isInteger(replicates) && replicates >= 2))
      throw new RangeError(`replicates: expected a whole number of at least 2, found ${replicates}`);
    const { dimension, blockPoints } = problem.formula;
    const sobol = parseSource("sobol+owen");
    this.source = 2 * dimension <= sobol.source.largestDimension ? sobol : parseSource("philox4x32");
    this.#problem = problem;
    this.#request = request;
    this.#integrator = new Integrator(problem);
    const { arena } = this.#integrator.kernels;
    this.#both = arena.allocate(2 * dimension * blockPoints * 8);
    this.#mixed = arena.allocate(dimension * blockPoints * 8);
  }

  /** Means and variances of f, by replicate. */
  whole(): Whole {
    if (this.#whole !== null) return this.#whole;
    let sum = 0;
    this.#replicate(0, [], (a) => {
      for (const value of a) sum += value;
    });
    this.#centre = sum / this.#request.points;
    const means: number[] = [];
    const variances: number[] = [];
    for (let r = 1; r <= this.#request.replicates; r++) {
      let [sumA, sumB, squares] = [0, 0, 0];
      this.#replicate(r, [], (a, b) => {
        for (let i = 0; i < a.length; i++) {
          const [one, other] = [(a[i] as number) - this.#centre, (b[i] as number) - this.#centre];
          sumA += one;
          sumB += other;
          squares += (one * one + other * other) / 2;
        }
      });
      const n = this.#request.points;
      means.push(this.#centre + (sumA + sumB) / (2 * n));
      // A and B are independent, so the product of their means stands for the square of the mean without bias
      variances.push(squares / n - (sumA / n) * (sumB / n));
    }
    return (this.#whole = { means, variances });
  }

  /** Sums of each set, in order; what was asked for before is not computed again. */
  measure(sets: readonly CoordinateSet[]): SetSums[] {
    this.whole();
    const open = sets.filter((set) => !this.#known.has(set.join()));
    if (open.length > 0) {
      const sums = this.#sums(open.length, (_, k) => open[k] as CoordinateSet);
      for (const [k, set] of open.entries()) this.#known.set(set.join(), sums[k] as SetSums);
    }
    return sets.map((set) => this.#known.get(set.join()) as SetSums);
  }

  /** Sums of `count` sets that may be others in every replicate (from 1 on). */
  measureBy(count: number, setOf: (replicate: number, k: number) => CoordinateSet): SetSums[] {
    this.whole();
    return this.#sums(count, setOf);
  }

  #sums(count: number, setOf: (replicate: number, k: number) => CoordinateSet): SetSums[] {
    const sums = Array.from({ length: count }, () => ({ closed: [] as number[], total: [] as number[] }));
    const n = this.#request.points;
    for (let r = 1; r <= this.#request.replicates; r++) {
      const closed = new Float64Array(count);
      const total = new Float64Array(count);
      const sets = sums.map((_, k) => setOf(r, k));
      this.#replicate(r, sets, (a, b, mixed, k) => {
        let [both, apart] = [0, 0];
        for (let i = 0; i < a.length; i++) {
          const difference = (mixed[i] as number) - (a[i] as number);
          both += ((b[i] as number) - this.#centre) * difference;
          apart += difference * difference;
        }
        closed[k] = (closed[k] as number) + both;
        total[k] = (total[k] as number) + apart / 2;
      });
      for (const [k, sum] of sums.entries()) {
        sum.closed.push((closed[k] as number) / n);
        sum.total.push((total[k] as number) / n);
      }
    }
    return sums;
  }

  /** Goes through one replicate block by block; `take` gets values at A, B and, for each set, the mixed points. */
  #replicate(
    replicate: number,
    sets: readonly CoordinateSet[],
    take: (a: Float64Array, b: Float64Array, mixed: Float64Array, set: number) => void,
  ): void {
    const { kernels } = this.#integrator;
    const { id, formula } = this.#problem;
    const { dimension, blockPoints } = formula;
    const { seed, points } = this.#request;
    const mark = kernels.arena.mark();
    const key = makeKey({ seed, purpose: "sensitivity", problem: id, source: this.source.id, replicate });
    const stream = this.source.open({ dimension: 2 * dimension, n: points, key, replicate }, kernels);
    const half = dimension * blockPoints;
    for (let begin = 0; begin < points; begin += blockPoints) {
      const count = Math.min(blockPoints, points - begin);
      stream.fill(this.#both, blockPoints, count);
      const both = kernels.f64(this.#both, 2 * half);
      const [a, b] = [both.slice(0, half), both.slice(half)];
      const atA = this.#values(a, count);
      const atB = this.#values(b, count);
      if (sets.length === 0) take(atA, atB, atA, 0);
      for (const [k, set] of sets.entries()) {
        const mixed = a.slice();
        for (const j of set) {
          const row = j * blockPoints;
          mixed.set(b.subarray(row, row + blockPoints), row);
        }
        take(atA, atB, this.#values(mixed, count), k);
      }
    }
    kernels.arena.release(mark);
  }

  #values(rows: Float64Array, count: number): Float64Array {
    const { kernels } = this.#integrator;
    const given: PointStream = {
      dimension: this.#problem.formula.dimension,
      fill: (pointer) => {
        kernels.f64(pointer, rows.length).set(rows);
      },
    };
    const at = this.#integrator.evaluate(given, count, this.#mixed);
    const values = kernels.f64(at, count).slice();
    this.evaluations += count;
    for (const value of values) if (!Number.isFinite(value)) this.nonFinite++;
    return values;
  }
}

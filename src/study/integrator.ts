/**
 * One integrand in one kernel instance: streams the points of a source through transforms, formula and leaf sums, block
 * by block, and gives the moments at each size asked for. Memory is flat in n. Whatever the block size, and whether a
 * size is an intermediate or the final one, the moments at a size have the same bits (estimators/tree.ts).
 */
import { instantiateKernels, type Kernels } from "../kernels/instance.js";
import { LEAF_POINTS, MomentsTree, type TreeNode } from "../estimators/tree.js";
import { momentsWidth, type Moments } from "../estimators/moments.js";
import type { PointStream } from "../sources/contract.js";
import { TransformPasses } from "./transform-passes.js";
import type { RunnableProblem } from "./runnable.js";

/** The first non-finite value met, and what the integrand was given there. */
export interface OffendingPoint {
  readonly index: number;
  readonly inputs: readonly number[];
  readonly value: string;
}

/** What a run takes beside the moments of the formula's channels. */
export interface Extras {
  /** Adds the channel (f - origin)^2 behind those of the formula. */
  readonly squares?: boolean;
}

export interface SizeResult {
  readonly n: number;
  readonly moments: Moments;
  /** Points below n with a non-finite value. */
  readonly nonFinite: number;
}

export interface IntegrationResult {
  readonly sizes: readonly SizeResult[];
  readonly offending: OffendingPoint | null;
  /** Maximal nodes of the summation tree over the whole leaves of the range. */
  readonly nodes: readonly TreeNode[];
}

type IntegrandFunction = (x: number, result: number, count: number, pool: number, scratch: number) => void;

export class Integrator {
  readonly kernels: Kernels;
  readonly #problem: RunnableProblem;
  readonly #evaluate: IntegrandFunction;
  readonly #width: number;
  readonly #channels: number;
  readonly #squares: boolean;
  #origin: number | null = null;
  readonly #x: number;
  readonly #values: number;
  readonly #rows: number;
  readonly #cutRow: number;
  readonly #tree: MomentsTree;
  readonly #pool: number;
  readonly #scratch: number;
  readonly #passes: TransformPasses;

  constructor(problem: RunnableProblem, { squares = false }: Extras = {}) {
    const { formula } = problem;
    const { blockPoints, dimension, pool, scratchBytes } = formula;
    const channels = formula.channels + (squares ? 1 : 0);
    this.#channels = channels;
    this.#squares = squares;
    this.#problem = problem;
    this.kernels = instantiateKernels(problem.module);
    this.#evaluate = this.kernels.formula as IntegrandFunction;
    const { arena } = this.kernels;
    this.#width = momentsWidth(channels);
    this.#x = arena.allocate(blockPoints * dimension * 8);
    this.#values = arena.allocate(blockPoints * channels * 8);
    this.#rows = arena.allocate((blockPoints / LEAF_POINTS) * this.#width * 8);
    this.#cutRow = arena.allocate(this.#width * 8);
    this.#tree = new MomentsTree(this.kernels, channels);
    this.#pool = arena.allocate(pool.byteLength);
    this.#scratch = arena.allocate(scratchBytes);
    this.#passes = new TransformPasses(this.kernels, problem.transforms, this.#x, blockPoints);
    this.kernels.f64(this.#pool, pool.length).set(pool);
    this.kernels.f64(this.#x, blockPoints * dimension).fill(0.5);
  }

  /**
   * Moments at each of `sizes` (ascending) of the points from `first` (a multiple of 64) on; a size counts points from
   * index 0 where `first` is 0. The stream stands at point `first`. `keep` takes the values of channel 0, in order.
   */
  run(
    stream: PointStream,
    sizes: readonly number[],
    first = 0,
    keep: Float64Array | null = null,
  ): IntegrationResult {
    const { blockPoints } = this.#problem.formula;
    const last = sizes.at(-1) ?? 0;
    const results: SizeResult[] = [];
    let nonFinite = 0;
    let offending: OffendingPoint | null = null;
    let next = 0;
    this.#tree.reset();
    for (let begin = first; begin < last; begin += blockPoints) {
      const count = Math.min(blockPoints, last - begin);
      const bad = this.#evaluateBlock(stream, count);
      keep?.set(this.kernels.f64(this.#values, count), begin - first);
      if (bad >= 0) offending ??= this.#describe(begin, bad);
      let pushed = 0;
      for (; next < sizes.length && (sizes[next] as number) <= begin + count; next++) {
        const n = sizes[next] as number;
        pushed = this.#pushLeaves(begin, pushed, n - begin);
        const moments = this.#total(pushed, n - begin);
        results.push({ n, moments, nonFinite: nonFinite + this.#countNonFinite(bad, n - begin) });
      }
      this.#pushLeaves(begin, pushed, count);
      nonFinite += this.#countNonFinite(bad, count);
    }
    return { sizes: results, offending, nodes: this.#tree.nodes() };
  }

  /**
   * Values of the next points of a stream, at most a block of them, beside the uniform coordinates that they come from:
   * those are left at `coordinates` (room for a block, rows a block apart), the values at the address that is returned.
   */
  evaluate(stream: PointStream, count: number, coordinates: number): number {
    const { blockPoints, dimension } = this.#problem.formula;
    stream.fill(coordinates, blockPoints, count);
    const size = blockPoints * dimension;
    this.kernels.f64(this.#x, size).set(this.kernels.f64(coordinates, size));
    this.#passes.run(count);
    this.#evaluate(this.#x, this.#values, count, this.#pool, this.#scratch);
    return this.#values;
  }

  /** What is taken off before squaring: f where all coordinates are 1/2, or 0 where that is not finite. */
  get origin(): number {
    if (this.#origin === null) {
      const { blockPoints, dimension } = this.#problem.formula;
      this.kernels.f64(this.#x, blockPoints * dimension).fill(0.5);
      this.#passes.run(1);
      this.#evaluate(this.#x, this.#values, 1, this.#pool, this.#scratch);
      const centre = this.kernels.f64(this.#values, 1)[0] ?? NaN;
      this.#origin = Number.isFinite(centre) ? centre : 0;
    }
    return this.#origin;
  }

  /** The inputs (one list per coordinate) and first values of `count` points of a stream. */
  points(stream: PointStream, count: number): { inputs: Float64Array[]; values: Float64Array } {
    const { blockPoints, dimension } = this.#problem.formula;
    const inputs = Array.from({ length: dimension }, () => new Float64Array(count));
    const values = new Float64Array(count);
    for (let begin = 0; begin < count; begin += blockPoints) {
      const size = Math.min(blockPoints, count - begin);
      this.#evaluateBlock(stream, size);
      const x = this.kernels.f64(this.#x, blockPoints * dimension);
      for (const [r, row] of inputs.entries())
        row.set(x.subarray(r * blockPoints, r * blockPoints + size), begin);
      values.set(this.kernels.f64(this.#values, size), begin);
    }
    return { inputs, values };
  }

  /** Fills, transforms, evaluates and sums one block; gives the first point with a non-finite value, or -1. */
  #evaluateBlock(stream: PointStream, count: number): number {
    const { blockPoints } = this.#problem.formula;
    const origin = this.#squares ? this.origin : 0;
    stream.fill(this.#x, blockPoints, count);
    this.#passes.run(count);
    this.#evaluate(this.#x, this.#values, count, this.#pool, this.#scratch);
    if (this.#squares) this.#square(count, origin);
    return this.kernels.exports.leafMoments(this.#values, blockPoints, this.#channels, count, this.#rows);
  }

  #square(count: number, origin: number): void {
    const { blockPoints, channels } = this.#problem.formula;
    const values = this.kernels.f64(this.#values, blockPoints * (channels + 1));
    for (let i = 0; i < count; i++)
      values[blockPoints * channels + i] = ((values[i] as number) - origin) ** 2;
  }

  /** Pushes the whole leaves of the block from leaf `pushed` on that end at point `end` or before; gives the next leaf. */
  #pushLeaves(begin: number, pushed: number, end: number): number {
    const whole = Math.floor(end / LEAF_POINTS);
    this.#tree.pushLeaves(
      begin / LEAF_POINTS + pushed,
      this.#rows + pushed * this.#width * 8,
      whole - pushed,
    );
    return whole;
  }

  /** Moments of all points before `end` of the block, whose leaf `leaf` is cut there. */
  #total(leaf: number, end: number): Moments {
    const { blockPoints } = this.#problem.formula;
    const cutPoints = end - leaf * LEAF_POINTS;
    const values = this.#values + leaf * LEAF_POINTS * 8;
    if (cutPoints > 0)
      this.kernels.exports.leafMoments(values, blockPoints, this.#channels, cutPoints, this.#cutRow);
    const moments = this.#tree.total(this.#cutRow, cutPoints);
    if (moments === null) throw new Error("a size of no points was asked for");
    return moments;
  }

  #countNonFinite(bad: number, count: number): number {
    if (bad < 0) return 0;
    const { blockPoints } = this.#problem.formula;
    return this.kernels.exports.countNonFinite(this.#values, blockPoints, this.#channels, count);
  }

  /** What the integrand was given at point `i` of the last block, in order of coordinates. */
  inputsAt(i: number): number[] {
    const { blockPoints, dimension } = this.#problem.formula;
    const x = this.kernels.f64(this.#x, blockPoints * dimension);
    return Array.from({ length: dimension }, (_, r) => x[r * blockPoints + i] as number);
  }

  #describe(begin: number, i: number): OffendingPoint {
    const value = String(this.kernels.f64(this.#values, this.#problem.formula.blockPoints)[i]);
    return { index: begin + i, inputs: this.inputsAt(i), value };
  }
}

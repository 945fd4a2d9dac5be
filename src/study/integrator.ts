/**
 * One integrand in one kernel instance: streams the points of a source through transforms, formula and leaf sums, block
 * by block, and gives the moments at each size asked for. Memory is flat in n. Whatever the block size, and whether a
 * size is an intermediate or the final one, the moments at a size have the same bits (estimators/tree.ts).
 */
import { instantiateKernels, type Kernels } from "../kernels/instance.js";
import { LEAF_POINTS, MomentsTree, type TreeNode } from "../estimators/tree.js";
import { momentsWidth, type Moments } from "../estimators/moments.js";
import type { PointStream } from "../sources/contract.js";
import type { RunnableProblem } from "./runnable.js";

/** The first non-finite value met, and what the integrand was given there. */
export interface OffendingPoint {
  readonly index: number;
  readonly inputs: readonly number[];
  readonly value: string;
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
  readonly #x: number;
  readonly #values: number;
  readonly #rows: number;
  readonly #pool: number;
  readonly #scratch: number;
  readonly #transformScratch: number;

  constructor(problem: RunnableProblem) {
    const { formula } = problem;
    const { blockPoints, channels, dimension, pool, scratchBytes } = formula;
    this.#problem = problem;
    this.kernels = instantiateKernels(problem.module);
    this.#evaluate = this.kernels.formula as IntegrandFunction;
    const { arena } = this.kernels;
    this.#width = momentsWidth(channels);
    this.#x = arena.allocate(blockPoints * dimension * 8);
    this.#values = arena.allocate(blockPoints * channels * 8);
    this.#rows = arena.allocate((blockPoints / LEAF_POINTS) * this.#width * 8);
    this.#pool = arena.allocate(pool.byteLength);
    this.#scratch = arena.allocate(scratchBytes);
    this.#transformScratch = arena.allocate(this.kernels.exports.normalBlockScratch());
    this.kernels.f64(this.#pool, pool.length).set(pool);
    this.kernels.f64(this.#x, blockPoints * dimension).fill(0.5);
  }

  /**
   * Moments at each of `sizes` (ascending) of the points from `first` (a multiple of 64) on; a size counts points from
   * index 0 where `first` is 0. The stream stands at point `first`.
   */
  run(stream: PointStream, sizes: readonly number[], first = 0): IntegrationResult {
    const { blockPoints } = this.#problem.formula;
    const last = sizes.at(-1) ?? 0;
    const tree = new MomentsTree();
    const results: SizeResult[] = [];
    let nonFinite = 0;
    let offending: OffendingPoint | null = null;
    let next = 0;
    for (let begin = first; begin < last; begin += blockPoints) {
      const count = Math.min(blockPoints, last - begin);
      const bad = this.#evaluateBlock(stream, count);
      if (bad >= 0) offending ??= this.#describe(begin, bad);
      let leaf = 0;
      const pushLeavesBelow = (end: number): void => {
        for (; (leaf + 1) * LEAF_POINTS <= end; leaf++) tree.push(this.#leaf(begin, leaf));
      };
      for (; next < sizes.length && (sizes[next] as number) <= begin + count; next++) {
        const n = sizes[next] as number;
        pushLeavesBelow(n - begin);
        const moments = tree.total(this.#cutLeaf(leaf, n - begin));
        if (moments === null) throw new Error("a size of no points was asked for");
        results.push({ n, moments, nonFinite: nonFinite + this.#countNonFinite(bad, n - begin) });
      }
      pushLeavesBelow(count);
      nonFinite += this.#countNonFinite(bad, count);
    }
    return { sizes: results, offending, nodes: tree.nodes() };
  }

  /** Fills, transforms, evaluates and sums one block; gives the first point with a non-finite value, or -1. */
  #evaluateBlock(stream: PointStream, count: number): number {
    const { exports } = this.kernels;
    const { blockPoints, channels } = this.#problem.formula;
    stream.fill(this.#x, blockPoints, count);
    for (const { first, rows } of this.#problem.transforms) {
      exports.normalBlock(
        this.#x + first * blockPoints * 8,
        blockPoints,
        rows,
        count,
        this.#transformScratch,
      );
    }
    this.#evaluate(this.#x, this.#values, count, this.#pool, this.#scratch);
    return exports.leafMoments(this.#values, blockPoints, channels, count, this.#rows);
  }

  #leaf(begin: number, leaf: number): TreeNode {
    const index = begin / LEAF_POINTS + leaf;
    return { level: 0, index, moments: this.#momentsAt(this.#rows + leaf * this.#width * 8, LEAF_POINTS) };
  }

  /** Moments of the points of leaf `leaf` below `end` (both within the block), or null where the leaf is empty. */
  #cutLeaf(leaf: number, end: number): Moments | null {
    const count = end - leaf * LEAF_POINTS;
    if (count === 0) return null;
    const { blockPoints, channels } = this.#problem.formula;
    const row = this.#rows + leaf * this.#width * 8;
    const kept = this.kernels.f64(row, this.#width).slice();
    this.kernels.exports.leafMoments(
      this.#values + leaf * LEAF_POINTS * 8,
      blockPoints,
      channels,
      count,
      row,
    );
    const moments = this.#momentsAt(row, count);
    this.kernels.f64(row, this.#width).set(kept);
    return moments;
  }

  #momentsAt(row: number, n: number): Moments {
    return {
      n,
      channels: this.#problem.formula.channels,
      values: this.kernels.f64(row, this.#width).slice(),
    };
  }

  #countNonFinite(bad: number, count: number): number {
    if (bad < 0) return 0;
    const { blockPoints, channels } = this.#problem.formula;
    return this.kernels.exports.countNonFinite(this.#values, blockPoints, channels, count);
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

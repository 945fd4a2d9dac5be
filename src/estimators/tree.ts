/**
 * The summation tree over leaves of 64 points, in kernel memory (kernels/assembly/sums/tree.ts). The estimate at n is the
 * fold of the maximal nodes over leaves 0 ... ceil(n / 64) - 1, from the right; so n as an intermediate or as the final
 * size, and any split into ranges at leaf boundaries, give the same bits.
 */
import type { Kernels } from "../kernels/instance.js";
import { momentsWidth, type Moments } from "./moments.js";

export const LEAF_POINTS = 64;

/** A node covers leaves index * 2^level up to, not including, (index + 1) * 2^level. */
export interface TreeNode {
  readonly level: number;
  readonly index: number;
  readonly moments: Moments;
}

/** The maximal nodes of the leaves seen so far, which come in ascending order. Takes memory from the arena. */
export class MomentsTree {
  readonly #kernels: Kernels;
  readonly #channels: number;
  readonly #width: number;
  readonly #tree: number;
  readonly #row: number;

  constructor(kernels: Kernels, channels: number) {
    this.#kernels = kernels;
    this.#channels = channels;
    this.#width = momentsWidth(channels);
    this.#tree = kernels.arena.allocate(kernels.exports.treeBytes(channels));
    this.#row = kernels.arena.allocate(this.#width * 8);
    this.reset();
  }

  reset(): void {
    this.#kernels.exports.treeReset(this.#tree);
  }

  /** Adds the next node to the right; siblings are merged as soon as both are there. */
  push({ level, index, moments }: TreeNode): void {
    this.#kernels.f64(this.#row, this.#width).set(moments.values);
    this.#kernels.exports.treePush(this.#tree, this.#channels, level, index, this.#row);
  }

  /** Adds `leaves` whole leaves from leaf `first` on; their rows of moments (leafMoments) stand at `rows`. */
  pushLeaves(first: number, rows: number, leaves: number): void {
    this.#kernels.exports.treePushLeaves(this.#tree, this.#channels, first, rows, leaves);
  }

  /** The maximal nodes, left to right: all that a range of points has to hand over. */
  nodes(): TreeNode[] {
    const count = this.#kernels.u32(this.#tree, 1)[0] as number;
    const size = 16 + this.#width * 8;
    return Array.from({ length: count }, (_, i) => {
      const node = this.#tree + 16 + i * size;
      const level = this.#kernels.u32(node, 1)[0] as number;
      const index = this.#kernels.f64(node + 8, 1)[0] as number;
      return { level, index, moments: this.#moments(node + 16, LEAF_POINTS * 2 ** level) };
    });
  }

  /**
   * Moments of everything pushed, and of a cut leaf behind it where there is one (`cutPoints` > 0, its row at `cut`); null where there is nothing.
   */
  total(cut = this.#row, cutPoints = 0): Moments | null {
    const n = this.#kernels.exports.treeTotal(this.#tree, this.#channels, cut, cutPoints, this.#row);
    return n === 0 ? null : this.#moments(this.#row, n);
  }

  #moments(row: number, n: number): Moments {
    return { n, channels: this.#channels, values: this.#kernels.f64(row, this.#width).slice() };
  }
}

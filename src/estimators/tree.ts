/**
 * The summation tree over leaves of 64 points. Node (level, index) covers leaves index * 2^level up to, not including,
 * (index + 1) * 2^level. The estimate at n is the fold of the maximal nodes over leaves 0 ... ceil(n / 64) - 1, from the
 * right; so n as an intermediate or as the final size, and any split into ranges at leaf boundaries, give the same bits.
 */
import { mergeMoments, type Moments } from "./moments.js";

export const LEAF_POINTS = 64;

export interface TreeNode {
  readonly level: number;
  readonly index: number;
  readonly moments: Moments;
}

/** The maximal nodes of the leaves seen so far, which come in ascending order. */
export class MomentsTree {
  readonly #nodes: TreeNode[] = [];

  /** Adds the next node to the right (a leaf has level 0); siblings are merged as soon as both are there. */
  push(node: TreeNode): void {
    let next = node;
    for (;;) {
      const left = this.#nodes.at(-1);
      if (left === undefined || left.level !== next.level || left.index % 2 !== 0) break;
      this.#nodes.pop();
      next = {
        level: left.level + 1,
        index: left.index / 2,
        moments: mergeMoments(left.moments, next.moments),
      };
    }
    this.#nodes.push(next);
  }

  /** The maximal nodes, left to right: all that a range of points has to hand over. */
  nodes(): readonly TreeNode[] {
    return [...this.#nodes];
  }

  /** Moments of everything pushed, and of a cut leaf behind it where there is one; null where there is nothing. */
  total(cutLeaf: Moments | null = null): Moments | null {
    let sum = cutLeaf;
    for (let i = this.#nodes.length - 1; i >= 0; i--) {
      const node = this.#nodes[i] as TreeNode;
      sum = sum === null ? node.moments : mergeMoments(node.moments, sum);
    }
    return sum;
  }
}

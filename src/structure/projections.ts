/**
 * The projections of a lattice of tuples that stand out: index sets {0, i, j, ...} of few coordinates up to a span, each with
 * its own dual lattice and figure (P. L'Ecuyer and C. Lemieux, "Variance reduction via lattice rules", Management Science 46
 * (2000) 1214-1235, section 4, who take the least figure over such sets). Successive outputs of a recurrence are
 * stationary, so sets that begin with 0 stand for all; for a rank-1 lattice every set counts.
 */
import { dualFigure, type DualFigures } from "./dual-lattice.js";
import type { Tuples } from "./tuples.js";

export interface Projection extends DualFigures {
  /** 0-based coordinates (or outputs). */
  readonly indices: readonly number[];
}

export interface ProjectionRequest {
  /** Indices are below this number. */
  readonly span: number;
  /** Coordinates at most, 2 at least. */
  readonly largest: number;
  /** How many projections of each size are kept, the worst first. */
  readonly keep: number;
}

/** The worst projections of 2 ... largest coordinates by their figure. */
export function worstProjections(tuples: Tuples, { span, largest, keep }: ProjectionRequest): Projection[] {
  const width = tuples.size === null ? span : Math.min(span, tuples.size);
  const found: Projection[] = [];
  for (let size = 2; size <= Math.min(largest, width); size++) {
    const all: Projection[] = [];
    for (const indices of indexSets(size, width)) {
      if (tuples.size === null && indices[0] !== 0) continue;
      all.push({ ...dualFigure(tuples, indices), indices });
    }
    all.sort((a, b) => a.figure - b.figure);
    found.push(...all.slice(0, keep));
  }
  return found;
}

/** All sets of `size` indices below `span`, in lexicographic order. */
export function* indexSets(size: number, span: number, from = 0): Generator<number[], void> {
  if (size === 0) {
    yield [];
    return;
  }
  for (let first = from; first <= span - size; first++) {
    for (const rest of indexSets(size - 1, span, first + 1)) yield [first, ...rest];
  }
}

/** Kernels of the summation tree; pointers are byte addresses in the kernel memory. */
export interface SumExports {
  /**
   * Moments of the leaves (64 points each) of a block of results; see assembly/sums/leaves.ts for the layout.
   * Returns the index of the first point with a non-finite value, or -1.
   */
  leafMoments(values: number, stride: number, channels: number, count: number, out: number): number;
  /** Number of points with a non-finite value in any channel. */
  countNonFinite(values: number, stride: number, channels: number, count: number): number;
  /** Bytes of a summation tree; see assembly/sums/tree.ts for its layout. */
  treeBytes(channels: number): number;
  /** Empties the tree. */
  treeReset(tree: number): void;
  /** Adds the next node to the right, its row of moments at `row`. */
  treePush(tree: number, channels: number, level: number, index: number, row: number): void;
  /** Adds `leaves` leaves from leaf `first` on, their rows one after the other at `rows`. */
  treePushLeaves(tree: number, channels: number, first: number, rows: number, leaves: number): void;
  /**
   * Row of everything pushed and of a cut leaf at `cut` behind it (where cutPoints > 0), written to `out`, which may be
   * `cut`. Returns the number of points.
   */
  treeTotal(tree: number, channels: number, cut: number, cutPoints: number, out: number): number;
  /**
   * Adds to out[k] the sum of (value - centre) cos 2 pi (h.x - phase) for each wave k; see assembly/sums/aliases.ts for the
   * layout of waves.
   */
  aliasSums(
    x: number,
    stride: number,
    count: number,
    values: number,
    centre: number,
    waves: number,
    vectors: number,
    out: number,
  ): void;
}

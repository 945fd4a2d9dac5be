/** Kernels of the summation tree; pointers are byte addresses in the kernel memory. */
export interface SumExports {
  /**
   * Moments of the leaves (64 points each) of a block of results; see assembly/sums/leaves.ts for the layout.
   * Returns the index of the first point with a non-finite value, or -1.
   */
  leafMoments(values: number, stride: number, channels: number, count: number, out: number): number;
  /** Number of points with a non-finite value in any channel. */
  countNonFinite(values: number, stride: number, channels: number, count: number): number;
}

/** A sum over pairs of points i < k, tile <= k < last; see assembly/discrepancy/products.ts for the rows that each kind takes. */
export type PairSum = (
  first: number,
  second: number,
  tile: number,
  last: number,
  stride: number,
  dimension: number,
  table: number,
) => number;

/** Kernels of L2 discrepancies; pointers are byte addresses in the kernel memory. */
export interface DiscrepancyExports {
  /** Minimum of two values a coordinate, of the set of rows that is larger at the first point. */
  readonly minimumPairs: PairSum;
  /** Wrap-around: the rows are the coordinates, the second set is not read. */
  readonly wraparoundPairs: PairSum;
  /** Mixture: rows x / sqrt(2) and the weights. */
  readonly mixturePairs: PairSum;
}

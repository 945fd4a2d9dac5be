/**
 * The bias that a quantity other than a mean has at finite n with sound points, of order 1/n: each replicate states a range
 * for it (quantities/contract.ts). Inside that range a bias is no fault of the source; outside, only what lies beyond is
 * tested and budgeted as one.
 */
import type { Cell } from "../record/types.js";

type Range = readonly [number, number];

/** The part of `bias` beyond the range, with its sign; all of it for quantities that have no such bias. */
export function beyond(bias: number, range: Range | null | undefined): number {
  if (range === null || range === undefined) return bias;
  return bias - Math.min(Math.max(bias, range[0]), range[1]);
}

/** The range of a cell carried to n points by 1/n; null where the cell has none. */
export function rangeAt(cell: Pick<Cell, "n" | "finiteBias">, n: number): Range | null {
  const range = cell.finiteBias ?? null;
  return range === null ? null : [(range[0] * cell.n) / n, (range[1] * cell.n) / n];
}

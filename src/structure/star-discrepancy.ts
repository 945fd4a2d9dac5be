/**
 * The exact star discrepancy, the largest difference between the share of points in a box [0, y) and its volume; in one
 * dimension also the extreme discrepancy, over all intervals (H. Niederreiter, "Random Number Generation and Quasi-Monte
 * Carlo Methods", SIAM, 1992, theorems 2.6 and 2.7). In more dimensions the largest difference is found at corners whose
 * coordinates are coordinates of points, or 1, with the points on the far faces counted or not: all of them are tried, some
 * (n + 1)^d, which is the honest price (the problem is NP-hard: M. Gnewuch, A. Srivastav and C. Winzen, Journal of Complexity
 * 25 (2009) 115-127).
 */
import type { PointSet } from "./points.js";

/** Corners tried at most: about a second. */
const LARGEST_WORK = 2 ** 25;

/** Whether (n + 1)^d corners are few enough; always in one dimension, where sorting does. */
export function starDiscrepancyFeasible({ n, dimension }: Pick<PointSet, "n" | "dimension">): boolean {
  return dimension === 1 || (n + 1) ** dimension <= LARGEST_WORK;
}

/** Throws RangeError where there are too many corners. */
export function starDiscrepancy(points: PointSet): number {
  const { n, dimension, coordinates } = points;
  if (!starDiscrepancyFeasible(points)) {
    throw new RangeError(
      `points: the exact star discrepancy of ${n} points in ${dimension} dimensions needs ${n + 1}^${dimension} boxes, more than 2^25; take fewer points, one dimension, or an L2 discrepancy`,
    );
  }
  const rows = Array.from({ length: dimension }, (_, j) => coordinates.subarray(j * n, (j + 1) * n));
  const corners = rows.map((row) => [...new Set([...row, 1])].sort((a, b) => a - b));
  let worst = 0;
  const visit = (j: number, volume: number, inside: readonly number[], closed: readonly number[]): void => {
    const row = rows[j];
    if (row === undefined) return;
    if (j < dimension - 1) {
      for (const y of corners[j] ?? []) {
        const below = inside.filter((i) => (row[i] ?? NaN) < y);
        visit(
          j + 1,
          volume * y,
          below,
          closed.filter((i) => (row[i] ?? NaN) <= y),
        );
      }
      return;
    }
    const values = inside.map((i) => row[i] ?? NaN).sort((a, b) => a - b);
    const all = closed.map((i) => row[i] ?? NaN).sort((a, b) => a - b);
    let [open, reached] = [0, 0];
    for (const y of corners[j] ?? []) {
      while ((values[open] ?? Infinity) < y) open++;
      while ((all[reached] ?? Infinity) <= y) reached++;
      worst = Math.max(worst, volume * y - open / n, reached / n - volume * y);
    }
  };
  const everything = Array.from({ length: n }, (_, i) => i);
  visit(0, 1, everything, everything);
  return worst;
}

/** The largest difference over all intervals, for points of one coordinate. Throws RangeError for more. */
export function extremeDiscrepancy({ n, dimension, coordinates }: PointSet): number {
  if (dimension !== 1) {
    throw new RangeError(
      `points: the extreme discrepancy is for one dimension, found ${dimension}; choose one coordinate`,
    );
  }
  let [largest, least] = [-Infinity, Infinity];
  for (const [i, x] of coordinates.slice().sort().entries()) {
    largest = Math.max(largest, (i + 1) / n - x);
    least = Math.min(least, (i + 1) / n - x);
  }
  return 1 / n + largest - least;
}

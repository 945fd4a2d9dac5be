/**
 * From which n a pair of coordinates of Halton's sequence covers the square: coordinates in the bases p and q put one point
 * into each of p q boxes in every p q points (J. H. Halton, Numerische Mathematik 2 (1960) 84-90), and with fewer points boxes
 * stay empty. In high coordinates both then rise in step, and the points lie on a few lines (W. J. Morokoff and R. E. Caflisch,
 * SIAM Journal on Scientific Computing 15 (1994) 1251-1279), which the correlation of the first points shows.
 *
 * A leap that shares no factor with the bases keeps p q and changes which pairs rise in step (Kocis and Whiten 1997). Random
 * permutations of the digits keep p q too, and no pair rises in step on average over them (Owen 2017).
 */
import type { PointSet } from "./points.js";

export interface HaltonPair {
  /** 0-based. */
  readonly indices: readonly [number, number];
  readonly bases: readonly [number, number];
  /** Points from which every box of the pair is hit. */
  readonly usableFrom: number;
  /** Correlation of the two coordinates over the first points; null where it was not computed. */
  readonly correlation: number | null;
}

export interface HaltonPairs {
  readonly pairs: number;
  /** Pairs that the points suffice for. */
  readonly usable: number;
  /** The most leading coordinates of which all pairs are usable. */
  readonly usableDimension: number;
  readonly worst: readonly HaltonPair[];
}

/** Multiplications for all correlations: about a second. */
const LARGEST_WORK = 2 ** 29;

/**
 * The pairs of coordinates with these bases (null: no radical inverse, left out) at n points; the worst by absolute
 * correlation where the points are given and pairs are few enough, else by the points that they need.
 */
export function haltonPairs(
  bases: readonly (number | null)[],
  n: number,
  points: PointSet | null,
  keep: number,
): HaltonPairs {
  const deviations =
    points === null || bases.length ** 2 * points.n > LARGEST_WORK ? null : standardised(points);
  let usable = 0;
  let usableDimension = bases.length;
  const all: HaltonPair[] = [];
  for (const [j, second] of bases.entries()) {
    for (const [i, first] of bases.slice(0, j).entries()) {
      if (first === null || second === null) continue;
      const usableFrom = first * second;
      if (usableFrom <= n) usable++;
      else usableDimension = Math.min(usableDimension, j);
      const [x, y] = [deviations?.[i], deviations?.[j]];
      const correlation = x === undefined || y === undefined ? null : product(x, y);
      all.push({ indices: [i, j], bases: [first, second], usableFrom, correlation });
    }
  }
  all.sort(
    (a, b) => Math.abs(b.correlation ?? 0) - Math.abs(a.correlation ?? 0) || b.usableFrom - a.usableFrom,
  );
  return { pairs: all.length, usable, usableDimension, worst: all.slice(0, keep) };
}

/** Coordinates less their mean, scaled to length 1. */
function standardised({ n, dimension, coordinates }: PointSet): Float64Array[] {
  return Array.from({ length: dimension }, (_, j) => {
    const row = coordinates.slice(j * n, (j + 1) * n);
    const mean = row.reduce((sum, x) => sum + x, 0) / n;
    const length = Math.sqrt(row.reduce((sum, x) => sum + (x - mean) ** 2, 0));
    return row.map((x) => (length === 0 ? 0 : (x - mean) / length));
  });
}

function product(x: Float64Array, y: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += (x[i] ?? 0) * (y[i] ?? 0);
  return sum;
}

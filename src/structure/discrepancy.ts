/**
 * L2 discrepancies of a point set, each a worst-case error of integration: centred and wrap-around (F. J. Hickernell, "A
 * generalized discrepancy and quadrature error bound", Mathematics of Computation 67 (1998) 299-322, and in Random and
 * Quasi-Random Point Sets, Springer, 1998, 109-166), mixture (Y.-D. Zhou, K.-T. Fang and J.-H. Ning, "Mixture discrepancy for
 * quasi-random point sets", Journal of Complexity 29 (2013) 283-301), star (T. T. Warnock, in Applications of Number Theory
 * to Numerical Analysis, Academic Press, 1972, 319-343) and modified star, which counts all projections (Hickernell 1998).
 * O(n^2 d): kernels/assembly/discrepancy.
 *
 * Values of different dimensions cannot be compared, and star L2 says little beyond some ten coordinates unless n is
 * enormous (J. Matousek, Journal of Complexity 14 (1998) 527-556).
 */
import type { PairSum } from "../kernels/discrepancy-exports.js";
import { instantiateKernels } from "../kernels/instance.js";
import { sum } from "../numeric/sums.js";
import type { PointSet } from "./points.js";

export type DiscrepancyKind = "centred" | "wraparound" | "mixture" | "star" | "modified-star";

export interface Discrepancy {
  readonly kind: DiscrepancyKind;
  readonly squared: number;
  readonly root: number;
  /** Bound for the rounding error of the square, which is a small difference of three terms; far below it at sizes that are feasible. */
  readonly rounding: number;
}

interface Definition {
  /** Per coordinate: of the term without points, of the sum over points (times `single`), of a point with itself. */
  readonly constant: number;
  readonly single: ((x: number) => number) | null;
  readonly diagonal: (x: number) => number;
  /** Sign of the term without points. */
  readonly sign: 1 | -1;
  readonly pairs: "minimumPairs" | "wraparoundPairs" | "mixturePairs";
  /** Rows for the kernel. */
  readonly first: (x: number) => number;
  readonly second: (x: number) => number;
}

const definitions: Readonly<Record<DiscrepancyKind, Definition>> = {
  centred: {
    constant: 13 / 12,
    single: (x) => 1 + Math.abs(x - 0.5) / 2 - (x - 0.5) ** 2 / 2,
    diagonal: (x) => 1 + Math.abs(x - 0.5),
    sign: 1,
    pairs: "minimumPairs",
    first: (x) => Math.max(1, 0.5 + x),
    second: (x) => Math.max(1, 1.5 - x),
  },
  wraparound: {
    constant: 4 / 3,
    single: null,
    diagonal: () => 1.5,
    sign: -1,
    pairs: "wraparoundPairs",
    first: (x) => x,
    second: (x) => x,
  },
  mixture: {
    constant: 19 / 12,
    single: (x) => 5 / 3 - Math.abs(x - 0.5) / 4 - (x - 0.5) ** 2 / 4,
    diagonal: (x) => 15 / 8 - Math.abs(x - 0.5) / 2,
    sign: 1,
    pairs: "mixturePairs",
    first: (x) => x * Math.SQRT1_2,
    second: (x) => 51 / 64 - Math.abs(x - 0.5) / 4,
  },
  star: {
    constant: 1 / 3,
    single: (x) => (1 - x * x) / 2,
    diagonal: (x) => 1 - x,
    sign: 1,
    pairs: "minimumPairs",
    first: (x) => 1 - x,
    second: (x) => 1 - x,
  },
  "modified-star": {
    constant: 4 / 3,
    single: (x) => (3 - x * x) / 2,
    diagonal: (x) => 2 - x,
    sign: 1,
    pairs: "minimumPairs",
    first: (x) => 2 - x,
    second: (x) => 2 - x,
  },
};

export const DISCREPANCY_KINDS = Object.keys(definitions) as readonly DiscrepancyKind[];

/** Points whose rows stay in the cache. */
const TILE = 256;

/** Relative rounding error of the terms in d dimensions; some 20 times what was seen (4e-16) for n = 2^14, d = 20. */
const roundingIn = (dimension: number): number => (dimension + 16) * 2 ** -52;

/** The discrepancies asked for, in that order. */
export function discrepancies(points: PointSet, kinds = DISCREPANCY_KINDS): Discrepancy[] {
  const { n, dimension, coordinates } = points;
  const kernels = instantiateKernels();
  const stride = Math.ceil(n / 8) * 8;
  const bytes = stride * dimension * 8;
  const [first, second] = [kernels.arena.allocate(bytes), kernels.arena.allocate(bytes)];
  const table = kernels.arena.allocate(dimension * 32);
  return kinds.map((kind) => {
    const definition = definitions[kind];
    const rows = [
      [definition.first, kernels.f64(first, stride * dimension)],
      [definition.second, kernels.f64(second, stride * dimension)],
    ] as const;
    for (const [value, row] of rows) {
      row.fill(0);
      for (let j = 0; j < dimension; j++) {
        for (let i = 0; i < n; i++) row[j * stride + i] = value(coordinates[j * n + i] ?? NaN);
      }
    }
    const pairs: PairSum = kernels.exports[definition.pairs];
    const tiles = Array.from({ length: Math.ceil(n / TILE) }, (_, tile) =>
      pairs(first, second, tile * TILE, Math.min(n, (tile + 1) * TILE), stride, dimension, table),
    );
    const total = 2 * sum(tiles) + products(points, definition.diagonal);
    const constant = definition.constant ** dimension;
    const single = definition.single === null ? 0 : (2 * products(points, definition.single)) / n;
    const squared = definition.sign * constant - single + total / n / n;
    const rounding = roundingIn(dimension) * (constant + single + total / n / n);
    return { kind, squared, root: Math.sqrt(squared), rounding };
  });
}

/** The sum over the points of the product over the coordinates, compensated (Neumaier 1974). */
function products({ n, dimension, coordinates }: PointSet, factor: (x: number) => number): number {
  const product = new Float64Array(n).fill(1);
  for (let j = 0; j < dimension; j++) {
    for (let i = 0; i < n; i++) product[i] = (product[i] ?? 0) * factor(coordinates[j * n + i] ?? NaN);
  }
  return sum(product);
}

/**
 * Ways to make a Gaussian path X_1 ... X_n from n standard normals. All have the same law; they differ in how much of the
 * path the first coordinates decide, which is what quasi-random points notice.
 *
 * - increments: each point from the one before it.
 * - bridge: the end first, then middles of the widest gaps left (B. Moskowitz and R. E. Caflisch, "Smoothness and dimension
 *   reduction in quasi-Monte Carlo methods", Mathematical and Computer Modelling 23 (1996) 37-54).
 * - principal-components: eigenvectors of the covariance by falling eigenvalue (P. Acworth, M. Broadie and P. Glasserman,
 *   "A comparison of some Monte Carlo and quasi Monte Carlo techniques for option pricing", MCQMC 1996, Springer 1998, 1-18).
 *
 * Increments and bridge use that the paths here are Markov: given its neighbours, a point does not depend on the others.
 */
import type { LinearStep } from "../../numeric/linear-steps.js";
import { principalFactor } from "./matrices.js";

export const CONSTRUCTIONS = ["increments", "bridge", "principal-components"] as const;
export type Construction = (typeof CONSTRUCTIONS)[number];

type Covariance = readonly (readonly number[])[];

const at = (c: Covariance, i: number, j: number): number => c[i]?.[j] ?? 0;

/** Indices in the order of a bridge, each with its neighbours already made (-1 and n where there are none). */
export function bridgeOrder(n: number): (readonly [left: number, index: number, right: number])[] {
  const order: [number, number, number][] = [[-1, n - 1, n]];
  const gaps: [number, number][] = [[-1, n - 1]];
  for (let k = 0; k < gaps.length; k++) {
    const [left, right] = gaps[k] ?? [0, 0];
    if (right - left < 2) continue;
    const middle = Math.floor((left + right) / 2);
    order.push([left, middle, right]);
    gaps.push([left, middle], [middle, right]);
  }
  return order;
}

/** Coefficients of the neighbours and the deviation left, for a point of a Markov path. */
function conditional(c: Covariance, index: number, neighbours: readonly number[]): [number[], number] {
  const own = at(c, index, index);
  const [a, b] = neighbours;
  if (a === undefined) return [[], Math.sqrt(own)];
  if (b === undefined) {
    const weight = at(c, a, index) / at(c, a, a);
    return [[weight], Math.sqrt(Math.max(0, own - weight * at(c, a, index)))];
  }
  const determinant = at(c, a, a) * at(c, b, b) - at(c, a, b) ** 2;
  const [ka, kb] = [at(c, a, index), at(c, b, index)];
  const wa = (ka * at(c, b, b) - kb * at(c, a, b)) / determinant;
  const wb = (kb * at(c, a, a) - ka * at(c, a, b)) / determinant;
  return [[wa, wb], Math.sqrt(Math.max(0, own - wa * ka - wb * kb))];
}

/** Steps that turn the normals of rows `first` ... into a path with this mean and covariance. */
export function pathSteps(
  construction: Construction,
  mean: readonly number[],
  covariance: Covariance,
  first: number,
): LinearStep[] {
  const n = mean.length;
  if (construction === "principal-components") {
    return principalFactor(covariance).map((row, i) => ({
      row: first + i,
      constant: mean[i] ?? 0,
      terms: row.map((coefficient, k) => [coefficient, { row: first + k }] as const),
    }));
  }
  const order =
    construction === "bridge" ? bridgeOrder(n) : Array.from({ length: n }, (_, i) => [i - 1, i, n] as const);
  const made = new Map<number, number>();
  return order.map(([left, index, right], k) => {
    const neighbours = [left, right].filter((i) => made.has(i));
    const [weights, deviation] = conditional(covariance, index, neighbours);
    made.set(index, k);
    // deviations from the mean are carried on, so the constant is what the neighbours' means leave
    const constant = neighbours.reduce(
      (sum, i, p) => sum - (weights[p] ?? 0) * (mean[i] ?? 0),
      mean[index] ?? 0,
    );
    return {
      row: first + index,
      constant,
      terms: [
        ...neighbours.map((i, p) => [weights[p] ?? 0, { step: made.get(i) ?? 0 }] as const),
        [deviation, { row: first + k }] as const,
      ],
    };
  });
}

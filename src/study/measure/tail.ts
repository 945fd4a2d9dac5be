/**
 * The tail of the integrand: Hill's estimate (Annals of Statistics 3 (1975) 1163-1174) of the index a in
 * P(|f| > x) ~ x^-a from the k largest of |f| among the points. A variance needs a > 2. How the estimate is judged is the
 * business of the findings.
 */
import type { TailMeasurement } from "../../record/measurements.js";
import type { RunnableProblem } from "../runnable.js";
import { samplePoints } from "./points.js";

const POINTS = 2 ** 16;
const COORDINATES = 2 ** 20;

/** Largest values used: enough for an index known to an eighth, few enough to be in the tail. */
const ORDER = 64;

/** null where values are not finite. */
export function measureTail(problem: RunnableProblem, seed: number): TailMeasurement | null {
  const { dimension } = problem.formula;
  const points = Math.min(POINTS, Math.max(2 ** 12, Math.floor(COORDINATES / dimension)));
  const { values } = samplePoints(problem, seed, "tail", points);
  if (!values.every(Number.isFinite)) return null;
  const first = values[0] ?? 0;
  const sizes = values.map(Math.abs).sort().reverse();
  return {
    points,
    order: ORDER,
    index: hill(sizes, ORDER),
    further: hill(sizes, ORDER / 4),
    constant: values.every((value) => value === first),
  };
}

/** Hill's estimate from descending sizes; null where the largest are equal or too few are above 0. */
export function hill(sizes: ArrayLike<number>, order: number): number | null {
  const threshold = sizes[order] ?? 0;
  if (!(threshold > 0)) return null;
  let total = 0;
  for (let i = 0; i < order; i++) total += Math.log((sizes[i] ?? NaN) / threshold);
  return total > 0 ? order / total : null;
}

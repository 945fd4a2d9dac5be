/**
 * What the inverse distribution functions of the inputs cost: each standard normal input z of a subsample is held against
 * the true quantile in about 30 digits (numeric/normal-residual.ts). The integrand is taken at z and at z less its error,
 * that error made 2^20 times as large so that it stands out of the rounding of f, and the difference is divided by as much:
 * exact where f is straight over such steps (1e-10), and right on average for jumps, whose chance to lie between grows alike.
 * Normals that go on into another law, a dependence or a path take their error along. Other quantiles have no 30 digits to
 * be held against here: they are moved by the bound that their kernels and tables keep, 1e-12 relative, all one way; those
 * of discrete laws are exact.
 */
import { quantileError } from "../../numeric/normal-residual.js";
import type { TransformMeasurement } from "../../record/measurements.js";
import type { Transform } from "../../problem/contract.js";
import { CLOSED } from "../../problem/distributions/contract.js";
import type { RunnableProblem } from "../runnable.js";
import { pairedMean, pointsAt, samplePoints, valuesAt } from "./points.js";

const AMPLIFICATION = 2 ** 20;

/** Inputs looked at for a problem: some 20 microseconds each. */
const INPUTS = 8192;

/** Relative error that the quantiles of all distributions keep, test/published/quantiles.test.ts. */
const QUANTILE_BOUND = 1e-12;

/** Shifts, scales and the exponential of a normal round in their last place only and are not counted as quantiles. */
const ROUNDING_ONLY: ReadonlySet<number> = new Set([CLOSED.identity, CLOSED.exponentialOfNormal]);

/** Whether a pass is a quantile with an error of its own. */
const hasBound = (transform: Transform): boolean =>
  transform.kind === "pieces" || (transform.kind === "closed" && !ROUNDING_ONLY.has(transform.form));

/** Each row of the transforms once. */
function rowsOf(transforms: readonly Transform[]): Set<number> {
  return new Set(transforms.flatMap(({ first, rows }) => Array.from({ length: rows }, (_, k) => first + k)));
}

/** null where all inputs are uniform. */
export function measureTransform(problem: RunnableProblem, seed: number): TransformMeasurement | null {
  const rows = problem.transforms.reduce((sum, transform) => sum + transform.rows, 0);
  if (rows === 0) return null;
  const points = Math.min(1024, Math.max(64, Math.floor(INPUTS / rows)));
  const normals = problem.transforms.filter(({ kind }) => kind === "normal");
  const others = problem.transforms.filter(({ kind }) => kind !== "normal");
  const uniform = samplePoints({ ...problem, transforms: [] }, seed, "transform", points).inputs;
  const normal = samplePoints({ ...problem, transforms: normals }, seed, "transform", points).inputs;
  const { values } = samplePoints(problem, seed, "transform", points);
  const movedNormals = normal.map((row) => Float64Array.from(row));
  for (const r of rowsOf(normals)) {
    const [row, from, to] = [normal[r], uniform[r], movedNormals[r]];
    if (row === undefined || from === undefined || to === undefined) continue;
    for (const [i, z] of row.entries()) to[i] = z - AMPLIFICATION * quantileError(z, from[i] ?? NaN);
  }
  const moved = pointsAt(problem, movedNormals, others).inputs.map((row) => Float64Array.from(row));
  for (const r of rowsOf(others.filter(hasBound))) {
    const row = moved[r];
    for (const [i, x] of row?.entries() ?? [])
      if (row !== undefined) row[i] = x * (1 + AMPLIFICATION * QUANTILE_BOUND);
  }
  const exact = valuesAt(problem, moved);
  const differences = Array.from(values, (value, i) => (value - (exact[i] ?? NaN)) / AMPLIFICATION);
  return { ...pairedMean(differences), amplification: AMPLIFICATION };
}

/**
 * What the inverse distribution functions of the inputs cost: each standard normal input z of a subsample is held against
 * the true quantile in about 30 digits (numeric/normal-residual.ts). The integrand is taken at z and at z less its error,
 * that error made 2^20 times as large so that it stands out of the rounding of f, and the difference is divided by as much:
 * exact where f is straight over such steps (1e-10), and right on average for jumps, whose chance to lie between grows alike.
 */
import { quantileError } from "../../numeric/normal-residual.js";
import type { TransformMeasurement } from "../../record/measurements.js";
import type { RunnableProblem } from "../runnable.js";
import { pairedMean, samplePoints, valuesAt } from "./points.js";

const AMPLIFICATION = 2 ** 20;

/** Inputs looked at for a problem: some 20 microseconds each. */
const INPUTS = 8192;

/** null where all inputs are uniform. */
export function measureTransform(problem: RunnableProblem, seed: number): TransformMeasurement | null {
  const rows = problem.transforms.reduce((sum, transform) => sum + transform.rows, 0);
  if (rows === 0) return null;
  const points = Math.min(1024, Math.max(64, Math.floor(INPUTS / rows)));
  const uniform = samplePoints({ ...problem, transforms: [] }, seed, "transform", points).inputs;
  const { inputs, values } = samplePoints(problem, seed, "transform", points);
  const moved = inputs.map((row) => Float64Array.from(row));
  for (const { first, rows: count } of problem.transforms) {
    for (let r = first; r < first + count; r++) {
      const [row, from, to] = [inputs[r], uniform[r], moved[r]];
      if (row === undefined || from === undefined || to === undefined) continue;
      for (const [i, z] of row.entries()) to[i] = z - AMPLIFICATION * quantileError(z, from[i] ?? NaN);
    }
  }
  const exact = valuesAt(problem, moved);
  const differences = Array.from(values, (value, i) => (value - (exact[i] ?? NaN)) / AMPLIFICATION);
  return { ...pairedMean(differences), amplification: AMPLIFICATION };
}

/** Points of a trusted source for the measurements of a budget, and given inputs as a stream. */
import type { PairedMean } from "../../record/measurements.js";
import { deviation } from "../../numeric/moments.js";
import { mean } from "../../numeric/sums.js";
import type { Transform } from "../../problem/contract.js";
import type { PointStream } from "../../sources/contract.js";
import { makeKey } from "../../sources/key.js";
import { philox4x64 } from "../../sources/philox4x64.js";
import { Integrator } from "../integrator.js";
import type { RunnableProblem } from "../runnable.js";

export interface Sample {
  readonly inputs: readonly Float64Array[];
  readonly values: Float64Array;
}

/** `n` points of philox4x64 for one part of the measurements. */
export function samplePoints(problem: RunnableProblem, seed: number, part: string, n: number): Sample {
  const { dimension } = problem.formula;
  const integrator = new Integrator(problem);
  const key = makeKey({ seed, purpose: "budget", problem: problem.id, source: part, replicate: 0 });
  const stream = philox4x64.open({ dimension, n, randomisations: [], key }, integrator.kernels);
  return integrator.points(stream, n);
}

/** The integrand at given rows, after `transforms` of them: what it was given, and its values. */
export function pointsAt(
  problem: RunnableProblem,
  rows: readonly Float64Array[],
  transforms: readonly Transform[],
): Sample {
  const integrator = new Integrator({ ...problem, transforms });
  let next = 0;
  const stream: PointStream = {
    dimension: rows.length,
    fill(pointer, stride, count) {
      const block = integrator.kernels.f64(pointer, (rows.length - 1) * stride + count);
      for (const [r, row] of rows.entries()) block.set(row.subarray(next, next + count), r * stride);
      next += count;
    },
  };
  return integrator.points(stream, rows[0]?.length ?? 0);
}

/** Values of the integrand at given inputs, without any change of coordinates. */
export function valuesAt(problem: RunnableProblem, inputs: readonly Float64Array[]): Float64Array {
  return pointsAt(problem, inputs, []).values;
}

/** Mean of differences with its standard error. */
export function pairedMean(differences: readonly number[]): PairedMean {
  const points = differences.length;
  return {
    points,
    bias: mean(differences),
    standardError: deviation(differences) / Math.sqrt(points),
    changed: differences.filter((difference) => difference !== 0).length,
  };
}

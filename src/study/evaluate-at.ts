/** The integrand at one point of the unit cube, by the same path as in a study: transforms, formula, leaf sum. */
import type { PointStream } from "../sources/contract.js";
import { Integrator } from "./integrator.js";
import type { RunnableProblem } from "./runnable.js";

export interface PointValue {
  /** What the integrand was given, in order of coordinates. */
  readonly inputs: readonly number[];
  readonly value: number;
}

/** `coordinates` has one number in (0, 1) for each dimension of the problem. */
export function evaluateAt(problem: RunnableProblem, coordinates: readonly number[]): PointValue {
  const integrator = new Integrator(problem);
  const point: PointStream = {
    dimension: coordinates.length,
    fill(pointer, stride) {
      const rows = integrator.kernels.f64(pointer, stride * coordinates.length);
      for (const [j, u] of coordinates.entries()) rows[j * stride] = u;
    },
  };
  const value = integrator.run(point, [1]).sizes[0]?.moments.values[0] as number;
  return { inputs: integrator.inputsAt(0), value };
}

/**
 * Does the integrand grow without bound towards an edge of the unit cube? Asked of the formula itself, beside its transforms:
 * uniform inputs go down to 2^-1000 and up to 1 - 2^-53, normal ones out to 10^8, one coordinate at a time. Found is what
 * grows on along such a line: not a proof of the opposite, but 1/u, log u, exp z and z itself do not pass.
 */
import type { PointStream } from "../sources/contract.js";
import { Integrator } from "./integrator.js";
import type { RunnableProblem } from "./runnable.js";

/** Nearer and farther values of an input on its way to an edge. */
type Way = readonly [near: number, far: number];

const UNIFORM: readonly Way[] = [
  [2 ** -500, 2 ** -1000],
  [1 - 2 ** -26, 1 - 2 ** -53],
];
const NORMAL: readonly Way[] = [
  [-1e4, -1e8],
  [1e4, 1e8],
];

/** Values of the other inputs, as steps from their middle. */
const BASES = [0, 0.2, -0.3];

/** Growth on the way, and beyond what was met inside. */
const [FARTHER, BEYOND] = [1.2, 2];

/** The first coordinate (0-based) towards whose edge |f - centre| grows beyond `reach`, its largest value inside; or null. */
export function unboundedAlong(problem: RunnableProblem, centre: number, reach: number): number | null {
  const integrator = new Integrator({
    ...problem,
    transforms: problem.transforms.filter(({ kind }) => kind !== "normal"),
  });
  const { dimension, blockPoints } = problem.formula;
  const normal = new Set(
    problem.transforms
      .filter(({ kind }) => kind === "normal")
      .flatMap(({ first, rows }) => Array.from({ length: rows }, (_, k) => first + k)),
  );
  const coordinates = integrator.kernels.arena.allocate(blockPoints * dimension * 8);
  const size = (j: number, value: number, base: number): number => {
    const point: PointStream = {
      dimension,
      fill: (pointer, stride) => {
        const rows = integrator.kernels.f64(pointer, stride * dimension);
        for (let k = 0; k < dimension; k++) rows[k * stride] = normal.has(k) ? base : 0.5 + base;
        rows[j * stride] = value;
      },
    };
    const at = integrator.evaluate(point, 1, coordinates);
    return Math.abs((integrator.kernels.f64(at, 1)[0] ?? NaN) - centre);
  };
  for (let j = 0; j < dimension; j++) {
    for (const [near, far] of normal.has(j) ? NORMAL : UNIFORM) {
      for (const base of BASES) {
        const [before, after] = [size(j, near, base), size(j, far, base)];
        if (before === Infinity || after === Infinity) return j;
        if (after > FARTHER * before && after > BEYOND * reach) return j;
      }
    }
  }
  return null;
}

/** Quantiles of a law at given levels, by its passes in a kernel instance. */
import { instantiateKernels } from "../../../src/kernels/instance.js";
import type { Law } from "../../../src/problem/distributions/contract.js";
import { TransformPasses } from "../../../src/study/transform-passes.js";

const kernels = instantiateKernels();

export function quantiles(law: Law, levels: ArrayLike<number>): number[] {
  const mark = kernels.arena.mark();
  const stride = Math.ceil(levels.length / 64) * 64;
  const x = kernels.arena.allocate(stride * 8);
  const transforms = law.passes().map((pass) => ({ ...pass, first: 0, rows: 1 }));
  const passes = new TransformPasses(kernels, transforms, x, stride);
  kernels.f64(x, stride).fill(0.5);
  kernels.f64(x, levels.length).set(levels);
  passes.run(levels.length);
  const result = [...kernels.f64(x, levels.length)];
  kernels.arena.release(mark);
  return result;
}

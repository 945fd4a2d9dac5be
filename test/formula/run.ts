/** Runs compiled formulas at given points, for the tests of this room. */
import { compileFormula } from "../../src/formula/index.js";
import type { CompiledFormula, FormulaScope } from "../../src/formula/contract.js";
import { instantiateKernels } from "../../src/kernels/instance.js";

/** Calls the integrand block by block and returns the channels of every point. */
export function runFormula(formula: CompiledFormula, points: readonly (readonly number[])[]): number[][] {
  const kernels = instantiateKernels(new WebAssembly.Module(formula.moduleBytes));
  const { blockPoints, dimension, channels } = formula;
  const x = kernels.arena.allocate(blockPoints * 8 * Math.max(1, dimension));
  const result = kernels.arena.allocate(blockPoints * 8 * channels);
  const pool = kernels.arena.allocate(formula.pool.length * 8);
  const scratch = kernels.arena.allocate(formula.scratchBytes);
  kernels.f64(pool, formula.pool.length).set(formula.pool);
  const integrand = (kernels.exports as unknown as Record<string, (...args: number[]) => void>).integrand;
  const values: number[][] = [];
  for (let begin = 0; begin < points.length; begin += blockPoints) {
    const block = points.slice(begin, begin + blockPoints);
    const view = kernels.f64(x, blockPoints * dimension);
    block.forEach((point, i) => {
      for (let row = 0; row < dimension; row++) view[row * blockPoints + i] = point[row] ?? NaN;
    });
    integrand?.(x, result, block.length, pool, scratch);
    const results = kernels.f64(result, blockPoints * channels);
    block.forEach((_, i) => {
      values.push(Array.from({ length: channels }, (_, c) => results[c * blockPoints + i] ?? NaN));
    });
  }
  return values;
}

/** Values of a formula with one channel. */
export async function valuesOf(
  text: string,
  scope: FormulaScope,
  points: readonly (readonly number[])[],
): Promise<number[]> {
  return runFormula(await compileFormula(text, scope), points).map((channels) => channels[0] ?? NaN);
}

/** A scope with one vector input and constants. */
export function vectorScope(
  name: string,
  length: number,
  constants: FormulaScope["constants"] = {},
): FormulaScope {
  return { inputs: [{ name, length, first: 0 }], constants };
}

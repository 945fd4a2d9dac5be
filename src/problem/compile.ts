/** A problem as the engine runs it: transforms of uniform coordinates into inputs, then the compiled integrand. */
import type { CompiledFormula, FormulaScope } from "../formula/contract.js";
import { compileFormula } from "../formula/index.js";
import type { Problem, Quantity, Transform } from "./contract.js";
import { quantityForm } from "./quantity.js";
import { transformsOf } from "./passes.js";

export interface CompiledProblem {
  readonly formula: CompiledFormula;
  /** In order of coordinates; to be done on a block before the formula is called. */
  readonly transforms: readonly Transform[];
}

/** The names that the integrand of a problem may use. */
export function scopeOf({ inputs, constants }: Problem): FormulaScope {
  return { inputs: inputs.map(({ name, length, first }) => ({ name, length, first })), constants };
}

/** Numbers that the integrand gives for each point. */
export function componentsOf(quantity: Quantity): 1 | 2 {
  return quantityForm(quantity).integrand === "pair" ? 2 : 1;
}

/** Compiles a problem. Throws FormulaError where the integrand is refused, which a problem from a file never is. */
export async function compileProblem(problem: Problem): Promise<CompiledProblem> {
  const formula = await compileFormula(problem.integrand, scopeOf(problem), componentsOf(problem.quantity));
  return { formula, transforms: transformsOf(problem) };
}

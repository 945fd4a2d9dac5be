/** A problem as the engine runs it: transforms of uniform coordinates into inputs, then the compiled integrand. */
import type { CompiledFormula, FormulaScope } from "../formula/contract.js";
import { compileFormula } from "../formula/index.js";
import type { Problem, Transform } from "./contract.js";
import { lawOf } from "./distributions/registry.js";

export interface CompiledProblem {
  readonly formula: CompiledFormula;
  /** In order of coordinates; to be done on a block before the formula is called. */
  readonly transforms: readonly Transform[];
}

/** The names that the integrand of a problem may use. */
export function scopeOf({ inputs, constants }: Problem): FormulaScope {
  return { inputs: inputs.map(({ name, length, first }) => ({ name, length, first })), constants };
}

/** The passes that turn uniform coordinates into inputs: normals first, neighbouring ones in one pass, then the others. */
export function transformsOf(problem: Problem): Transform[] {
  const normals: Transform[] = [];
  const others: Transform[] = [];
  for (const { distribution, parameters, first, length } of problem.inputs) {
    const rows = length ?? 1;
    for (const pass of lawOf(distribution, parameters).passes()) {
      const before = normals.at(-1);
      if (pass.kind !== "normal") others.push({ ...pass, first, rows });
      else if (before !== undefined && before.first + before.rows === first) {
        normals[normals.length - 1] = { ...before, rows: before.rows + rows };
      } else normals.push({ ...pass, first, rows });
    }
  }
  return [...normals, ...others];
}

/** Compiles a problem. Throws FormulaError where the integrand is refused, which a problem from a file never is. */
export async function compileProblem(problem: Problem): Promise<CompiledProblem> {
  const formula = await compileFormula(problem.integrand, scopeOf(problem));
  return { formula, transforms: transformsOf(problem) };
}

/** A problem ready to run: plain data and a compiled module, both of which can be posted to a thread. */
import type { CompiledFormula } from "../formula/contract.js";
import { compileProblem } from "../problem/compile.js";
import type { Problem, Quantity, Transform } from "../problem/contract.js";

export interface RunnableProblem {
  readonly id: string;
  readonly module: WebAssembly.Module;
  readonly formula: Omit<CompiledFormula, "moduleBytes">;
  readonly transforms: readonly Transform[];
  readonly quantity: Quantity;
}

/**
 * Compiles problems: the module of each is made by the engine here, once; threads are handed the result. Throws
 * FormulaError where an integrand is refused, which that of a loaded problem never is.
 */
export async function prepareProblems(problems: readonly Problem[]): Promise<RunnableProblem[]> {
  const runnable: RunnableProblem[] = [];
  for (const problem of problems) {
    const { formula, transforms } = await compileProblem(problem);
    const { moduleBytes, ...rest } = formula;
    const module = new WebAssembly.Module(moduleBytes);
    runnable.push({ id: problem.id, module, formula: rest, transforms, quantity: problem.quantity });
  }
  return runnable;
}

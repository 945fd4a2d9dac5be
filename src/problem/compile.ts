/** A problem as the engine runs it: transforms of uniform coordinates into inputs, then the compiled integrand. */
import type { Problem, Transform } from "./contract.js";

/** The passes that turn uniform coordinates into inputs, in order; neighbouring ones of one kind are one pass. */
export function transformsOf(problem: Problem): Transform[] {
  const transforms: Transform[] = [];
  for (const { distribution, first, length } of problem.inputs) {
    if (distribution === "uniform") continue;
    const rows = length ?? 1;
    const before = transforms.at(-1);
    if (before?.kind === distribution && before.first + before.rows === first) {
      transforms[transforms.length - 1] = { ...before, rows: before.rows + rows };
    } else transforms.push({ kind: distribution, first, rows });
  }
  return transforms;
}

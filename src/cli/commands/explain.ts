/**
 * `tolerand explain PROBLEM`: with `--source X`, why this source errs on this integrand; without a source, what the
 * integrand itself is like.
 */
import { loadPaths, type LoadedProblem } from "../../problem/load.js";
import { parseSource } from "../../sources/choice.js";
import type { Arguments, Io } from "../command.js";
import { InputError } from "../errors.js";
import { messages } from "../messages.js";
import { textFlag } from "../read.js";
import { settingsFromFlags } from "../study-flags.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const flags = settingsFromFlags(args, io);
  const loaded = await oneProblem(textFlag(args, "problem") ?? "");
  if ((flags.sources ?? []).length === 0) return explainInputs(loaded);
  return explainSources(loaded);
}

async function oneProblem(path: string): Promise<LoadedProblem> {
  const { problems } = await loadPaths([path], parseSource);
  const [problem, other] = problems;
  if (problem !== undefined && other === undefined) return problem;
  const ids = problems.map((one) => one.problem.id);
  throw new InputError(messages.oneProblem(path, ids));
}

/** Which inputs matter, effective dimension, kinks. */
function explainInputs({ problem }: LoadedProblem): number {
  throw new InputError(messages.explainNeeds(problem.id));
}

function explainSources({ problem }: LoadedProblem): number {
  throw new InputError(messages.explainNeeds(problem.id));
}

/**
 * `tolerand explain PROBLEM`: with `--source X`, why this source errs on this integrand; without a source, what the
 * integrand itself is like.
 */
import { availableParallelism } from "node:os";
import { resolve } from "node:path";
import type { SourceSpec, StudySettings } from "../../problem/contract.js";
import { loadPaths, type LoadedProblem } from "../../problem/load.js";
import { runStudy } from "../../recipe.js";
import { jsonText } from "../../record/json.js";
import { parseSource } from "../../sources/choice.js";
import { threads } from "../../study/executor.js";
import { startProgress } from "../../study/progress.js";
import { prepareProblems } from "../../study/runnable.js";
import { buildSpec } from "../../study/settings.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { environmentOf } from "../environment.js";
import { asInput, InputError } from "../errors.js";
import { messages } from "../messages.js";
import { booleanFlag, textFlag, wholeFlag } from "../read.js";
import { settingsFromFlags } from "../study-flags.js";

/** Points and replicates that a bias is measured with; one that shows is measured again on 256 fresh replicates. */
const DEFAULTS = { points: 2 ** 15, replicates: 64 };

/** Run beside what is explained: the tests take the deviation of a sound source where the other has none. */
const SOUND = "philox4x32";

export async function run(args: Arguments, io: Io): Promise<number> {
  const flags = settingsFromFlags(args, io);
  const loaded = await oneProblem(textFlag(args, "problem") ?? "");
  const { sources = [] } = flags;
  if (sources.length === 0) return explainInputs(loaded);
  return explainSources(loaded, { ...flags, sources }, args, io);
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

/** A study of one problem and one size, every source in it explained. */
async function explainSources(
  loaded: LoadedProblem,
  flags: StudySettings & { readonly sources: readonly SourceSpec[] },
  args: Arguments,
  io: Io,
): Promise<number> {
  const asked = flags.sources.map((spec) => parseSource(spec).id);
  // what is in use is not asked about here
  const alone = { ...loaded, problem: { ...loaded.problem, inUse: null } };
  const { spec } = asInput(() =>
    buildSpec([alone], {
      replicates: DEFAULTS.replicates,
      ...flags,
      sources: asked.includes(SOUND) ? flags.sources : [...flags.sources, SOUND],
      sizes: [wholeFlag(args, "points", 1) ?? DEFAULTS.points],
    }),
  );
  const problems = await prepareProblems(spec.problems);
  const count = availableParallelism();
  const executor = threads(problems, count);
  const started = Date.now();
  const record = await runStudy({
    spec,
    problems,
    executor,
    journal: { done: new Map(), add: () => undefined },
    signal: io.signal,
    stage: (title, work) => startProgress(title, work, io.stderr),
    environment: (complete) => environmentOf(io, { threads: count, started, complete }),
    warnings: [],
    explain: asked,
  }).finally(() => executor.close());
  if (!record.environment.complete) return EXIT.interrupted;

  const explanations = record.explanations.filter(({ source }) => asked.includes(source));
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(explanations, 2)}\n`);
  else {
    const { explanationText } = await import("../../report/explanation-text.js");
    io.stdout.write(explanationText(alone.problem.title, explanations));
  }
  const out = textFlag(args, "out");
  if (out !== null) {
    const { writeReport } = await import("../../report/index.js");
    const folder = resolve(io.cwd, out);
    await writeReport(record, folder, { images: false });
    io.stderr.write(messages.next(`open ${folder}/index.html`));
  }
  return EXIT.done;
}

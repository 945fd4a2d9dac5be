/**
 * `tolerand explain PROBLEM`: with `--source X`, why this source errs on this integrand; without a source, what the
 * integrand itself is like.
 */
import { existsSync } from "node:fs";
import { join, resolve } from "node:path";
import type { SourceSpec, StudySettings } from "../../problem/contract.js";
import { isMean, quantityName } from "../../problem/quantity.js";
import { settingValues } from "../../problem/settings.js";
import { loadPaths, type LoadedProblem } from "../../problem/load.js";
import { runStudy } from "../../recipe.js";
import { divergentProblems } from "../../findings/divergence.js";
import { withdrawn } from "../../findings/sensitivity.js";
import { jsonText } from "../../record/json.js";
import { parseSource, type SourceChoice } from "../../sources/choice.js";
import type { StudyRecord } from "../../record/types.js";
import { threads } from "../../study/executor.js";
import { startProgress } from "../../study/progress.js";
import { bitLadder, cellsOf, resolutionCost } from "../../study/resolution.js";
import { tryPrograms } from "../../study/programs.js";
import { measureTail } from "../../study/measure/tail.js";
import { prepareProblems, type RunnableProblem } from "../../study/runnable.js";
import { FEWEST_BASE_POINTS, measureSensitivity, SENSITIVITY } from "../../study/sensitivity.js";
import { buildSpec, settingsOf } from "../../study/settings.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { environmentOf } from "../environment.js";
import { asInput, InputError } from "../errors.js";
import { checkCycles, withFullCycles } from "../full-cycle.js";
import { messages } from "../messages.js";
import { booleanFlag, textFlag, threadCount, wholeFlag } from "../read.js";
import { settingsFromFlags } from "../study-flags.js";

/** Points and replicates that a bias is measured with; one that shows is measured again on 256 fresh replicates. */
const DEFAULTS = { points: 2 ** 15, replicates: 64 };

/** Run beside what is explained: the tests take the deviation of a sound source where the other has none. */
const SOUND = "philox4x32";

export async function run(args: Arguments, io: Io): Promise<number> {
  const flags = settingsFromFlags(args, io);
  const loaded = await oneProblem(textFlag(args, "problem") ?? "");
  const { id, quantity } = loaded.problem;
  if (!isMean(quantity)) throw new InputError(messages.meansOnly(id, quantityName(quantity)));
  const { sources = [] } = flags;
  if (sources.length === 0) return explainInputs(loaded, flags, args, io);
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
async function explainInputs(
  loaded: LoadedProblem,
  flags: StudySettings,
  args: Arguments,
  io: Io,
): Promise<number> {
  for (const flag of ["full-cycle", "replicates"] as const)
    if (args[flag] !== undefined && args[flag] !== false)
      throw new InputError(messages.needsSource(flag, loaded.problem.id));
  const out = textFlag(args, "out");
  const folder = out === null ? null : resolve(io.cwd, out);
  if (folder !== null && existsSync(join(folder, "record.json")))
    throw new InputError(messages.studyFolder(folder));
  const { problem } = loaded;
  const asked = wholeFlag(args, "points", FEWEST_BASE_POINTS) ?? SENSITIVITY.points;
  const { seed } = settingValues(settingsOf(loaded, flags));
  const [runnable] = await prepareProblems([problem]);
  if (runnable === undefined) return EXIT.internal;
  const figures = measureSensitivity(runnable, problem, { ...SENSITIVITY, seed, points: asked });
  const tail = { problem: problem.id, tail: measureTail(runnable, seed) };
  const [measured = figures] = withdrawn([figures], divergentProblems([tail], [], new Map()));
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(measured, 2)}\n`);
  else {
    const { sensitivityText } = await import("../../report/sensitivity-text.js");
    io.stdout.write(sensitivityText(problem, measured));
  }
  if (folder !== null) {
    const { writeSensitivity } = await import("../../report/index.js");
    const report = { problem, sensitivity: measured, command: io.commandLine };
    try {
      await writeSensitivity(report, folder);
    } catch (error) {
      if (error instanceof Error && "syscall" in error)
        throw new InputError(messages.cannotWrite(folder, error.message));
      throw error;
    }
    io.stderr.write(messages.next(`open ${folder}/index.html`));
  }
  return EXIT.done;
}

/** A study of one problem and one size, every source in it explained. */
async function explainSources(
  loaded: LoadedProblem,
  flags: StudySettings & { readonly sources: readonly SourceSpec[] },
  args: Arguments,
  io: Io,
): Promise<number> {
  const choices = flags.sources.map(parseSource);
  const asked = choices.map(({ id }) => id);
  const cycles = booleanFlag(args, "full-cycle");
  if (cycles) checkCycles(choices);
  // what is in use is not asked about here
  const alone = { ...loaded, problem: { ...loaded.problem, inUse: null } };
  const { spec, warnings } = asInput(() =>
    buildSpec([alone], {
      replicates: DEFAULTS.replicates,
      ...flags,
      sources: asked.includes(SOUND) ? flags.sources : [...flags.sources, SOUND],
      sizes: [wholeFlag(args, "points", 1) ?? DEFAULTS.points],
    }),
  );
  const usable = (spec.sources[alone.problem.id] ?? []).map((one) => parseSource(one).id);
  if (!asked.every((id) => usable.includes(id))) throw new InputError(messages.leftOut(warnings));
  const problems = await prepareProblems(spec.problems);
  const allowPrograms = booleanFlag(args, "allow-programs");
  const programNotes = asInput(() => tryPrograms(spec, allowPrograms));
  const count = threadCount(args);
  const executor = threads(problems, count, { allowPrograms });
  const started = Date.now();
  const measured = await runStudy({
    spec,
    problems,
    executor,
    journal: { done: new Map(), add: () => undefined },
    signal: io.signal,
    stage: (title, work) => startProgress(title, work, io.stderr),
    environment: (complete) => environmentOf(io, { threads: count, started, complete }),
    warnings: [...warnings, ...programNotes],
    explain: asked,
  }).finally(() => executor.close());
  if (!measured.environment.complete) return EXIT.interrupted;
  const rounded = withResolution(measured, problems, choices);
  const record = cycles ? await withFullCycles(rounded, alone.problem, choices, count, io) : rounded;
  if (record === null) return EXIT.interrupted;

  const explanations = record.explanations.filter(({ source }) => asked.includes(source));
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(explanations, 2)}\n`);
  else {
    const { explanationText } = await import("../../report/explanation-text.js");
    io.stdout.write(explanationText(alone.problem.title, explanations));
    const { netPairsText } = await import("../../report/sensitivity-text.js");
    for (const found of record.sensitivity) io.stdout.write(netPairsText(found, asked));
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

/** What bits cost is estimated with so many points and replicates for each number of bits: a second or two in all. */
const RESOLUTION = { points: 2 ** 12, replicates: 16 };

/** The record with what the bits of each source cost the integrand, and what other numbers of bits would. */
function withResolution(
  record: StudyRecord,
  problems: readonly RunnableProblem[],
  choices: readonly SourceChoice[],
): StudyRecord {
  const [problem] = problems;
  const [described] = record.problems;
  if (problem === undefined || described === undefined) return record;
  const { confidence } = described.tolerance;
  const request = { seed: record.spec.seed, confidence, ...RESOLUTION };
  const explanations = record.explanations.map((explanation) => {
    const choice = choices.find(({ id }) => id === explanation.source);
    if (choice === undefined) return explanation;
    const { bits, endpoint } = cellsOf(choice.source);
    const costs = bitLadder(bits).map((b) => resolutionCost(problem, b, { ...request, endpoint }));
    return { ...explanation, resolution: { own: bits, costs } };
  });
  return { ...record, explanations };
}

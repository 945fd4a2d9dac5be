/** `tolerand plan PATH…`: from a pilot on keys of its own (or from a record) to points, cost and a recommendation. */
import { relative, resolve } from "node:path";
import { allocationOf } from "../../findings/allocation-plan.js";
import { planOf, type PlanOptions, type ProblemPlan } from "../../findings/plan.js";
import type { SuiteTotal } from "../../problem/contract.js";
import { loadPaths, type LoadedProblem, type LoadedProblems } from "../../problem/load.js";
import { parseSizes } from "../../problem/sizes.js";
import { runStudy } from "../../recipe.js";
import { jsonText } from "../../record/json.js";
import type { StudyRecord } from "../../record/types.js";
import { allocationText } from "../../report/allocation-text.js";
import { planText } from "../../report/plan-text.js";
import { parseSource } from "../../sources/choice.js";
import { threads } from "../../study/executor.js";
import { startProgress } from "../../study/progress.js";
import { tryPrograms } from "../../study/programs.js";
import { prepareProblems } from "../../study/runnable.js";
import { buildSpec } from "../../study/settings.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { environmentOf } from "../environment.js";
import { asInput, InputError } from "../errors.js";
import { messages } from "../messages.js";
import { booleanFlag, positiveFlag, textFlag, textFlags, threadCount, wholeFlag } from "../read.js";
import { isRecord, readRecord } from "../read-record.js";
import { settingsFromFlags } from "../study-flags.js";

/** Sizes of a pilot: enough doublings for a slope, a sixteenth of the largest size of a default study. */
const PILOT_SIZES = "2^8..2^14";

export async function run(args: Arguments, io: Io): Promise<number> {
  const randomisations = wholeFlag(args, "randomisations", 1) ?? 1;
  const secondsPerPoint = positiveFlag(args, "seconds-per-point");
  const seconds = positiveFlag(args, "time");
  const tolerance = positiveFlag(args, "total");
  const paths = textFlags(args, "paths");
  const given = await recordOf(paths, io);
  const loaded = given === null ? await loadPaths(paths, parseSource) : { name: "", problems: [] };
  const sum = totalOf(loaded);
  if (sum === null && tolerance !== null) throw new InputError(messages.noWeights);
  const record = given ?? (await pilot(loaded, args, io));
  if (!record.environment.complete) return EXIT.interrupted;

  const specs = new Map(
    Object.values(record.spec.sources).flatMap((list) => list.map((spec) => [parseSource(spec).id, spec])),
  );
  const options: PlanOptions = {
    randomisations,
    secondsPerPoint,
    seconds,
    nearestSize: (source, n) => parseSource(specs.get(source) ?? source).source.nearestSize(n),
  };
  const plans = planOf(record, options);
  const total = sum === null ? null : { ...sum, tolerance: tolerance ?? sum.tolerance };
  const allocation = total === null ? null : allocationOf(record, total, options);
  const from = given === null ? "pilot" : "record";
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText({ from, plans, allocation }, 2)}\n`);
  else io.stdout.write(planText(plans) + (allocation === null ? "" : `\n${allocationText(allocation)}`));
  const out = textFlag(args, "out");
  if (out !== null) {
    const { writePlan } = await import("../../report/index.js");
    await writePlan({ record, plans, allocation, command: io.commandLine }, resolve(io.cwd, out));
  }
  for (const warning of record.warnings) io.stderr.write(`note: ${warning}\n`);
  io.stderr.write(
    messages.next(out === null ? studyCommand(plans, loaded, io) : `open ${resolve(io.cwd, out)}/index.html`),
  );
  return EXIT.done;
}

/** The study that shows the first plan recommended; where there is none, what to look into. */
function studyCommand(plans: readonly ProblemPlan[], { problems }: LoadedProblems, io: Io): string {
  const first = plans.find(({ recommended }) => recommended !== null)?.recommended;
  const asked = problems.find(({ problem }) => problem.id === (first?.problem ?? plans[0]?.problem));
  const path = asked === undefined ? (first?.problem ?? "PATH") : pathOf(asked, io);
  if (first === undefined || first === null || first.point === null) return `tolerand study ${path}`;
  const { source, randomisations, point, replicates } = first;
  return `tolerand study ${path} --sources ${source} --sizes ${point.n / randomisations} --replicates ${replicates}`;
}

/** As a user would write it: a shipped problem by its name, a file from the working folder. */
function pathOf({ problem, suite, document }: LoadedProblem, io: Io): string {
  const path = relative(io.cwd, resolve(io.cwd, document.file));
  return path.startsWith("..") && suite !== null ? `${suite.name}/${problem.id}` : path;
}

/** The record that a plan is made from without a run; null where the paths name problems. */
async function recordOf(paths: readonly string[], io: Io): Promise<StudyRecord | null> {
  const flags = await Promise.all(paths.map((path) => isRecord(path, io)));
  if (!flags.includes(true)) return null;
  if (paths.length > 1) throw new InputError(messages.oneRecord(paths.length));
  return (await readRecord(paths[0] ?? "", io)).record;
}

/** The weighted sum of the suite, where all problems that it weighs are here. */
function totalOf({ problems }: LoadedProblems): SuiteTotal | null {
  const here = new Set(problems.map(({ problem }) => problem.id));
  const totals = new Set(problems.flatMap(({ suite }) => suite?.total ?? []));
  return [...totals].find(({ weights }) => Object.keys(weights).every((id) => here.has(id))) ?? null;
}

/** A small study of every problem and source with keys of its own. */
async function pilot(loaded: LoadedProblems, args: Arguments, io: Io): Promise<StudyRecord> {
  const flags = settingsFromFlags(args, io);
  const built = asInput(() => buildSpec(loaded.problems, { sizes: parseSizes(PILOT_SIZES), ...flags }));
  const spec = { ...built.spec, purpose: "pilot" as const };
  const problems = await prepareProblems(spec.problems);
  const allowPrograms = booleanFlag(args, "allow-programs");
  const notes = asInput(() => tryPrograms(spec, allowPrograms));
  const count = threadCount(args);
  const executor = threads(problems, count, { allowPrograms });
  const started = Date.now();
  return runStudy({
    spec,
    problems,
    executor,
    journal: { done: new Map(), add: () => undefined },
    signal: io.signal,
    stage: (title, work) => startProgress(title === "study" ? "pilot" : title, work, io.stderr),
    environment: (complete) => environmentOf(io, { threads: count, started, complete }),
    warnings: [...built.warnings, ...notes],
  }).finally(() => executor.close());
}

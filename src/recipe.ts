/**
 * The main line of the program: spec → plan → run → confirm → record. It touches no file but the journal that it is
 * handed; reading problems and writing reports are its neighbours' work.
 */
import { assembleRecord, candidatesOf, confirmedTests, type Measured } from "./findings/assemble.js";
import { CONFIRMATION_REPLICATES, type Confirmation } from "./findings/bias.js";
import { consensusOf } from "./findings/consensus.js";
import { insidePairs, pairKey, stopSentences } from "./findings/until.js";
import { quantityName } from "./problem/quantity.js";
import type { Consensus, Environment, RawCell, Stop, StudyRecord, StudySpec } from "./record/types.js";
import type { Explanation } from "./record/explanation.js";
import { explainStudy, pairsToExplain, type ExplainedPairs } from "./study/explanations.js";
import { collectCells, type CellInfo } from "./study/collect.js";
import type { Executor } from "./study/executor.js";
import { measureProblems } from "./study/measure/index.js";
import { notesOf } from "./study/notes.js";
import { RepetitionWatch } from "./study/opening.js";
import type { ProblemMeasurements } from "./record/measurements.js";
import type { Sensitivity } from "./record/sensitivity.js";
import { measureSensitivities } from "./study/sensitivities.js";
import type { RunnableProblem } from "./study/runnable.js";
import { confirmationTasks, recordSources, referenceTasks, studyLooks, studyTasks } from "./study/spec.js";
import type { Task, TaskResult } from "./study/tasks.js";

/** Progress of a stage; units are coordinates evaluated. */
export interface Stage {
  advance(work: number): void;
  finish(): void;
}

export interface StudyRun {
  readonly spec: StudySpec;
  readonly problems: readonly RunnableProblem[];
  readonly executor: Executor;
  /** What an earlier run left, by task id, and where each new result goes. */
  readonly journal: { readonly done: ReadonlyMap<string, TaskResult>; add(result: TaskResult): void };
  readonly signal: AbortSignal;
  readonly stage: (title: string, work: number) => Stage;
  /** Where and when, which only the caller knows; `complete` is false after an interruption. */
  readonly environment: (complete: boolean) => Environment;
  /** Said in the record before what the findings add. */
  readonly warnings: readonly string[];
  /** Which pairs get a prediction from the structure of their source; those with a confirmed bias by default. */
  readonly explain?: ExplainedPairs;
  /** Whether to ask which inputs matter, which costs as much as a small study of its own; true by default. */
  readonly askInputs?: boolean;
}

/** Runs a study and gives its record; after an abort the record holds what is done and says so. */
export async function runStudy(run: StudyRun): Promise<StudyRecord> {
  const { spec } = run;
  const results = new Map(run.journal.done);
  const watch = new RepetitionWatch(spec.problems);

  const references = referenceTasks(spec);
  if (references.length > 0) await runStage(run, "reference", references, results, watch);
  const consensus = formConsensus(spec, cellsOf(run, references, results));

  const measurements = await measureForBudgets(run);
  const { tasks, stops } = await runSizes(run, { consensus, measurements }, results, watch);
  const rawCells = cellsOf(run, tasks, results);
  const sources = recordSources(spec);
  const measured = { spec, problems: spec.problems, sources, rawCells, consensus, measurements };

  const candidates = run.signal.aborted ? [] : candidatesOf(measured);
  const fresh = confirmationTasks(spec, candidates, CONFIRMATION_REPLICATES);
  if (fresh.length > 0) await runStage(run, "confirmation", fresh, results, watch);
  const confirmations: Confirmation[] = run.signal.aborted ? [] : cellsOf(run, fresh, results);

  const explanations = await explainMeasured(run, measured, confirmations);
  const sensitivity = await sensitivities(run);

  const environment = run.environment(!run.signal.aborted);
  const stopping = stops === null ? [] : stopSentences(stops, spec);
  const warnings = [...run.warnings, ...stopping, ...notesOf([...tasks, ...fresh], results)];
  const stopped = stops === null ? {} : { stops };
  return assembleRecord({
    ...measured,
    environment,
    confirmations,
    explanations,
    sensitivity,
    ...stopped,
    warnings,
  });
}

/** All sizes at once, or one after the other until each source is inside the tolerance or at its largest size. */
async function runSizes(
  run: StudyRun,
  known: Pick<Measured, "consensus" | "measurements">,
  results: Map<string, TaskResult>,
  watch: RepetitionWatch,
): Promise<{ readonly tasks: readonly Task[]; readonly stops: readonly Stop[] | null }> {
  const { spec } = run;
  if (spec.until === undefined) {
    const tasks = studyTasks(spec);
    await runStage(run, "study", tasks, results, watch);
    return { tasks, stops: null };
  }
  const sources = recordSources(spec);
  const looks = studyLooks(spec);
  const tasks: Task[] = [];
  const stops = new Map<string, Stop>();
  let open = looks;
  for (let look = 1; open.length > 0 && !run.signal.aborted; look++) {
    const next = open.flatMap((one) => one.tasks(one.sizes[look - 1] ?? 0));
    tasks.push(...next);
    await runStage(run, `look ${look}`, next, results, watch);
    if (run.signal.aborted) break;
    const rawCells = cellsOf(run, tasks, results);
    const inside = insidePairs({ spec, problems: spec.problems, sources, rawCells, ...known });
    const ended = open.filter((one) => inside.has(pairKey(one)) || look === one.sizes.length);
    for (const { problem, source, sizes } of ended) {
      const pair = { problem, source };
      const n = sizes[look - 1] ?? 0;
      const declared = spec.sizes[problem]?.length ?? sizes.length;
      stops.set(pairKey(pair), { ...pair, n, look, looks: declared, inside: inside.has(pairKey(pair)) });
    }
    open = open.filter((one) => !ended.includes(one));
  }
  return { tasks, stops: looks.flatMap((one) => stops.get(pairKey(one)) ?? []) };
}

/** What the lines of budgets need beside the estimates; nothing after an interruption. */
async function measureForBudgets({
  spec,
  problems,
  signal,
  stage: open,
}: StudyRun): Promise<ProblemMeasurements[]> {
  if (signal.aborted) return [];
  const stage = open("budget", problems.length);
  const measurements = await measureProblems({ spec, problems, signal, done: () => stage.advance(1) });
  stage.finish();
  return measurements;
}

/** What the structure of sources does to integrands; nothing after an interruption, when no bias is confirmed yet. */
async function explainMeasured(
  { spec, problems, signal, stage: open, explain = "confirmed" }: StudyRun,
  measured: Measured,
  confirmations: readonly Confirmation[],
): Promise<Explanation[]> {
  if (signal.aborted) return [];
  const found = { spec, ...confirmedTests(measured, confirmations), pairs: explain };
  const { predicted } = pairsToExplain(found);
  const stage = predicted.length === 0 ? null : open("explanations", predicted.length);
  const explanations = await explainStudy({ ...found, problems, signal, done: () => stage?.advance(1) });
  stage?.finish();
  return explanations;
}

/** Which inputs matter; nothing after an interruption. */
async function sensitivities(run: StudyRun): Promise<Sensitivity[]> {
  const { spec, problems, signal, stage: open, askInputs = true } = run;
  if (signal.aborted || !askInputs) return [];
  const stage = open("inputs", problems.length);
  const sensitivity = await measureSensitivities({ spec, problems, signal, done: () => stage.advance(1) });
  stage.finish();
  return sensitivity;
}

async function runStage(
  run: StudyRun,
  title: string,
  tasks: readonly Task[],
  results: Map<string, TaskResult>,
  watch: RepetitionWatch,
): Promise<void> {
  for (const task of tasks) {
    const known = results.get(task.id);
    if (known !== undefined) watch.add(task, known);
  }
  const open = tasks.filter((task) => !results.has(task.id));
  const dimensions = new Map(run.spec.problems.map(({ id, dimension }) => [id, dimension]));
  const work = (task: Task): number => workOf(task) * (dimensions.get(task.problem) ?? 1);
  const byId = new Map(open.map((task) => [task.id, task]));
  const stage = run.stage(
    title,
    open.reduce((total, task) => total + work(task), 0),
  );
  await run.executor.run(
    open,
    (result) => {
      const task = byId.get(result.id) as Task;
      watch.add(task, result);
      results.set(result.id, result);
      run.journal.add(result);
      stage.advance(work(task));
    },
    run.signal,
  );
  stage.finish();
}

/** Points that a task evaluates. */
function workOf(task: Task): number {
  return (task.sizes.at(-1) ?? 0) * (task.to - task.from);
}

function cellsOf(run: StudyRun, tasks: readonly Task[], results: ReadonlyMap<string, TaskResult>): RawCell[] {
  const info = new Map(
    run.problems.map(({ id, quantity, formula: { dimension, indicator } }): [string, CellInfo] => [
      id,
      { dimension, indicator, output: quantityName(quantity) },
    ]),
  );
  return collectCells(tasks, results, (problem) => info.get(problem) as CellInfo);
}

/** One consensus per problem without a reference; after an interruption with the members that are there. */
function formConsensus(spec: StudySpec, cells: readonly RawCell[]): Consensus[] {
  return spec.problems
    .filter((problem) => problem.reference === null)
    .map(({ id }) =>
      consensusOf(
        id,
        cells.filter((cell) => cell.problem === id),
      ),
    );
}

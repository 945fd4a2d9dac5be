/** Averages over every starting state for a command: threads, progress, and a journal that an interrupted run leaves. */
import { join, relative, resolve } from "node:path";
import type { Problem } from "../problem/contract.js";
import type { FullCycleAverage, StudyRecord } from "../record/types.js";
import type { SourceChoice } from "../sources/choice.js";
import { fullCycleOf } from "../sources/cycle.js";
import { cycleDigest, cycleExecutor, fullCycle, reviveCycle } from "../study/full-cycle.js";
import { openJournalOf } from "../study/journal.js";
import { startProgress } from "../study/progress.js";
import { prepareProblems } from "../study/runnable.js";
import type { Io } from "./command.js";
import { asInput } from "./errors.js";
import { messages } from "./messages.js";

/** Journals lie here, below the working folder, while a cycle is not complete. */
const FOLDER = join("reports", "full-cycle");

/** Throws an InputError where one of the sources has no full cycle; to be asked before any long work. */
export function checkCycles(choices: readonly SourceChoice[]): void {
  for (const { source } of choices) asInput(() => fullCycleOf(source).states);
}

/**
 * The average of the problem's integrand over every starting state of `choice`. A run that was interrupted before is
 * taken up: the journal names problem and source by their digest, and ranges do not depend on threads. Null after an
 * interruption, which has then been said.
 */
export async function averageOverCycle(
  problem: Problem,
  choice: SourceChoice,
  threads: number,
  io: Io,
): Promise<FullCycleAverage | null> {
  const { states } = fullCycleOf(choice.source);
  const digest = cycleDigest(problem, choice.spec);
  const path = resolve(io.cwd, FOLDER, `${digest.slice(0, 16)}.jsonl`);
  const journal = openJournalOf(path, digest, true, reviveCycle);
  const [runnable] = await prepareProblems([problem]);
  if (runnable === undefined) throw new Error("a problem that was loaded does not compile");
  const executor = cycleExecutor({ problem: runnable, source: choice.spec }, threads);
  const progress = startProgress(`full cycle of ${choice.id}`, states, io.stderr);
  try {
    const average = await fullCycle({
      problem,
      source: choice.spec,
      executor,
      journal,
      signal: io.signal,
      advance: (done) => {
        progress.advance(done);
      },
    });
    progress.finish();
    if (average === null) io.stderr.write(messages.cycleInterrupted(relative(io.cwd, path), io.commandLine));
    else journal.remove();
    return average;
  } finally {
    await executor.close();
  }
}

/**
 * The record with the average of its one problem over every state of these sources in their explanations; where the problem
 * has no reference, the bias is taken against the study's consensus. Null after an interruption.
 */
export async function withFullCycles(
  record: StudyRecord,
  problem: Problem,
  choices: readonly SourceChoice[],
  threads: number,
  io: Io,
): Promise<StudyRecord | null> {
  const averages = new Map<string, FullCycleAverage>();
  for (const choice of choices) {
    const average = await averageOverCycle(problem, choice, threads, io);
    if (average === null) return null;
    averages.set(choice.id, against(average, record));
  }
  const explanations = record.explanations.map((explanation) => ({
    ...explanation,
    fullCycle: averages.get(explanation.source) ?? null,
  }));
  return { ...record, explanations };
}

function against(average: FullCycleAverage, { consensus }: StudyRecord): FullCycleAverage {
  const [common] = consensus;
  if (average.bias !== null || common === undefined || common.value === null) return average;
  return { ...average, bias: average.mean - common.value, referenceUncertainty: common.standardError };
}

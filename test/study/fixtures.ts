/** Small problems and a run of them in this process, for tests of the study room. Invented data. */
import { runStudy, type StudyRun } from "../../src/recipe.js";
import type { Problem } from "../../src/problem/contract.js";
import type { Environment, StudyRecord, StudySpec } from "../../src/record/types.js";
import { inProcess, type Executor } from "../../src/study/executor.js";
import { prepareProblems } from "../../src/study/runnable.js";
import { buildSpec } from "../../src/study/settings.js";
import type { StudySettings } from "../../src/problem/contract.js";
import type { TaskResult } from "../../src/study/tasks.js";

export function problem(id: string, integrand: string, change: Partial<Problem> = {}): Problem {
  const dimension = change.dimension ?? 3;
  return {
    id,
    title: id,
    about: "",
    dimension,
    inputs: [{ name: "x", distribution: "uniform", length: dimension, first: 0 }],
    constants: {},
    integrand,
    quantity: "mean",
    reference: { value: 0.5, text: "0.5", uncertainty: 0, basis: "symmetry" },
    tolerance: { absolute: 0.01, relative: null, to: "reference", confidence: 0.99 },
    inUse: null,
    study: {},
    ...change,
  };
}

export function specOf(problems: readonly Problem[], settings: StudySettings): StudySpec {
  return buildSpec(
    problems.map((one) => ({ problem: one, suite: null })),
    settings,
  ).spec;
}

export const ENVIRONMENT: Environment = {
  program: "0",
  node: "0",
  platform: "none",
  threads: 1,
  started: "",
  finished: "",
  seconds: 0,
  command: "",
  complete: true,
};

export interface RunOptions {
  readonly executor?: (problems: StudyRun["problems"]) => Executor;
  readonly journal?: Map<string, TaskResult>;
  readonly signal?: AbortSignal;
  readonly onResult?: (count: number) => void;
}

/** Runs a spec; `journal` is what an earlier run left and takes what this one adds. */
export async function runSpec(spec: StudySpec, options: RunOptions = {}): Promise<StudyRecord> {
  const problems = await prepareProblems(spec.problems);
  const executor = (options.executor ?? inProcess)(problems);
  const journal = options.journal ?? new Map<string, TaskResult>();
  const done = new Map(journal);
  try {
    return await runStudy({
      spec,
      problems,
      executor,
      journal: {
        done,
        add: (result) => {
          journal.set(result.id, result);
          options.onResult?.(journal.size);
        },
      },
      signal: options.signal ?? new AbortController().signal,
      stage: () => ({ advance: () => undefined, finish: () => undefined }),
      environment: (complete) => ({ ...ENVIRONMENT, complete }),
      warnings: [],
    });
  } finally {
    await executor.close();
  }
}

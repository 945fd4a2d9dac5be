/** Executors: they take tasks and hand over results as they come, in any order. */
import { setImmediate } from "node:timers/promises";
import { Piscina } from "piscina";
import type { RunnableProblem } from "./runnable.js";
import { TaskRunner } from "./run-task.js";
import type { Task, TaskResult } from "./tasks.js";

export interface Executor<T = Task, R = TaskResult> {
  /**
   * Runs the tasks, calling `done` for each result. Resolves when all are done, or, after `signal` is aborted, when
   * the tasks in flight are. Rejects with the first error of a task.
   */
  run(tasks: readonly T[], done: (result: R) => void, signal: AbortSignal): Promise<void>;
  close(): Promise<void>;
}

/** What the command line allowed beside reading and computing. */
export interface Leave {
  /** Users' programs may be started. */
  readonly allowPrograms: boolean;
}

const NO_LEAVE: Leave = { allowPrograms: false };

/** Runs tasks one after the other in this thread: for tests and for the library. */
export function inProcess(problems: readonly RunnableProblem[], leave: Leave = NO_LEAVE): Executor {
  const runner = new TaskRunner(problems, leave.allowPrograms);
  return serially((task) => runner.run(task));
}

/** Runs the tasks of studies on worker threads. */
export function threads(
  problems: readonly RunnableProblem[],
  count: number,
  leave: Leave = NO_LEAVE,
): Executor {
  return onThreads("worker.js", { problems, ...leave }, count);
}

/** Runs tasks of any kind one after the other in this thread. */
export function serially<T, R>(runTask: (task: T) => R): Executor<T, R> {
  return {
    async run(tasks, done, signal) {
      for (const task of tasks) {
        if (signal.aborted) return;
        done(runTask(task));
        await setImmediate();
      }
    },
    close: () => Promise.resolve(),
  };
}

/**
 * Runs tasks of any kind on worker threads, whose entry in this room takes one at a time. Two tasks a thread are in
 * flight, so that no thread waits and an interruption is quick.
 */
export function onThreads<T, R>(entry: string, workerData: unknown, count: number): Executor<T, R> {
  const pool = new Piscina({
    filename: new URL(`../../dist/study/${entry}`, import.meta.url).href,
    minThreads: count,
    maxThreads: count,
    concurrentTasksPerWorker: 1,
    workerData,
  });
  return {
    async run(tasks, done, signal) {
      let next = 0;
      const lane = async (): Promise<void> => {
        while (next < tasks.length && !signal.aborted) {
          const task = tasks[next++] as T;
          done((await pool.run(task)) as R);
        }
      };
      await Promise.all(Array.from({ length: Math.min(tasks.length, 2 * count) }, lane));
    },
    close: () => pool.close({ force: true }),
  };
}

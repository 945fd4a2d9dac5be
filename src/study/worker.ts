/** The thread entry: one task runner per thread, tasks as they come. */
import { workerData } from "node:worker_threads";
import type { RunnableProblem } from "./runnable.js";
import { TaskRunner } from "./run-task.js";
import type { Task, TaskResult } from "./tasks.js";

const { problems } = workerData as { problems: RunnableProblem[] };
const runner = new TaskRunner(problems);

export default function runTask(task: Task): TaskResult {
  return runner.run(task);
}

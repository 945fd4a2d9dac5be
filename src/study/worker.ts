/** The thread entry: one task runner per thread, tasks as they come. */
import { workerData } from "node:worker_threads";
import type { RunnableProblem } from "./runnable.js";
import { TaskRunner } from "./run-task.js";
import type { Task, TaskResult } from "./tasks.js";

const { problems, allowPrograms } = workerData as { problems: RunnableProblem[]; allowPrograms: boolean };
const runner = new TaskRunner(problems, allowPrograms);

export default function runTask(task: Task): TaskResult {
  return runner.run(task);
}

/** The thread entry of a full cycle: ranges of states as they come. */
import { workerData } from "node:worker_threads";
import { CycleRunner, type CycleResult, type CycleTask, type CycleWork } from "./full-cycle.js";

const runner = new CycleRunner(workerData as CycleWork);

export default function runRange(task: CycleTask): CycleResult {
  return runner.run(task);
}

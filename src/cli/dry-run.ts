/**
 * `study --dry-run`: what would be run and how long it would take. The time comes from a short pilot on keys of its own:
 * each problem x source is run on a few thousand points in this thread.
 */
import { performance } from "node:perf_hooks";
import { jsonText } from "../record/json.js";
import type { StudySpec } from "../record/types.js";
import { parseSource } from "../sources/choice.js";
import type { RunnableProblem } from "../study/runnable.js";
import { timeText } from "../study/progress.js";
import { TaskRunner } from "../study/run-task.js";
import { referenceTasks, studyTasks } from "../study/spec.js";
import type { Task } from "../study/tasks.js";
import { textTable } from "../report/text-table.js";

interface Row {
  readonly problem: string;
  readonly source: string;
  readonly tasks: number;
  readonly points: number;
  /** null where a pilot would use up draws or start a program. */
  readonly seconds: number | null;
}

/** Points of the timed pilot run; one run before it is not timed, so that compilation is not counted. */
const PILOT_POINTS = 4096;

const pointsOf = (task: Task): number => (task.sizes.at(-1) ?? 0) * (task.to - task.from);

/** The plan in words, or as JSON. Seconds are of one thread; the total is divided by the threads. */
export function dryRun(
  spec: StudySpec,
  problems: readonly RunnableProblem[],
  threads: number,
  json: boolean,
): string {
  const runner = new TaskRunner(problems);
  const groups = new Map<string, Task[]>();
  for (const task of [...referenceTasks(spec), ...studyTasks(spec)]) {
    const key = JSON.stringify([task.problem, task.sourceId]);
    groups.set(key, [...(groups.get(key) ?? []), task]);
  }
  const rows = [...groups.values()].map((tasks): Row => {
    // The last task has the largest size, where most of the points are.
    const last = tasks.at(-1) as Task;
    const points = tasks.reduce((total, task) => total + pointsOf(task), 0);
    const seconds = canPilot(last) ? points * secondsPerPoint(runner, last) : null;
    return { problem: last.problem, source: last.sourceId, tasks: tasks.length, points, seconds };
  });
  const total = rows.reduce((sum, row) => sum + (row.seconds ?? 0), 0) / threads;
  if (json) return `${jsonText({ rows, threads, seconds: total }, 2)}\n`;
  const table = textTable(
    [
      { title: "problem", align: "left" },
      { title: "source", align: "left" },
      { title: "tasks", align: "right" },
      { title: "points", align: "right" },
      { title: "expected", align: "right" },
    ],
    rows.map((r) => [
      r.problem,
      r.source,
      String(r.tasks),
      r.points.toLocaleString("en"),
      r.seconds === null ? "not timed" : timeText(r.seconds * 1000),
    ]),
  );
  const tasks = rows.reduce((sum, row) => sum + row.tasks, 0);
  const end = `${tasks} tasks, about ${timeText(total * 1000)} on ${threads} ${threads === 1 ? "thread" : "threads"}, and up to 256 more replicates for each bias that needs confirming.`;
  return `${table.join("\n")}\n${end}\n`;
}

function canPilot(task: Task): boolean {
  const { program, singlePass } = parseSource(task.source).source;
  return program === undefined && singlePass !== true;
}

function secondsPerPoint(runner: TaskRunner, task: Task): number {
  const largest = task.sizes.at(-1) ?? 1;
  const n = task.perSize ? largest : Math.min(largest, PILOT_POINTS);
  const pilot: Task = { ...task, id: "pilot", purpose: "pilot", from: 0, to: 1, sizes: [n] };
  runner.run(pilot);
  const started = performance.now();
  runner.run(pilot);
  return (performance.now() - started) / 1000 / n;
}

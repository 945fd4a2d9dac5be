/** What a run itself shows and a reader must know: replicates that repeat each other, coordinates at the ends of (0, 1). */
import { findRepetitions } from "./opening.js";
import type { Task, TaskResult } from "./tasks.js";

export function notesOf(tasks: readonly Task[], results: ReadonlyMap<string, TaskResult>): string[] {
  return [...repetitionNotes(tasks, results), ...endpointNotes(tasks, results)];
}

function repetitionNotes(tasks: readonly Task[], results: ReadonlyMap<string, TaskResult>): string[] {
  return findRepetitions(tasks, results).map(
    ({ problem, source, first, second, count, replicates }) =>
      `${problem}, ${source}: ${second} has the same points as ${first}; ${count} of ${replicates} replicates repeat another, and error bars are too small`,
  );
}

function endpointNotes(tasks: readonly Task[], results: ReadonlyMap<string, TaskResult>): string[] {
  const hits = new Map<string, number>();
  for (const { id, problem, sourceId } of tasks) {
    const row = `${problem}, ${sourceId}`;
    hits.set(row, (hits.get(row) ?? 0) + (results.get(id)?.endpoints ?? 0));
  }
  return [...hits].flatMap(([row, count]) =>
    count === 0
      ? []
      : [`${row}: ${count} ${count === 1 ? "coordinate was" : "coordinates were"} exactly 0 or 1`],
  );
}

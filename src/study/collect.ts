/** From task results to raw cells: one per problem x source x estimator x n, replicates in order. */
import type { NonFinite, RawCell } from "../record/types.js";
import type { ReplicateResult, Task, TaskResult } from "./tasks.js";

export interface CellInfo {
  readonly dimension: number;
  readonly indicator: boolean;
  /** Name of the quantity. */
  readonly output: string;
}

/**
 * Raw cells in the order of the tasks. `results` may lack tasks (an interrupted run): a cell then holds the replicates
 * that are done, and a cell with none is left out.
 */
export function collectCells(
  tasks: readonly Task[],
  results: ReadonlyMap<string, TaskResult>,
  info: (problem: string) => CellInfo,
): RawCell[] {
  const groups = new Map<string, { task: Task; done: TaskResult[] }>();
  for (const task of tasks) {
    const result = results.get(task.id);
    const key = JSON.stringify([task.problem, task.sourceId, task.sizes]);
    const group = groups.get(key) ?? { task, done: [] };
    groups.set(key, group);
    if (result !== undefined) group.done.push(result);
  }
  return [...groups.values()].flatMap(({ task, done }) => cellsOf(task, done, info(task.problem)));
}

function cellsOf(task: Task, done: readonly TaskResult[], info: CellInfo): RawCell[] {
  const all = done.flatMap((result) => result.results).sort((a, b) => a.replicate - b.replicate);
  const secondsPerPoint = median(done.map((result) => result.seconds / result.points));
  return task.estimators.flatMap((estimator, e) =>
    task.sizes.flatMap((n): RawCell[] => {
      const rows = all.filter((row) => row.n === n);
      if (rows.length === 0) return [];
      return [
        {
          problem: task.problem,
          source: task.sourceId,
          estimator,
          output: info.output,
          n,
          dimension: info.dimension,
          indicator: info.indicator,
          estimates: rows.map((row) => row.estimates[e] as number),
          withinVariances: rows.map((row) => row.withinVariances[e] as number | null),
          ...finiteBiasOf(rows),
          secondsPerPoint,
          nonFinite: nonFiniteOf(n, rows, done),
        },
      ];
    }),
  );
}

/** The mean range over the replicates; nothing for quantities without one. */
function finiteBiasOf(rows: readonly ReplicateResult[]): Pick<RawCell, "finiteBias"> {
  const ranges = rows.map((row) => row.finiteBias);
  if (ranges.every((range) => range === undefined)) return {};
  const known = ranges.filter((range) => range !== undefined && range !== null);
  if (known.length < rows.length) return { finiteBias: null };
  const end = (pick: 0 | 1) => known.reduce((total, range) => total + range[pick], 0) / known.length;
  return { finiteBias: [end(0), end(1)] };
}

function nonFiniteOf(
  n: number,
  rows: readonly ReplicateResult[],
  done: readonly TaskResult[],
): NonFinite | null {
  const count = rows.reduce((sum, row) => sum + row.nonFinite, 0);
  const offences = done.flatMap((result) => result.offences).filter((point) => point.index < n);
  const [first] = offences.sort((a, b) => a.replicate - b.replicate);
  return first === undefined ? null : { count, first };
}

/** Median over the tasks: the first task of a thread also pays for the compilation of the formula. */
function median(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor((sorted.length - 1) / 2)] as number;
}

/**
 * Tasks: the unit of work. A task is a pure function of what it holds; its result is small and mergeable. The plan
 * depends on the spec alone, so that a run can be taken up by any number of threads, and taken up again.
 */
import type { SourceSpec } from "../problem/contract.js";
import type { Purpose } from "../sources/key.js";

/** One problem x source x estimators, replicates from...to - 1, all sizes in one pass. */
export interface Task {
  readonly id: string;
  readonly problem: string;
  readonly source: SourceSpec;
  /** Canonical id of the source. */
  readonly sourceId: string;
  readonly estimators: readonly string[];
  readonly purpose: Purpose;
  readonly seed: number;
  readonly from: number;
  readonly to: number;
  /** Ascending sizes; a per-size source has one here. */
  readonly sizes: readonly number[];
  /** True where the points are built for one size, which then is part of the key. */
  readonly perSize: boolean;
  /** Replicates of the same problem x source that came before replicate 0 of this purpose. */
  readonly before: number;
}

/** What one replicate gives at one size. */
export interface ReplicateResult {
  readonly replicate: number;
  readonly n: number;
  /** For each estimator of the task, in order. */
  readonly estimates: readonly number[];
  readonly withinVariances: readonly (number | null)[];
  /** For quantities with one (quantities/contract.ts), else absent. */
  readonly finiteBias?: readonly [number, number] | null;
  readonly nonFinite: number;
}

/** The first point of a replicate with a non-finite value, and what the integrand was given there. */
export interface Offence {
  readonly replicate: number;
  readonly index: number;
  readonly inputs: readonly number[];
  readonly value: string;
}

export interface Opening {
  readonly replicate: number;
  readonly digest: string;
}

export interface TaskResult {
  readonly id: string;
  readonly results: readonly ReplicateResult[];
  /** One for each replicate that met a non-finite value. */
  readonly offences: readonly Offence[];
  /** For each replicate: SHA-256 of its first coordinates, by which repeated replicates are found. */
  readonly openings: readonly Opening[];
  /** Coordinates that were exactly 0 or 1, of sources where they may be. */
  readonly endpoints: number;
  /** Points evaluated, and the seconds it took, start to end of the task. */
  readonly points: number;
  readonly seconds: number;
}

/** Coordinates that a task should hold at least, so that handing it out costs little beside running it (about 5 ms). */
const COORDINATES_PER_TASK = 500_000;

export interface PlanRequest {
  readonly problem: string;
  readonly dimension: number;
  readonly source: SourceSpec;
  readonly sourceId: string;
  readonly perSize: boolean;
  readonly estimators: readonly string[];
  readonly purpose: Purpose;
  readonly seed: number;
  readonly replicates: number;
  /** Valid, distinct, ascending. */
  readonly sizes: readonly number[];
  readonly before: number;
  /** True where one task must read all replicates, one after the other. */
  readonly singlePass: boolean;
  /** True where each size is a stage of its own that may be the last: the size is then part of the task's id. */
  readonly look?: boolean;
}

/** The tasks of one problem x source. */
export function planTasks(request: PlanRequest): Task[] {
  const { problem, dimension, source, sourceId, perSize, estimators, purpose, seed } = request;
  const { replicates, sizes, before, singlePass } = request;
  const passes = perSize ? sizes.map((n) => [n]) : [sizes];
  return passes.flatMap((pass) => {
    const coordinates = Math.max(1, pass.at(-1) ?? 1) * dimension;
    const several = Math.max(1, Math.min(replicates, Math.ceil(COORDINATES_PER_TASK / coordinates)));
    const chunk = singlePass ? replicates : several;
    const tasks: Task[] = [];
    for (let from = 0; from < replicates; from += chunk) {
      const to = Math.min(replicates, from + chunk);
      const size = perSize || request.look === true ? `/n${pass[0]}` : "";
      const id = `${purpose}/${problem}/${sourceId}${size}/r${from}-${to - 1}`;
      tasks.push({
        id,
        problem,
        source,
        sourceId,
        estimators,
        purpose,
        seed,
        from,
        to,
        sizes: pass,
        perSize,
        before,
      });
    }
    return tasks;
  });
}

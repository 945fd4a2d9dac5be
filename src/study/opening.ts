/**
 * The opening of a replicate: a digest of its first coordinates. Two replicates with one opening have the same points,
 * where independent ones of a sound source never do (the chance is below 2^-500 for 1,000 coordinates of 52 bits).
 */
import { createHash } from "node:crypto";
import type { Kernels } from "../kernels/instance.js";
import type { PointStream } from "../sources/contract.js";
import type { Task, TaskResult } from "./tasks.js";

/** Coordinates that are looked at: 1,000 draws, or the replicate's first call where that gives fewer. */
const COORDINATES = 1000;

/** A replicate with fewer coordinates is not compared: short ones of a coarse source may agree by chance. */
const FEWEST = 64;

/** Watches the first `fill` of a stream; what it gives reads the digest, "" where there were too few coordinates. */
export function watchOpening(stream: PointStream, kernels: Kernels): () => string {
  const fill = stream.fill.bind(stream);
  const { dimension } = stream;
  let digest: string | null = null;
  stream.fill = (pointer, stride, count) => {
    fill(pointer, stride, count);
    if (digest !== null) return;
    const points = Math.min(count, Math.ceil(COORDINATES / dimension));
    const hash = createHash("sha256");
    for (let j = 0; j < Math.min(dimension, COORDINATES); j++)
      hash.update(kernels.f64(pointer + j * stride * 8, points));
    digest = points * dimension >= FEWEST ? hash.digest("hex") : "";
  };
  return () => digest ?? "";
}

/** Two replicates of one problem x source with the same opening. */
export interface Repetition {
  readonly problem: string;
  readonly source: string;
  /** In words: "replicate 3". */
  readonly first: string;
  readonly second: string;
  /** Replicates of this problem x source that repeat an earlier one. */
  readonly count: number;
  readonly replicates: number;
}

/** The first repetition of each problem x source, over all tasks at hand. */
export function findRepetitions(
  tasks: readonly Task[],
  results: ReadonlyMap<string, TaskResult>,
): Repetition[] {
  const rows = new Map<string, { seen: Map<string, string>; found: Repetition | null; replicates: number }>();
  for (const task of tasks) {
    const { problem, sourceId, purpose, sizes, perSize } = task;
    const key = JSON.stringify([problem, sourceId, perSize ? sizes : null]);
    const row = rows.get(key) ?? { seen: new Map<string, string>(), found: null, replicates: 0 };
    rows.set(key, row);
    for (const { replicate, digest } of results.get(task.id)?.openings ?? []) {
      if (digest === "") continue;
      row.replicates++;
      const at = `${purpose === "study" ? "" : `${purpose} `}replicate ${replicate}`;
      const first = row.seen.get(digest);
      if (first === undefined) row.seen.set(digest, at);
      else
        row.found = {
          ...(row.found ?? { problem, source: sourceId, first, second: at }),
          count: (row.found?.count ?? 0) + 1,
          replicates: 0,
        };
    }
  }
  return [...rows.values()].flatMap(({ found, replicates }) =>
    found === null ? [] : [{ ...found, replicates }],
  );
}

/**
 * The opening of a replicate: a digest of its first coordinates. Two replicates with one opening have the same points,
 * where independent ones of a sound source never do (the chance is below 2^-500 for 1,000 coordinates of 52 bits).
 */
import { createHash } from "node:crypto";
import type { Kernels } from "../kernels/instance.js";
import { parseSource } from "../sources/choice.js";
import type { PointStream, Source } from "../sources/contract.js";
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
      const at = `${purpose === "study" ? "" : `${purpose} `}replicate ${replicate}`;
      const first = row.seen.get(digest);
      // The same replicate, begun anew for a larger look.
      if (first === at) continue;
      row.replicates++;
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

/** Refuses replicates that begin alike, of sources for which that is an error; results come in any order. */
export class RepetitionWatch {
  readonly #dimensions: ReadonlyMap<string, number>;
  readonly #sources = new Map<string, Source>();
  readonly #seen = new Map<string, number>();

  constructor(problems: readonly { readonly id: string; readonly dimension: number }[]) {
    this.#dimensions = new Map(problems.map(({ id, dimension }) => [id, dimension]));
  }

  /** Throws a RangeError where a replicate of the task repeats another one. */
  add(task: Task, { openings }: TaskResult): void {
    const source = this.#sources.get(task.sourceId) ?? parseSource(task.source).source;
    this.#sources.set(task.sourceId, source);
    if (source.repetition === undefined) return;
    for (const { replicate, digest } of openings) {
      if (digest === "") continue;
      const key = JSON.stringify([task.problem, task.sourceId, digest]);
      const here = task.before + replicate;
      const other = this.#seen.get(key);
      this.#seen.set(key, here);
      if (other === undefined || other === here) continue;
      const [first, second] = [Math.min(here, other), Math.max(here, other)];
      const dimension = this.#dimensions.get(task.problem) ?? 1;
      throw new RangeError(source.repetition(first, second, dimension, task.sizes.at(-1) ?? 1));
    }
  }
}

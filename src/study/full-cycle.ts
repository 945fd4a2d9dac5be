/**
 * The integrand averaged over every valid starting state of a source. Outputs later in a run are spread over the states
 * as first ones are, so this is the mean of every estimate of any n over random seeds: its distance from the integral is
 * the exact seed-averaged bias. States are gone through in their order (sources/states.ts), in ranges that any number of
 * threads take; sums go by the tree of a study, so the average has the same bits however the work was split.
 */
import { channelMean, channelVariance, type Moments } from "../estimators/moments.js";
import { LEAF_POINTS, MomentsTree } from "../estimators/tree.js";
import { instantiateKernels } from "../kernels/instance.js";
import type { SourceSpec } from "../problem/contract.js";
import type { Problem } from "../problem/contract.js";
import { digestOf, numberFrom } from "../record/json.js";
import type { FullCycleAverage } from "../record/types.js";
import { parseSource } from "../sources/choice.js";
import type { EndpointCounter, PointStream, Seekable } from "../sources/contract.js";
import { fullCycleOf } from "../sources/cycle.js";
import { onThreads, serially, type Executor } from "./executor.js";
import { Integrator, type OffendingPoint } from "./integrator.js";
import type { RunnableProblem } from "./runnable.js";

/** States from ... to - 1; `from` is a multiple of the length of all ranges but the last. */
export interface CycleTask {
  readonly id: string;
  readonly from: number;
  readonly to: number;
}

export interface CycleResult {
  readonly id: string;
  readonly from: number;
  readonly n: number;
  /** The row of moments of the range. */
  readonly values: readonly number[];
  readonly nonFinite: number;
  readonly offending: OffendingPoint | null;
  /** Coordinates that were exactly 0 or 1. */
  readonly endpoints: number;
}

/** What a thread is started with. */
export interface CycleWork {
  readonly problem: RunnableProblem;
  readonly source: SourceSpec;
}

/** About so many coordinates make a range: a quarter of a second, and at most 2^10 ranges for 2^32 states in 3 dimensions. */
const COORDINATES_PER_RANGE = 2 ** 24;

/** Ranges of a power of two points, a whole subtree of the summation tree each, and what is left. */
export function cycleTasks(states: number, dimension: number): CycleTask[] {
  const length = Math.max(LEAF_POINTS, 2 ** Math.floor(Math.log2(COORDINATES_PER_RANGE / dimension)));
  return Array.from({ length: Math.ceil(states / length) }, (_, k) => ({
    id: `states/${k}`,
    from: k * length,
    to: Math.min(states, (k + 1) * length),
  }));
}

/** Runs ranges in one kernel instance. */
export class CycleRunner {
  readonly #integrator: Integrator;
  readonly #stream: PointStream & Seekable & Partial<EndpointCounter>;

  /** Throws a RangeError where the source has no full cycle. */
  constructor({ problem, source }: CycleWork) {
    this.#integrator = new Integrator(problem);
    const cycle = fullCycleOf(parseSource(source).source);
    this.#stream = cycle.open(problem.formula.dimension, this.#integrator.kernels);
  }

  run({ id, from, to }: CycleTask): CycleResult {
    const before = this.#stream.endpointsHit?.() ?? 0;
    this.#stream.seek(from);
    const { sizes, offending } = this.#integrator.run(this.#stream, [to], from);
    const [size] = sizes;
    if (size === undefined) throw new Error(`range ${id} is empty`);
    const { moments, nonFinite } = size;
    const endpoints = (this.#stream.endpointsHit?.() ?? 0) - before;
    return { id, from, n: moments.n, values: [...moments.values], nonFinite, offending, endpoints };
  }
}

/** A result read back from a journal. */
export function reviveCycle(result: CycleResult): CycleResult {
  const { offending } = result;
  return {
    ...result,
    values: result.values.map(numberFrom),
    offending: offending && { ...offending, inputs: offending.inputs.map(numberFrom) },
  };
}

/** Ranges of one source on one problem, in this thread (`count` 0) or on worker threads. */
export function cycleExecutor(work: CycleWork, count: number): Executor<CycleTask, CycleResult> {
  if (count > 0) return onThreads("cycle-worker.js", work, count);
  const runner = new CycleRunner(work);
  return serially((task) => runner.run(task));
}

/** What the journal of a full cycle belongs to: everything that its ranges depend on. */
export function cycleDigest({ id, inputs, constants, integrand }: Problem, source: SourceSpec): string {
  return digestOf({ kind: "full cycle", problem: { id, inputs, constants, integrand }, source });
}

export interface CycleRun {
  readonly problem: Problem;
  readonly source: SourceSpec;
  readonly executor: Executor<CycleTask, CycleResult>;
  readonly journal: { readonly done: ReadonlyMap<string, CycleResult>; add(result: CycleResult): void };
  readonly signal: AbortSignal;
  /** Told of states as they are done. */
  advance(states: number): void;
}

/** The average over all states; null after an interruption, when the journal holds what is done. */
export async function fullCycle(run: CycleRun): Promise<FullCycleAverage | null> {
  const { problem, journal, executor, signal } = run;
  const { states } = fullCycleOf(parseSource(run.source).source);
  const tasks = cycleTasks(states, problem.dimension);
  const results = new Map(journal.done);
  for (const { n } of results.values()) run.advance(n);
  await executor.run(
    tasks.filter(({ id }) => !results.has(id)),
    (result) => {
      results.set(result.id, result);
      journal.add(result);
      run.advance(result.n);
    },
    signal,
  );
  const ordered = tasks.flatMap(({ id }) => results.get(id) ?? []);
  if (ordered.length < tasks.length) return null;
  return average(problem, ordered);
}

function average({ reference }: Problem, results: readonly CycleResult[]): FullCycleAverage {
  const moments = merge(results);
  const mean = channelMean(moments);
  const first = results.find(({ offending }) => offending !== null)?.offending ?? null;
  const variance = channelVariance(moments);
  return {
    states: moments.n,
    mean,
    bias: reference === null ? null : mean - reference.value,
    referenceUncertainty: reference?.uncertainty ?? null,
    deviation: variance === null ? null : Math.sqrt(variance),
    nonFinite: results.reduce((total, { nonFinite }) => total + nonFinite, 0),
    offending: first,
    endpoints: results.reduce((total, { endpoints }) => total + endpoints, 0),
  };
}

/** The fold of all ranges: whole ones as nodes of the tree, a shorter last one like a cut leaf behind them. */
function merge(results: readonly CycleResult[]): Moments {
  const kernels = instantiateKernels();
  const tree = new MomentsTree(kernels, 1);
  const length = results[0]?.n ?? 0;
  const level = Math.log2(length / LEAF_POINTS);
  const whole = Number.isInteger(level) && level >= 0;
  let cut: CycleResult | undefined;
  for (const result of results) {
    if (!whole || result.n < length) cut = result;
    else
      tree.push({
        level,
        index: result.from / length,
        moments: { n: length, channels: 1, values: Float64Array.from(result.values) },
      });
  }
  const row = kernels.arena.allocate(16);
  if (cut !== undefined) kernels.f64(row, 2).set(cut.values);
  const moments = tree.total(row, cut?.n ?? 0);
  if (moments === null) throw new Error("a full cycle of no states");
  return moments;
}

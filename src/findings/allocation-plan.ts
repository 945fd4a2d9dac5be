/**
 * From a record to an allocation: every sound source of a problem is a choice, its deviation the fitted one
 * (spread.ts), its order that of the fit beyond the largest n measured. The bias lines of the budget are subtracted, all but
 * a bias of the source that was only not excluded: that falls with more replicates, not with more points. The coverage
 * factor is Student's at the confidence of the sum, with the fewest degrees of freedom of any problem (conservative beside
 * Welch & Satterthwaite).
 */
import { studentFactor } from "../numeric/student.js";
import type { Problem, SuiteTotal } from "../problem/contract.js";
import type { StudyRecord } from "../record/types.js";
import {
  allocate,
  equalAllocation,
  type Allocation,
  type AllocationChoice,
  type AllocationItem,
} from "./allocation.js";
import { EXTRAPOLATION } from "./budget/sampling.js";
import { budgetOf } from "./budget/total.js";
import type { Context } from "./cells.js";
import { recordContext } from "./context.js";
import { unsoundness, userSeconds, type PlanOptions } from "./plan.js";
import { seriesKey, seriesOf, type Series } from "./series.js";
import { spreadOf } from "./spread.js";

/** Orders below this do not count as falling. */
const LEAST_ORDER = 0.05;

export interface AllocationPlan {
  readonly tolerance: number;
  readonly confidence: number;
  /** Coverage factor. */
  readonly factor: number;
  /** Least cost for the tolerance; null with `reason`. */
  readonly cheapest: Allocation | null;
  /** The same n for every problem, same sources, same tolerance. */
  readonly equal: Allocation | null;
  /** 1 - cost / cost of equal sizes. */
  readonly saving: number | null;
  /** Least error for the time budget; null without one. */
  readonly affordable: Allocation | null;
  readonly seconds: number | null;
  /** Why there is no allocation, in words; null where there is one. */
  readonly reason: string | null;
}

export function allocationOf(record: StudyRecord, total: SuiteTotal, options: PlanOptions): AllocationPlan {
  const context = recordContext(record);
  const series = seriesOf(record.cells);
  const items: AllocationItem[] = [];
  const bare: string[] = [];
  let degrees = Infinity;
  for (const [id, weight] of Object.entries(total.weights)) {
    const problem = context.problems.get(id);
    const own = series.filter((one) => one.problem === id && problem !== undefined);
    const choices = own.flatMap((one) => choiceOf(one, problem as Problem, record, context, options) ?? []);
    if (choices.length === 0) bare.push(id);
    else items.push({ problem: id, weight, choices });
    degrees = Math.min(degrees, ...own.map(({ last }) => last.replicates - 1));
  }
  const { tolerance, confidence } = total;
  const { seconds } = options;
  const factor = studentFactor(confidence, Math.max(1, degrees));
  const common = { tolerance, confidence, factor, seconds };
  const none = { ...common, cheapest: null, equal: null, saving: null, affordable: null };
  if (bare.length > 0) {
    return { ...none, reason: `no sound source with a measured deviation and cost for ${bare.join(", ")}` };
  }
  const cheapest = allocate(items, { tolerance }, factor);
  const equal = cheapest === null ? null : equalAllocation(items, cheapest, tolerance, factor);
  return {
    ...common,
    cheapest,
    equal,
    saving: cheapest === null || equal === null ? null : 1 - cheapest.seconds / equal.seconds,
    affordable: seconds === null ? null : allocate(items, { seconds }, factor),
    reason: cheapest === null ? "no sizes bring the weighted sum inside its tolerance" : null,
  };
}

function choiceOf(
  series: Series,
  problem: Problem,
  record: StudyRecord,
  context: Context,
  options: PlanOptions,
): AllocationChoice | null {
  const source = context.sources.get(series.source);
  const test = record.tests.find((one) => seriesKey(one) === seriesKey(series));
  const cost = userSeconds(problem, options) ?? series.last.secondsPerPoint;
  if (source === undefined || source.deterministic || cost === null || !(cost > 0)) return null;
  if (unsoundness(source, test) !== null) return null;
  const pseudoRandom = source.family === "pseudo-random";
  const spread = spreadOf(series, pseudoRandom);
  const [near, far] = [spread?.at(series.last.n)?.value, spread?.at(4 * series.last.n)?.value];
  if (spread === null || near === undefined || far === undefined) return null;
  const order = Math.log(near / far) / Math.log(4);
  if (!(order > LEAST_ORDER)) return null;
  const lines = budgetOf(series, test, context)?.lines ?? [];
  const sizes = (kind: "bias" | "random", except: string): number[] =>
    lines.filter((line) => line.kind === kind && line.line !== except).map((line) => line.value ?? 0);
  const randoms = sizes("random", "sampling");
  const deviation = (n: number) => Math.hypot(spread.at(n)?.value ?? Infinity, ...randoms);
  return {
    source: series.source,
    cost,
    order,
    constant: near * series.last.n ** order,
    bias: sizes("bias", "source structure").reduce((sum, value) => sum + value, 0),
    deviation: remembered(deviation),
    up: validSizes(series, pseudoRandom, (n) => options.nearestSize(series.source, n)),
    known: EXTRAPOLATION * series.last.n,
  };
}

/** The fit is asked for the same n many times. */
function remembered(f: (n: number) => number): (n: number) => number {
  const known = new Map<number, number>();
  return (n) => {
    const value = known.get(n) ?? f(n);
    known.set(n, value);
    return value;
  };
}

/** Sizes as a plan names them: those measured and doublings of the largest, any n for pseudo-random sources. */
function validSizes(series: Series, anyN: boolean, nearest: (n: number) => number) {
  const sizes = series.cells.map(({ n }) => n);
  const [least, last] = [sizes[0] ?? 1, series.last.n];
  for (let n = 2 * last; n <= 2 ** 40; n *= 2) if (nearest(n) > (sizes.at(-1) ?? 0)) sizes.push(nearest(n));
  return (n: number): number =>
    anyN ? Math.max(least, Math.ceil(n)) : (sizes.find((size) => size >= n) ?? Infinity);
}

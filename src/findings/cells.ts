/** Raw cells to cells: the statistics of one problem x source x estimator x output x n. */
import { deviation, kurtosis, rootMeanSquare, variance } from "../numeric/moments.js";
import { bootstrapInterval, jackknife } from "../numeric/resampling.js";
import { mean } from "../numeric/sums.js";
import { normalUpperQuantile } from "../numeric/normal.js";
import type { Problem } from "../problem/contract.js";
import { digestOf } from "../record/json.js";
import type { Explanation } from "../record/explanation.js";
import type { ProblemMeasurements } from "../record/measurements.js";
import type { Cell, RawCell, RecordSource } from "../record/types.js";
import { logRmse } from "./leave-one-out.js";
import type { KnownReference } from "./reference.js";
import { seriesKey } from "./series.js";

/** What the statistics of cells need beside the cells; built once per record (findings/context.ts). */
export interface Context {
  readonly problems: ReadonlyMap<string, Problem>;
  readonly sources: ReadonlyMap<string, RecordSource>;
  readonly references: ReadonlyMap<string, KnownReference>;
  /** By `seriesKey`. */
  readonly explanations: ReadonlyMap<string, Explanation>;
  /** By problem id. */
  readonly measurements: ReadonlyMap<string, ProblemMeasurements>;
  /** Problems without a finite variance, and why that is said. */
  readonly divergent: ReadonlyMap<string, string>;
}

/** Sample kurtosis of the errors above which a cell is called heavy-tailed (3 for normal errors). */
export const HEAVY_TAIL = 6;

/** A deviation below this many times the size of the values is rounding, not spread: sixteen units of the last place. */
export const ROUNDING = 16 * Number.EPSILON;

/** True where the replicates agree to rounding. */
export function isRounding({ replicateDeviation, mean: centre }: Cell): boolean {
  return replicateDeviation !== null && !(replicateDeviation > ROUNDING * Math.abs(centre ?? 0));
}

/** Below this many intervals their coverage is not assessed. */
const FEWEST_INTERVALS = 200;

/** The statistics of every raw cell, in the order given; `bootstrap` false leaves out the one costly interval. */
export function toCells(rawCells: readonly RawCell[], context: Context, bootstrap = true): Cell[] {
  const crude = soundVariances(rawCells, context);
  const largest = new Map<string, number>();
  for (const raw of rawCells) largest.set(seriesKey(raw), Math.max(raw.n, largest.get(seriesKey(raw)) ?? 0));
  return rawCells.map((raw) => {
    const cell = toCell(raw, context);
    if (context.divergent.has(raw.problem) === true) return withoutIntervals(cell);
    const variances = crude.get(outputKey(raw)) ?? null;
    return { ...cell, ...againstCrude(cell, variances, bootstrap && raw.n === largest.get(seriesKey(raw))) };
  });
}

/** What is left of a cell where the variance is not finite: estimates, their mean and deviation, no interval of anything. */
function withoutIntervals(cell: Cell): Cell {
  return { ...cell, biasStandardError: null, rmseInterval: null, coverage: null, heavyTailed: true };
}

function outputKey(raw: RawCell): string {
  return JSON.stringify([raw.problem, raw.output]);
}

/** Standard deviation of f from the variances within replicates; null where there are none. */
function pooledDeviation(raw: RawCell): number | null {
  const variances = raw.withinVariances.filter((value) => value !== null);
  return variances.length === 0 ? null : finite(Math.sqrt(mean(variances)));
}

/**
 * The variances of f within the replicates of a sound source, by problem and output: a source without known structure,
 * pseudo-random before randomised quasi-random, then the one with the most points. Only crude estimates: sigma is that of
 * f itself.
 */
function soundVariances(
  rawCells: readonly RawCell[],
  context: Context,
): ReadonlyMap<string, readonly number[]> {
  const best = new Map<string, { rank: number; values: readonly number[] }>();
  for (const raw of rawCells) {
    const source = context.sources.get(raw.source);
    if (source === undefined || source.deterministic || source.knownStructure !== null) continue;
    const values = raw.withinVariances.filter((value) => value !== null);
    const usable = raw.estimator === "crude" && raw.nonFinite === null && mean(values) > 0;
    const rank = (source.family === "pseudo-random" ? 1e18 : 0) + raw.n * raw.estimates.length;
    const key = outputKey(raw);
    if (usable && rank > (best.get(key)?.rank ?? -1)) best.set(key, { rank, values });
  }
  return new Map([...best].map(([key, { values }]) => [key, values]));
}

/** Numbers drawn for one bootstrap: enough for steady 2.5 % ends, few enough for thousands of replicates. */
const BOOTSTRAP_DRAWS = 2 ** 17;

/** s^2 n / sigma^2 and its interval, in which the errors of both variances count. */
function againstCrude(cell: Cell, variances: readonly number[] | null, bootstrap: boolean): Partial<Cell> {
  if (cell.replicateDeviation === null || variances === null) return {};
  const ratio = (estimates: readonly number[], within: readonly number[]) =>
    (variance(estimates) * cell.n) / mean(within);
  const varianceAgainstCrude = finite(ratio(cell.estimates, variances));
  if (!bootstrap || varianceAgainstCrude === null || isRounding(cell)) return { varianceAgainstCrude };
  const rounds = Math.min(2000, Math.max(200, Math.floor(BOOTSTRAP_DRAWS / cell.replicates)));
  const varianceAgainstCrudeInterval = bootstrapInterval(
    [cell.estimates, variances],
    ([estimates = [], within = []]) => ratio(estimates, within),
    cell.digest,
    rounds,
  );
  return { varianceAgainstCrude, varianceAgainstCrudeInterval };
}

function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

function toCell(raw: RawCell, context: Context): Cell {
  const reference = context.references.get(raw.problem) ?? null;
  const replicates = raw.estimates.length;
  const sound = raw.nonFinite === null && raw.estimates.every(Number.isFinite);
  const random = context.sources.get(raw.source)?.deterministic !== true && replicates >= 2;
  const centre = sound && replicates > 0 ? mean(raw.estimates) : null;
  const spread = sound && random ? deviation(raw.estimates) : null;
  const errors = sound && reference !== null ? raw.estimates.map((value) => value - reference.value) : null;
  const loose = errors !== null && random ? logRmse(errors) : null;
  const logInterval = loose === null ? null : (jackknife(loose.all, loose.without)?.interval ?? null);
  const bias = centre === null || reference === null ? null : centre - reference.value;
  return {
    ...raw,
    replicates,
    reference: reference?.value ?? null,
    mean: centre,
    bias,
    biasStandardError:
      spread === null || reference === null
        ? null
        : Math.hypot(spread / Math.sqrt(replicates), reference.uncertainty),
    rmse: errors !== null && random ? rootMeanSquare(errors) : null,
    rmseInterval: logInterval === null ? null : [Math.exp(logInterval[0]), Math.exp(logInterval[1])],
    replicateDeviation: spread,
    integrandDeviation: sound ? pooledDeviation(raw) : null,
    varianceAgainstCrude: null,
    varianceAgainstCrudeInterval: null,
    coverage: sound && random ? coverageOf(raw, reference, context) : null,
    heavyTailed:
      spread !== null && spread > ROUNDING * Math.abs(centre ?? 0) && kurtosis(raw.estimates) > HEAVY_TAIL,
    digest: digestOf({ estimates: raw.estimates, withinVariances: raw.withinVariances }),
  };
}

/**
 * Share of the claimed intervals, estimate +/- z sqrt(within variance / n) at the problem's confidence, that held the
 * reference: what a user who trusts the central limit theorem would claim from one replicate.
 */
function coverageOf(raw: RawCell, reference: KnownReference | null, context: Context): number | null {
  const confidence = context.problems.get(raw.problem)?.tolerance.confidence;
  if (reference === null || confidence === undefined || raw.estimator !== "crude") return null;
  if (raw.estimates.length < FEWEST_INTERVALS) return null;
  const factor = normalUpperQuantile((1 - confidence) / 2);
  let held = 0;
  for (const [r, estimate] of raw.estimates.entries()) {
    const within = raw.withinVariances[r] ?? null;
    if (within === null) return null;
    if (Math.abs(estimate - reference.value) <= factor * Math.sqrt(within / raw.n)) held++;
  }
  return held / raw.estimates.length;
}

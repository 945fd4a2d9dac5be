/** Raw cells to cells: the statistics of one problem x source x estimator x output x n. */
import { kurtosis, rootMeanSquare, deviation } from "../numeric/moments.js";
import { jackknife } from "../numeric/resampling.js";
import { mean } from "../numeric/sums.js";
import { normalUpperQuantile } from "../numeric/normal.js";
import type { Problem } from "../problem/contract.js";
import { digestOf } from "../record/json.js";
import type { Cell, RawCell, RecordSource } from "../record/types.js";
import { logRmse } from "./leave-one-out.js";
import type { KnownReference } from "./reference.js";

/** What the statistics of cells need beside the cells; built once per record (findings/context.ts). */
export interface Context {
  readonly problems: ReadonlyMap<string, Problem>;
  readonly sources: ReadonlyMap<string, RecordSource>;
  readonly references: ReadonlyMap<string, KnownReference>;
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
export const FEWEST_INTERVALS = 200;

/** The statistics of every raw cell, in the order given. */
export function toCells(rawCells: readonly RawCell[], context: Context): Cell[] {
  const crudeDeviations = soundDeviations(rawCells, context);
  return rawCells.map((raw) => toCell(raw, context, crudeDeviations.get(outputKey(raw)) ?? null));
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
 * sigma by problem and output, from a sound source: without known structure, pseudo-random before randomised
 * quasi-random, then the most points. Only crude estimates: sigma is that of f itself.
 */
function soundDeviations(rawCells: readonly RawCell[], context: Context): ReadonlyMap<string, number> {
  const best = new Map<string, { rank: number; value: number }>();
  for (const raw of rawCells) {
    const source = context.sources.get(raw.source);
    if (source === undefined || source.deterministic || source.knownStructure !== null) continue;
    const value = raw.estimator === "crude" && raw.nonFinite === null ? pooledDeviation(raw) : null;
    if (value === null) continue;
    const rank = (source.family === "pseudo-random" ? 1e18 : 0) + raw.n * raw.estimates.length;
    const key = outputKey(raw);
    if (rank > (best.get(key)?.rank ?? -1)) best.set(key, { rank, value });
  }
  return new Map([...best].map(([key, { value }]) => [key, value]));
}

function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

function toCell(raw: RawCell, context: Context, crudeDeviation: number | null): Cell {
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
    varianceAgainstCrude:
      spread === null || crudeDeviation === null || crudeDeviation === 0
        ? null
        : finite((spread / crudeDeviation) ** 2 * raw.n),
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

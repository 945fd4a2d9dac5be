/** Dual vectors gathered for reading: copies along the coordinates together, the largest contribution first. */
import type { SparseVector } from "../structure/alias-set.js";
import type { Wave } from "./waves.js";

export interface Group {
  /** The copy that contributes most; the first one where nothing was estimated. */
  readonly wave: Wave;
  readonly copies: number;
  readonly contribution: number | null;
  readonly standardError: number | null;
}

/** Groups that are kept. */
const KEPT = 8;

/** A contribution shows beyond this many standard errors; what does not show is listed behind what does. */
const SHOWS = 3;

/** `contributions[r][k]` is what wave k adds by replicate r; null where nothing was estimated: then in the order given. */
export function aliasGroups(
  waves: readonly Wave[],
  contributions: readonly Float64Array[] | null,
  stationary: boolean,
): Group[] {
  const members = new Map<string, number[]>();
  waves.forEach(({ vector: { indices, entries } }, k) => {
    const first = stationary ? (indices[0] ?? 0) : 0;
    const key = `${indices.map((index) => index - first).join()}:${entries.join()}`;
    members.set(key, [...(members.get(key) ?? []), k]);
  });
  const groups = [...members.values()].map((own) => groupOf(own, waves, contributions));
  const shows = ({ contribution, standardError }: Group): boolean =>
    Math.abs(contribution ?? 0) > SHOWS * (standardError ?? Infinity);
  const size = ({ contribution }: Group): number => Math.abs(contribution ?? 0);
  const shown = groups.filter(shows).sort((a, b) => size(b) - size(a));
  return [...shown, ...groups.filter((group) => !shows(group))].slice(0, KEPT);
}

function groupOf(
  own: readonly number[],
  waves: readonly Wave[],
  contributions: readonly Float64Array[] | null,
): Group {
  const [first = 0] = own;
  if (contributions === null) {
    return { wave: waves[first] as Wave, copies: own.length, contribution: null, standardError: null };
  }
  const count = contributions.length;
  const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / count;
  const sums = contributions.map((row) => own.reduce((sum, k) => sum + (row[k] ?? 0), 0));
  const contribution = mean(sums);
  const squares = sums.reduce((sum, value) => sum + (value - contribution) ** 2, 0);
  const alone = (k: number): number => Math.abs(mean(contributions.map((row) => row[k] ?? 0)));
  const leader = own.reduce((best, k) => (alone(k) > alone(best) ? k : best), first);
  return {
    wave: waves[leader] as Wave,
    copies: own.length,
    contribution,
    standardError: Math.sqrt(squares / (count - 1) / count),
  };
}

/**
 * Hyperplanes h.u = phase + whole number that meet the half-open cube [0, 1)^t: h.u lies strictly between -N and P, the sums
 * of negative and positive entries, and takes 0 itself where there is no entry of the other sign.
 */
export function planesOf({ entries }: SparseVector, phase: number): number {
  const [positive, negative] = entries.reduce(
    ([p, n], entry): [number, number] => (entry > 0 ? [p + entry, n] : [p, n - entry]),
    [0, 0],
  );
  // a phase that is 0 to rounding is 0
  const turn = Math.abs(phase - Math.round(phase)) < 1e-9 ? 0 : phase;
  const low = negative === 0 && turn === 0 ? 0 : Math.floor(-negative - turn) + 1;
  const high = positive === 0 && turn === 0 ? 0 : Math.ceil(positive - turn) - 1;
  return Math.max(0, high - low + 1);
}

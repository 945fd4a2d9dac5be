/**
 * How the replicate deviation s falls with n: what a plan needs. Pseudo-random sources: s^2 = P^2 + C^2 / n with the order
 * 1/2 fixed, because order and plateau are confounded otherwise (a fit of pure n^-1/2 data with a free order finds a
 * plateau of 0.2 of the last value); P is kept only where the data demand it. Others: straight lines in (ln n, ln s)
 * between the sizes measured, the fitted slope beyond them.
 */
import { fitLine } from "../numeric/least-squares.js";
import { jackknife } from "../numeric/resampling.js";
import { combine, logDeviation, logRmse, type LeaveOneOut } from "./leave-one-out.js";
import { ROUNDING, isRounding } from "./cells.js";
import type { Series } from "./series.js";

export interface Estimated {
  readonly value: number;
  /** 95 %, jackknife over replicates of the logarithm; null where not known. */
  readonly interval: readonly [number, number] | null;
}

export interface Spread {
  /** s at n points. Null where nothing usable was measured. */
  at(n: number): Estimated | null;
  /** The n with s(n) = target (the smallest measured where that is below it); null where s does not fall to it. */
  reach(target: number): Estimated | null;
  /** Level below which s does not fall, and its lower limit; null where none shows. */
  readonly plateau: { readonly value: number; readonly lower: number } | null;
  readonly smallest: number;
  readonly largest: number;
  /** True where the order 1/2 is fixed, so that s can be carried beyond the sizes measured. */
  readonly fixedOrder: boolean;
}

/** Cells with an error bar that is more than rounding. */
function usableCells(series: Series) {
  return series.cells.filter((cell) => cell.replicateDeviation !== null && !isRounding(cell));
}

/**
 * Weights of the logarithms of deviations: R - 1, since the variance of such a logarithm is about 1/(2 (R - 1)) whatever
 * its size (more for heavy tails). The jackknife's own variance at each n makes worse weights: it comes out small just
 * where the deviation does [95 % intervals of the order from 32 skewed replicates held it in 88 % with such weights, 92 %
 * with these; of s at a planned n, 80 % and 90 %].
 */
function weightsOf(logs: readonly LeaveOneOut[]): number[] {
  return logs.map((log) => log.without.length - 1);
}

/** A weighted sum of values. */
function weighted(values: readonly number[], coefficients: readonly number[]): number {
  return values.reduce((total, value, i) => total + value * (coefficients[i] ?? 0), 0);
}

export function spreadOf(series: Series, pseudoRandom: boolean): Spread | null {
  const cells = usableCells(series);
  const [first, last] = [cells[0], cells.at(-1)];
  if (first === undefined || last === undefined || first.replicates < 3) return null;
  const logs = cells.map((cell) => logDeviation(cell.estimates));
  const sizes = cells.map((cell) => Math.log(cell.n));
  const plateau = pseudoRandom && cells.length >= 4 ? plateauOf(sizes, logs) : null;
  const curve = pseudoRandom ? rootCurve(sizes, logs, plateau !== null) : polygon(sizes, logs);
  const estimate = (f: (values: readonly number[]) => number): Estimated | null => {
    const found = combine(logs, f);
    if (!Number.isFinite(found.all)) return null;
    const interval = jackknife(found.all, found.without)?.interval ?? null;
    return {
      value: Math.exp(found.all),
      interval: interval === null ? null : [Math.exp(interval[0]), Math.exp(interval[1])],
    };
  };
  return {
    at(n) {
      const measured = cells.findIndex((cell) => cell.n === n);
      return estimate((values) =>
        measured >= 0 ? (values[measured] ?? NaN) : curve.at(values, Math.log(n)),
      );
    },
    reach: (target) => (target > 0 ? estimate((values) => curve.reach(values, Math.log(target))) : null),
    plateau,
    smallest: first.n,
    largest: last.n,
    fixedOrder: pseudoRandom,
  };
}

interface LogCurve {
  /** ln s at ln n = x, given ln s at the sizes measured. */
  at(values: readonly number[], x: number): number;
  /** ln n at which ln s = y; NaN where it is not reached. */
  reach(values: readonly number[], y: number): number;
}

/** The line s^2 = P^2 + C^2 / n, as functions of the values of ln s. */
interface SquareLine {
  readonly level: (values: readonly number[]) => number;
  readonly slope: (values: readonly number[]) => number;
}

/**
 * The line by weighted least squares. A sample variance has variance 2 s^4 / (R - 1), so the weights are 1 / s^4 with s
 * from a first fit that takes them as n^2; from the measured s themselves they would favour what came out small.
 */
function squareLine(sizes: readonly number[], logs: readonly LeaveOneOut[]): SquareLine {
  const squares = (values: readonly number[]) => values.map((value) => Math.exp(2 * value));
  const inverse = sizes.map((x) => Math.exp(-x));
  const measured = squares(logs.map((log) => log.all));
  const first = fitLine(
    inverse,
    measured,
    sizes.map((x) => Math.exp(2 * (x - (sizes.at(-1) ?? x)))),
  );
  const least = Math.min(...measured);
  const fitted = inverse.map((x) => Math.max(least, first.intercept + first.slope * x));
  const line = fitLine(
    inverse,
    measured,
    fitted.map((square) => (least / square) ** 2),
  );
  return {
    level: (values) => weighted(squares(values), line.interceptCoefficients),
    slope: (values) => weighted(squares(values), line.slopeCoefficients),
  };
}

function plateauOf(sizes: readonly number[], logs: readonly LeaveOneOut[]): Spread["plateau"] {
  const level = combine(logs, squareLine(sizes, logs).level);
  const lower = jackknife(level.all, level.without)?.interval[0] ?? 0;
  // A plateau counts only where s also stopped falling over the last three doublings.
  if (!(lower > 0) || !decayRejected(sizes, logs)) return null;
  return { value: Math.sqrt(level.all), lower: Math.sqrt(lower) };
}

/** Slope above which a curve is said to have stopped falling: half the rate of independent points. */
const STALLED = -0.25;

/**
 * True where the slope over the last three doublings (four sizes) lies above -1/4 with its whole 95 % interval. Fewer
 * sizes never reject.
 */
export function decayRejected(sizes: readonly number[], logs: readonly LeaveOneOut[]): boolean {
  const from = lastDoublings(sizes);
  const [x, y] = [sizes.slice(from), logs.slice(from)];
  if (x.length < 3 || from === 0) return false;
  const slope = slopeOver(x, y);
  const interval = jackknife(slope.all, slope.without)?.interval;
  return interval !== undefined && interval[0] > STALLED;
}

/** Index of the first size of the last three doublings. */
function lastDoublings(sizes: readonly number[]): number {
  const end = sizes.at(-1) ?? 0;
  return sizes.findIndex((x) => x > end - 3 * Math.LN2 - 1e-9);
}

/** Weighted slope of the logarithms on ln n, replicate by replicate. */
export function slopeOver(sizes: readonly number[], logs: readonly LeaveOneOut[]): LeaveOneOut {
  const coefficients = slopeCoefficientsOf(sizes, logs);
  return combine(logs, (values) => weighted(values, coefficients));
}

function slopeCoefficientsOf(sizes: readonly number[], logs: readonly LeaveOneOut[]): readonly number[] {
  return sizes.length > 1 ? fitLine(sizes, sizes, weightsOf(logs)).slopeCoefficients : [0];
}

function rootCurve(sizes: readonly number[], logs: readonly LeaveOneOut[], plateau: boolean): LogCurve {
  if (plateau) {
    const line = squareLine(sizes, logs);
    const level = (values: readonly number[]) => Math.max(0, line.level(values));
    return {
      at: (values, x) => Math.log(level(values) + line.slope(values) * Math.exp(-x)) / 2,
      reach: (values, y) => Math.log(line.slope(values) / (Math.exp(2 * y) - level(values))),
    };
  }
  // ln C as the weighted mean of ln(s sqrt(n)) over the last three doublings: what n misses when it is small (a narrow
  // peak) would pull C down, and nested sizes add little to one another.
  const from = lastDoublings(sizes);
  const weights = weightsOf(logs).map((weight, i) => (i < from ? 0 : weight));
  const total = weights.reduce((a, b) => a + b, 0);
  const roots = (values: readonly number[]) => values.map((value, i) => value + (sizes[i] ?? NaN) / 2);
  const level = (values: readonly number[]) => weighted(roots(values), weights) / total;
  return {
    at: (values, x) => level(values) - x / 2,
    reach: (values, y) => 2 * (level(values) - y),
  };
}

function polygon(sizes: readonly number[], logs: readonly LeaveOneOut[]): LogCurve {
  const coefficients = slopeCoefficientsOf(sizes, logs);
  const slopeOf = (values: readonly number[]) => weighted(values, coefficients);
  const last = sizes.length - 1;
  const size = (i: number) => sizes[i] ?? NaN;
  return {
    at(values, x) {
      const value = (i: number) => values[i] ?? NaN;
      if (x >= size(last)) return value(last) + slopeOf(values) * (x - size(last));
      if (x <= size(0)) return value(0) + slopeOf(values) * (x - size(0));
      const right = sizes.findIndex((s) => s >= x);
      const share = (x - size(right - 1)) / (size(right) - size(right - 1));
      return value(right - 1) + share * (value(right) - value(right - 1));
    },
    reach(values, y) {
      const value = (i: number) => values[i] ?? NaN;
      const slope = slopeOf(values);
      if (value(last) > y) return slope < 0 ? size(last) + (y - value(last)) / slope : NaN;
      for (let i = last; i > 0; i--) {
        if (value(i - 1) > y) {
          const share = (value(i - 1) - y) / (value(i - 1) - value(i));
          return size(i - 1) + share * (size(i) - size(i - 1));
        }
      }
      // Every size measured keeps y: below the smallest nothing is known.
      return size(0);
    },
  };
}

/** ln RMSE at every n where the errors are more than rounding, for the order of a series. */
export function logErrors(series: Series, reference: number): { sizes: number[]; logs: LeaveOneOut[] } {
  const cells = series.cells.filter(
    ({ rmse, mean }) => rmse !== null && rmse > ROUNDING * Math.max(Math.abs(reference), Math.abs(mean ?? 0)),
  );
  return {
    sizes: cells.map((cell) => Math.log(cell.n)),
    logs: cells.map((cell) => logRmse(cell.estimates.map((estimate) => estimate - reference))),
  };
}

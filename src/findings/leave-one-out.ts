/**
 * Statistics with one replicate left out in turn: what the jackknife over replicates needs. Estimates at several n of one
 * series are left out together, because errors of one replicate at nested n are correlated.
 */
import { mean, sum } from "../numeric/sums.js";

/** A statistic of all replicates, and of all but replicate r. */
export interface LeaveOneOut {
  readonly all: number;
  readonly without: readonly number[];
}

/** ln of the root mean square of the errors. */
export function logRmse(errors: readonly number[]): LeaveOneOut {
  const squares = sum(errors.map((error) => error * error));
  const count = errors.length;
  return {
    all: Math.log(squares / count) / 2,
    without: errors.map((error) => Math.log((squares - error * error) / (count - 1)) / 2),
  };
}

/** ln of the standard deviation of the estimates (divisor count - 1; count - 2 with one left out). */
export function logDeviation(estimates: readonly number[]): LeaveOneOut {
  const centre = mean(estimates);
  const count = estimates.length;
  const squares = sum(estimates.map((value) => (value - centre) ** 2));
  return {
    all: Math.log(squares / (count - 1)) / 2,
    without: estimates.map((value) => {
      const rest = squares - ((value - centre) ** 2 * count) / (count - 1);
      return Math.log(rest / (count - 2)) / 2;
    }),
  };
}

/** A function of several statistics, replicate by replicate; the shortest list sets the number of replicates. */
export function combine(
  parts: readonly LeaveOneOut[],
  f: (values: readonly number[]) => number,
): LeaveOneOut {
  const count = Math.min(...parts.map((part) => part.without.length));
  return {
    all: f(parts.map((part) => part.all)),
    without: Array.from({ length: count }, (_, r) => f(parts.map((part) => part.without[r] ?? NaN))),
  };
}

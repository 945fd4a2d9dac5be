/**
 * Tables of discrete laws for kernels/assembly/distributions/steps.ts: the values, the distribution function at each, and
 * a guide of cells (H.-C. Chen and Y. Asau, AIIE Transactions 6 (1974) 163-166). Probabilities are summed in double-double
 * arithmetic and rounded down, so that comparing them with a double u decides as the exact sums would, but for a sum
 * within 1e-30 of u.
 */
import { add, divide, fromNumber, multiply } from "./double-double.js";
import type { DoubleDouble } from "./double-double.js";

/** Values of a discrete law at most; the table takes about 24 bytes for each. */
export const MOST_STEPS = 2 ** 20;

/** A law by weights (any multiple of the probabilities) of values in ascending order. */
export interface Steps {
  readonly values: readonly number[];
  readonly weights: readonly DoubleDouble[];
}

/** Throws RangeError for more than MOST_STEPS values. */
export function stepTable({ values, weights }: Steps): Float64Array<ArrayBuffer> {
  const count = values.length;
  if (count === 0 || count > MOST_STEPS) {
    throw new RangeError(
      `a discrete law needs 1 to ${MOST_STEPS} values with these parameters, not ${count}`,
    );
  }
  let cells = 16;
  while (cells < 2 * count) cells *= 2;
  const total = weights.reduce(add, fromNumber(0));
  const table = new Float64Array(2 + cells + 2 * count);
  table[0] = cells;
  table[1] = count;
  let sum = fromNumber(0);
  let cell = 0;
  for (let k = 0; k < count; k++) {
    sum = add(sum, weights[k] ?? fromNumber(0));
    const share = divide(sum, total);
    const reached = k === count - 1 ? 1 : below(share);
    for (; cell < cells && cell / cells <= reached; cell++) table[2 + cell] = k;
    table[2 + cells + k] = reached;
    table[2 + cells + count + k] = values[k] ?? 0;
  }
  return table;
}

/** The largest double that is not above x, for 0 <= x <= 1. */
function below({ high, low }: DoubleDouble): number {
  if (low >= 0) return high;
  const word = new BigUint64Array(Float64Array.of(high).buffer);
  word[0] = (word[0] ?? 1n) - 1n;
  return new Float64Array(word.buffer)[0] ?? 0;
}

/** Share of the largest weight below which the tails of a law on the whole numbers are cut: a tenth of 2^-64 is 5e-21. */
const LEAST_WEIGHT = 1e-24;

/**
 * Weights on whole numbers from the ratio of neighbours, w(k + 1) / w(k), outwards from `mode` until they no longer
 * matter. `ratio` gives numerator and denominator, each exact in double-double arithmetic.
 */
export function stepsByRatio(
  mode: number,
  last: number,
  ratio: (k: number) => readonly [DoubleDouble, DoubleDouble],
): Steps {
  const up: DoubleDouble[] = [fromNumber(1)];
  const down: DoubleDouble[] = [];
  for (let k = mode; k < last; k++) {
    const [above, under] = ratio(k);
    const next = divide(multiply(up.at(-1) ?? fromNumber(1), above), under);
    if (!(next.high > LEAST_WEIGHT)) break;
    up.push(next);
    if (up.length > MOST_STEPS) break;
  }
  for (let k = mode - 1; k >= 0; k--) {
    const [above, under] = ratio(k);
    const next = divide(multiply(down.at(-1) ?? fromNumber(1), under), above);
    if (!(next.high > LEAST_WEIGHT)) break;
    down.push(next);
    if (down.length > MOST_STEPS) break;
  }
  const weights = [...down.toReversed(), ...up];
  return { weights, values: weights.map((_, i) => mode - down.length + i) };
}

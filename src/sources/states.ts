/**
 * The valid starting states of a generator, gone through one after the other: what an average over all of them needs.
 * Where outputs are affine in the state modulo m (congruential and multiple recursive generators), states are numbered so
 * that each is a constant plus digits times weights, and every output is so too. Its words over a run of the first digit
 * are then an arithmetic progression modulo m, one addition a word whatever the multiplier: no orbit has to be followed,
 * and it does not matter into how many orbits the states fall.
 *
 * Units modulo m, from which multiplicative generators start, are numbered by the Chinese remainder theorem: odd numbers
 * 1, 3, 5, ... modulo a power of two, r + p q with 0 < r < p modulo a power of an odd prime p.
 */
import type { Kernels } from "../kernels/instance.js";
import { factorise, powerMod } from "../numeric/factor.js";
import type { Bits, OutputWords } from "./conversion.js";

/** Most states that are gone through. */
export const MOST_STATES = 1n << 32n;

/** The valid starting states in a fixed order, and how their outputs become coordinates. */
export interface StateSpace {
  readonly count: bigint;
  readonly output: OutputWords;
  readonly bits: Bits | null;
  /** Words of the outputs with these numbers (the first output is 1), one row for each. At most 2^32 states. */
  open(outputs: readonly bigint[], kernels: Kernels): StateWords;
}

export interface StateWords {
  /** Output `row` of `count` states from state `index` (0-based) on, to `out`; up to three words behind may be written. */
  fill(row: number, index: number, count: number, out: number): void;
}

/** constant + sum of weights[l] digit[l]. */
export interface Digital {
  readonly constant: bigint;
  readonly weights: readonly bigint[];
}

/** Numbers 0 ... count - 1 as digits, the first running fastest. */
export interface Digits {
  readonly sizes: readonly bigint[];
  /** Numbers left out at the beginning. */
  readonly skipped: bigint;
}

/** The units modulo m as digits and the state that belongs to them. */
export function units(modulus: bigint): Digital & Digits {
  const digits: { size: bigint; weight: bigint }[] = [];
  let constant = 0n;
  for (const [prime, exponent] of factorise(modulus)) {
    const power = prime ** BigInt(exponent);
    const others = modulus / power;
    // 1 modulo this power, 0 modulo the others; the inverse by Euler's theorem
    const one = others * powerMod(others % power, power - power / prime - 1n, power);
    constant += one;
    if (prime === 2n) digits.push({ size: power / 2n, weight: one * 2n });
    else digits.push({ size: prime - 1n, weight: one }, { size: power / prime, weight: one * prime });
  }
  // the longest run first
  digits.sort((a, b) => (a.size < b.size ? 1 : -1));
  return {
    constant: constant % modulus,
    sizes: digits.map(({ size }) => size),
    weights: digits.map(({ weight }) => weight % modulus),
    skipped: 0n,
  };
}

export function countOf({ sizes, skipped }: Digits): bigint {
  return sizes.reduce((product, size) => product * size, 1n) - skipped;
}

/** Rows of words modulo `modulus` over the numbers of `digits`. */
export function digitalWords(
  digits: Digits,
  rows: readonly Digital[],
  modulus: bigint,
  { exports }: Kernels,
): StateWords {
  const run = Number(digits.sizes[0] ?? 1n);
  const skipped = Number(digits.skipped);
  const steps = rows.map(({ weights }) => Number((weights[0] ?? 0n) % modulus));
  const size = Number(modulus);
  const wordAt = ({ constant, weights }: Digital, number: number): number => {
    let left = BigInt(number);
    let word = constant;
    digits.sizes.forEach((length, l) => {
      word += (weights[l] ?? 0n) * (left % length);
      left /= length;
    });
    return Number(word % modulus);
  };
  // where each row stands if it goes on: a division in BigInt only at the beginning of a run
  const next = rows.map(() => ({ number: -1, word: 0 }));
  return {
    fill(row, index, count, out) {
      const here = next[row];
      const digital = rows[row];
      if (here === undefined || digital === undefined) throw new RangeError(`row ${row}`);
      let number = index + skipped;
      for (const end = number + count; number < end;) {
        const inRun = number % run;
        const length = Math.min(end - number, run - inRun);
        const first = here.number === number && inRun > 0 ? here.word : wordAt(digital, number);
        here.word = exports.fillProgression(out, length, first, steps[row] ?? 0, size);
        number += length;
        here.number = number;
        out += length * 8;
      }
    },
  };
}

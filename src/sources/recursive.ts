/**
 * The multiple recursive generator x(n) = a1 x(n-1) + ... + ak x(n-k) + c mod m of any order up to 64 (Knuth, The Art of
 * Computer Programming, vol. 2, 3.2.2; P. L'Ecuyer, F. Blouin and R. Couture, "A search for good multiple recursive random
 * number generators", ACM Transactions on Modeling and Computer Simulation 3 (1993) 87-98). Good for: long periods, m^k - 1
 * at best for a prime m. Bad at: tuples of more than k outputs lie on a lattice.
 *
 * Starting states: k uniform words, not all 0 without an increment. The published form is the words, oldest first.
 */
import { coprime } from "../numeric/factor.js";
import { applyMatrix, powerMatrix, type Matrix } from "../numeric/matrix-mod.js";
import { divisorOf } from "./conversion.js";
import { equalWords, parseWords } from "./published-state.js";
import type { About, Recurrence, State } from "./pseudo-random.js";
import { countOf, digitalWords, type Digital } from "./states.js";

export const LARGEST_ORDER = 64;

export interface RecursiveMap {
  /** a1 ... ak, each below the modulus, ak not 0. */
  readonly multipliers: readonly bigint[];
  readonly increment: bigint;
  /** 2 to 2^64 - 1. */
  readonly modulus: bigint;
}

export function recursive(about: About, { multipliers, increment, modulus }: RecursiveMap): Recurrence {
  const order = multipliers.length;
  const terms = multipliers.flatMap((multiplier, k) =>
    multiplier === 0n ? [] : [[BigInt(k + 1), multiplier]],
  );
  const { scaled, reciprocal, shift } = divisorOf(modulus);
  const valid = (words: State): boolean => increment !== 0n || words.some((word) => word > 0n);
  const empty = Array.from({ length: LARGEST_ORDER - order }, () => 0n);
  const pack = (words: State): State => [...words, ...empty, 0n];
  /** The words, oldest first. */
  const unpack = (state: State): State => {
    const index = Number(state[LARGEST_ORDER]);
    return [...state.slice(index, order), ...state.slice(0, index)];
  };
  const next = (words: State): bigint =>
    multipliers.reduce((sum, a, k) => sum + a * (words[order - 1 - k] ?? 0n), increment) % modulus;
  return {
    about,
    output: { modulus, bytes: 8, zeroless: false, integers: 1 },
    stateFromKey: (key) => {
      for (let attempt = 0; ; attempt++) {
        const words = multipliers.map((_, k) => key.derive(`word ${k}, attempt ${attempt}`).below(modulus));
        if (valid(words)) return pack(words);
      }
    },
    stateFromText: (text) =>
      pack(
        parseWords(text, {
          id: about.id,
          words: equalWords(order, modulus),
          allowed: `${order} words below ${modulus}${increment === 0n ? ", not all 0," : ""}`,
          valid,
        }),
      ),
    linear: { multipliers, increment, modulus, note: null },
    constants: [BigInt(order), BigInt(terms.length), increment, scaled, reciprocal, shift, ...terms.flat()],
    kernel: (exports) => exports.fillRecursive,
    *integers(state) {
      for (let words = unpack(state); ;) {
        const word = next(words);
        yield word;
        words = [...words.slice(1), word];
      }
    },
    advance: (state, steps) => {
      const matrix = companion(multipliers, increment);
      const after = applyMatrix(powerMatrix(matrix, steps, modulus), [...unpack(state), 1n], modulus);
      return pack(after.slice(0, order));
    },
    states: (bits) => {
      const last = multipliers[order - 1] ?? 0n;
      if (!coprime(last, modulus)) {
        throw new RangeError(
          `source "${about.id}": the last multiplier ${last} and modulus ${modulus} have a common factor, so a run leaves some of its states for ever, and an average over all states is not one over its points`,
        );
      }
      const digits = { sizes: multipliers.map(() => modulus), skipped: increment === 0n ? 1n : 0n };
      const matrix = companion(multipliers, increment);
      return {
        count: countOf(digits),
        output: { modulus, bytes: 8, zeroless: false, integers: 1 },
        bits,
        open: (outputs, kernels) => {
          // the newest word of the state that many steps later
          const rows = outputs.map((output): Digital => {
            const weights = powerMatrix(matrix, output, modulus)[order - 1] ?? [];
            return { constant: weights[order] ?? 0n, weights: weights.slice(0, order) };
          });
          return digitalWords(digits, rows, modulus, kernels);
        },
      };
    },
  };
}

/** One step on (oldest, ..., newest, 1). */
function companion(multipliers: readonly bigint[], increment: bigint): Matrix {
  const order = multipliers.length;
  const row = (one: number): bigint[] => Array.from({ length: order + 1 }, (_, k) => (k === one ? 1n : 0n));
  const shifts = Array.from({ length: order - 1 }, (_, k) => row(k + 1));
  return [...shifts, [...multipliers.toReversed(), increment], row(order)];
}

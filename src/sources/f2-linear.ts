/**
 * Generators whose state is a few words moved on by a linear map over GF(2): what xorshift, xoroshiro, xoshiro and the
 * combined Tausworthe generators share. Starting states are uniform over the words that are not all zero; the published
 * form is the words, "1,2,3,4". Jumps go by the characteristic polynomial of the map, found once when first needed.
 */
import type { FillWords, GeneratorExports } from "../kernels/generator-exports.js";
import {
  applyPolynomial,
  characteristicPolynomial,
  powerOfX,
  type LinearStep,
} from "../numeric/gf2-polynomial.js";
import { equalWords, parseWords } from "./published-state.js";
import type { Bits } from "./conversion.js";
import { f2States } from "./f2-states.js";
import type { About, Recurrence, State } from "./pseudo-random.js";

export interface F2Linear {
  readonly about: About;
  /** State words and the bits of each; an output has as many bits. */
  readonly words: number;
  readonly wordBits: 32 | 64;
  /** Dimension of the map over GF(2), where it is less than all bits of the state. */
  readonly degree?: number;
  /** Least value of each word, where some low values lead to a component that stays 0. */
  readonly least?: readonly bigint[];
  readonly step: LinearStep;
  readonly output: (state: State) => bigint;
  /** What an output is linear in, see `BinaryLinear`; for a bijection, of which word. */
  readonly linear: "outputs" | "state" | ((state: State) => bigint);
  /** Whether an output is made of the state before its step or after it. */
  readonly outputFrom: "before" | "after";
  readonly zeroless?: boolean;
  kernel(exports: GeneratorExports): FillWords;
}

/** How many words a state has, in words. */
const COUNTS = ["one word", "two words", "three words", "four words"];

export function f2Linear(generator: F2Linear): Recurrence {
  const { about, words, wordBits, step, output, least, zeroless = false } = generator;
  const size = 1n << BigInt(wordBits);
  const degree = generator.degree ?? words * wordBits;
  const ranges = equalWords(words, size).map((range, k) => ({ ...range, least: least?.[k] ?? 0n }));
  const nonZero = (state: State): boolean => state.some((word) => word !== 0n);
  const valid = (state: State): boolean =>
    nonZero(state) && ranges.every((range, k) => (state[k] ?? -1n) >= range.least);
  const example = ranges.map((range, k) => range.least + BigInt(k + 1)).join(",");
  const limits = least === undefined ? "not all 0" : `at least ${least.join(", ")}`;
  const linearWord = generator.linear === "outputs" ? output : ([first = 0n]: State): bigint => first;
  let polynomial: bigint | undefined;
  return {
    about,
    output: { modulus: size, bytes: wordBits === 32 ? 4 : 8, zeroless, integers: 1 },
    stateFromKey: (key) => {
      for (let attempt = 0; ; attempt++) {
        const from = attempt === 0 ? key : key.derive(`attempt ${attempt}`);
        const state = [...from.words64(words)].map((word) => word % size);
        if (valid(state)) return state;
      }
    },
    stateFromText: (text) =>
      parseWords(text, {
        id: about.id,
        words: ranges,
        allowed: `${COUNTS[words - 1] ?? words} below 2^${wordBits}, ${limits}, like "${example}",`,
        valid: nonZero,
      }),
    binary: {
      stateBits: degree,
      of: typeof generator.linear === "function" ? "bijection" : generator.linear,
      wordBits,
      *words(start) {
        const word = typeof generator.linear === "function" ? generator.linear : linearWord;
        // one step in, the state is inside the recurrence
        for (let state = step(start); ; state = step(state)) yield word(state);
      },
    },
    kernel: (exports) => generator.kernel(exports),
    *integers(start) {
      for (let state = start; ;) {
        const next = step(state);
        yield output(generator.outputFrom === "before" ? state : next);
        state = next;
      }
    },
    advance: (state, count) => {
      if (count === 0n) return state;
      // after one step the state is inside the recurrence, whatever bits the start had that the map ignores
      const start = step(state);
      polynomial ??= characteristicPolynomial(
        step,
        step(ranges.map((range, k) => range.least + BigInt(k + 1))),
        degree,
      );
      return applyPolynomial(powerOfX(count - 1n, polynomial), step, start);
    },
    ...(words === 1 && wordBits === 32 && least === undefined
      ? { states: (bits: Bits | null) => f2States(generator, bits) }
      : {}),
  };
}

const MASK64 = (1n << 64n) - 1n;

/** x turned left by k places in 64 bits. */
export function rotl64(x: bigint, k: bigint): bigint {
  return ((x << k) | (x >> (64n - k))) & MASK64;
}

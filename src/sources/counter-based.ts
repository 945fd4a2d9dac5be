/**
 * Counter-based generators of 64-bit words, four a block: what Philox4x64 and Threefry4x64 share. The key comes from the
 * stream's key, the 256-bit counter begins at 0. The published form of a state is "counter;key" in hexadecimal 64-bit
 * words, word 0 first, as in known-answer tables.
 */
import type { FillWords, GeneratorExports } from "../kernels/generator-exports.js";
import type { About, Recurrence, State } from "./pseudo-random.js";

const WORD = (1n << 64n) - 1n;
const COUNTERS = 1n << 256n;

interface CounterBased {
  readonly about: Omit<About, "method" | "outputBits" | "period" | "knownStructure">;
  readonly keyWords: 2 | 4;
  /** The four words of one block. */
  readonly block: (counter: readonly bigint[], key: readonly bigint[]) => readonly bigint[];
  readonly kernel: (exports: GeneratorExports) => FillWords;
}

function split(counter: bigint): bigint[] {
  return [0n, 64n, 128n, 192n].map((shift) => (counter >> shift) & WORD);
}

/** Hexadecimal words of at most `digits` digits, parted by spaces or commas; null where the text is something else. */
export function hexWords(text: string, count: number, digits: number): bigint[] | null {
  const words = text.trim().split(/[\s,]+/);
  const fits = words.every(
    (word) => /^(0x)?[0-9a-f]+$/i.test(word) && word.replace(/^0x/i, "").length <= digits,
  );
  return fits && words.length === count ? words.map((word) => BigInt(`0x${word.replace(/^0x/i, "")}`)) : null;
}

export function counterBased({ about, keyWords, block, kernel }: CounterBased): Recurrence {
  const counterOf = (state: State): bigint =>
    state.slice(0, 4).reduceRight((high, word) => (high << 64n) | word, 0n);
  const keyOf = (state: State): State => state.slice(4, 4 + keyWords);
  const usedOf = (state: State): bigint => state[4 + keyWords] ?? 0n;
  return {
    about: {
      ...about,
      method: "counter-based",
      outputBits: 64,
      period: 4n * COUNTERS,
      knownStructure: null,
    },
    output: { modulus: 1n << 64n, bytes: 8, zeroless: false, integers: 1 },
    stateFromKey: (key) => [0n, 0n, 0n, 0n, ...key.words64(keyWords), 0n],
    stateFromText: (text) => {
      const [counterText = "", keyText = "", ...more] = text.split(";");
      const [counter, key] = [hexWords(counterText, 4, 16), hexWords(keyText, keyWords, 16)];
      if (counter !== null && key !== null && more.length === 0) return [...counter, ...key, 0n];
      const zeros = Array.from({ length: keyWords }, () => "0").join(" ");
      throw new RangeError(
        `state: expected "counter;key" as 4 and ${keyWords} hexadecimal 64-bit words, like "0 0 0 0;${zeros}", for source "${about.id}", found "${text}"`,
      );
    },
    kernel,
    *integers(state) {
      for (let counter = counterOf(state), skip = Number(usedOf(state)); ; skip = 0) {
        yield* block(split(counter), keyOf(state)).slice(skip);
        counter = (counter + 1n) % COUNTERS;
      }
    },
    advance: (state, words) => {
      const total = usedOf(state) + words;
      return [...split(counterOf(state) + total / 4n), ...keyOf(state), total % 4n];
    },
  };
}

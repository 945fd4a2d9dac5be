/**
 * Philox4x32-10: J. K. Salmon, M. A. Moraes, R. O. Dror and D. E. Shaw, "Parallel random numbers: as easy as 1, 2, 3",
 * Proceedings of the International Conference for High Performance Computing, Networking, Storage and Analysis (2011),
 * article 16. A keyed bijection of 128-bit counters by ten rounds of multiplication and exclusive or. Good for: any
 * index at once, independent streams by key, sound output. Bad at: nothing known here; not for cryptography.
 *
 * Two 32-bit words make one coordinate of 52 bits, so that this source has full resolution: word 2i is the low half,
 * word 2i + 1 the high half of the 64-bit integer whose top 52 bits are used. `openIntegers` gives the 32-bit words.
 *
 * Starting states: 64-bit key from the stream's key, counter from 0. The published form is "counter;key" in
 * hexadecimal 32-bit words, word 0 first, as in known-answer tables:
 * "243f6a88 85a308d3 13198a2e 03707344;a4093822 299f31d0".
 */
import { hexWords } from "./counter-based.js";
import { pseudoRandom, type State } from "./pseudo-random.js";

const WORD = 0xffffffffn;
const COUNTERS = 1n << 128n;

function join(words: readonly bigint[]): bigint {
  return words.reduceRight((high, word) => (high << 32n) | word, 0n);
}

function pack(counter: bigint, key: bigint, used: bigint): State {
  return [counter & ((1n << 64n) - 1n), counter >> 64n, key, used];
}

function counterOf([low = 0n, high = 0n]: State): bigint {
  return (high << 64n) | low;
}

function parse(text: string): State {
  const [counterText = "", keyText = "", ...more] = text.split(";");
  const [counter, key] = [hexWords(counterText, 4, 8), hexWords(keyText, 2, 8)];
  if (counter !== null && key !== null && more.length === 0) return pack(join(counter), join(key), 0n);
  throw new RangeError(
    `state: expected "counter;key" as four and two hexadecimal 32-bit words, like "0 0 0 0;0 0", for source "philox4x32", found "${text}"`,
  );
}

/** The four words of one block. */
function block(counter: bigint, key: bigint): bigint[] {
  let [x0, x1, x2, x3] = [0n, 32n, 64n, 96n].map((shift) => (counter >> shift) & WORD) as [
    bigint,
    bigint,
    bigint,
    bigint,
  ];
  let [k0, k1] = [key & WORD, key >> 32n];
  for (let round = 0; round < 10; round++) {
    const [p, q] = [x0 * 0xd2511f53n, x2 * 0xcd9e8d57n];
    [x0, x1, x2, x3] = [(q >> 32n) ^ x1 ^ k0, q & WORD, (p >> 32n) ^ x3 ^ k1, p & WORD];
    k0 = (k0 + 0x9e3779b9n) & WORD;
    k1 = (k1 + 0xbb67ae85n) & WORD;
  }
  return [x0, x1, x2, x3];
}

export const philox4x32 = pseudoRandom({
  about: {
    id: "philox4x32",
    title: "Philox4x32-10",
    citation:
      "J. K. Salmon, M. A. Moraes, R. O. Dror, D. E. Shaw, Parallel random numbers: as easy as 1, 2, 3, Proceedings of SC11 (2011), article 16",
    method: "counter-based",
    outputBits: 64,
    period: 4n * COUNTERS,
    knownStructure: null,
  },
  output: { modulus: 1n << 64n, bytes: 8, zeroless: false, integers: 2 },
  stateFromKey: (key) => pack(0n, key.words64(1)[0] ?? 0n, 0n),
  stateFromText: parse,
  kernel: (exports) => exports.fillPhilox4x32,
  *integers(state) {
    const [, , key = 0n, used = 0n] = state;
    for (let counter = counterOf(state), skip = Number(2n * used); ; skip = 0) {
      yield* block(counter, key).slice(skip);
      counter = (counter + 1n) % COUNTERS;
    }
  },
  advance: (state, words) => {
    const [, , key = 0n, used = 0n] = state;
    return pack((counterOf(state) + ((used + words) >> 1n)) % COUNTERS, key, (used + words) & 1n);
  },
});

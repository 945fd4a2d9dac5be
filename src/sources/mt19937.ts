/**
 * MT19937, the Mersenne twister: M. Matsumoto and T. Nishimura, "Mersenne twister: a 623-dimensionally equidistributed
 * uniform pseudo-random number generator", ACM Transactions on Modeling and Computer Simulation 8 (1998) 3-30. A
 * linear recurrence over GF(2) on 19,937 bits with tempered output; each coordinate is one 32-bit output, (k + 1/2) /
 * 2^32. Good for: almost everything, and it is what most production code runs. Bad at: linearity over GF(2) itself
 * (ranks of large binary matrices), resolution below 2^-32, recovery from states with few set bits.
 *
 * Starting states: not uniform over the 2^19937 - 1 states but the authors' `init_by_array` (2002) of eight key words,
 * as the state is far larger than any key. The published form of a state is the seed of `init_genrand` (2002), "5489",
 * or the key of `init_by_array`, "291,564,837,1110".
 */
import { pseudoRandom, type State } from "./pseudo-random.js";

const N = 624;
const LAG = 397;
const KEY_WORDS = 8;

/** `init_genrand`: x(i) = 1812433253 (x(i-1) xor x(i-1) / 2^30) + i mod 2^32. */
function fromSeed(seed: number): Uint32Array {
  const words = new Uint32Array(N);
  words[0] = seed;
  for (let i = 1; i < N; i++) {
    const previous = words[i - 1] ?? 0;
    words[i] = Math.imul(1812433253, previous ^ (previous >>> 30)) + i;
  }
  return words;
}

/** `init_by_array`: every key word reaches every state word, by two passes over the state. */
function fromArray(key: Uint32Array): Uint32Array {
  const words = fromSeed(19650218);
  let i = 1;
  const next = (multiplier: number, added: (before: number) => number): void => {
    const previous = words[i - 1] ?? 0;
    const mixed = (words[i] ?? 0) ^ Math.imul(previous ^ (previous >>> 30), multiplier);
    words[i] = mixed + added(i);
    if (++i >= N) {
      words[0] = words[N - 1] ?? 0;
      i = 1;
    }
  };
  for (let k = 0; k < Math.max(N, key.length); k++) {
    const j = k % key.length;
    next(1664525, () => (key[j] ?? 0) + j);
  }
  for (let k = 1; k < N; k++) next(1566083941, (position) => -position);
  words[0] = 0x80000000;
  return words;
}

/** One number is the seed of `init_genrand`, several are the key of `init_by_array`. */
function seeded(text: string): Uint32Array {
  const numbers = /^\d+(\s*,\s*\d+){0,623}$/.test(text.trim()) ? text.split(",").map(Number) : [];
  const [seed] = numbers;
  if (seed !== undefined && numbers.every((number) => number < 2 ** 32)) {
    return numbers.length === 1 ? fromSeed(seed) : fromArray(Uint32Array.from(numbers));
  }
  throw new RangeError(
    `state: expected a seed from 0 to 4294967295, or 2 to 624 of them as a key, for source "mt19937", found "${text}"`,
  );
}

/** The kernel's layout: the words two by two, then the index of the next (624: a new block is due). */
function pack(words: Uint32Array): State {
  return [...new BigUint64Array(words.buffer, words.byteOffset, N / 2), BigInt(N)];
}

export const mt19937 = pseudoRandom({
  about: {
    id: "mt19937",
    title: "Mersenne twister MT19937",
    citation:
      "M. Matsumoto, T. Nishimura, Mersenne twister: a 623-dimensionally equidistributed uniform pseudo-random number generator, ACM Transactions on Modeling and Computer Simulation 8 (1998) 3-30",
    method: "linear feedback",
    outputBits: 32,
    period: (1n << 19937n) - 1n,
    knownStructure: null,
  },
  output: { modulus: 1n << 32n, bytes: 4, zeroless: false, integers: 1 },
  stateFromKey: (key) => pack(fromArray(key.words32(KEY_WORDS))),
  stateFromText: (text) => pack(seeded(text)),
  binary: { stateBits: 19937, of: "outputs", wordBits: 32, words: integers },
  kernel: (exports) => exports.fillMt19937,
  integers,
});

function* integers(state: State): Generator<bigint, never> {
  const words = new Uint32Array(new BigUint64Array(state.slice(0, N / 2)).buffer);
  for (let index = Number(state[N / 2] ?? 0n); ; index++) {
    const i = index % N;
    if (i === 0) twist(words);
    yield temper(words[i] ?? 0);
  }
}

/** x(i) = x(i + 397) xor (upper bit of x(i), lower bits of x(i + 1)) A, all indices mod 624. */
function twist(words: Uint32Array): void {
  for (let i = 0; i < N; i++) {
    const t = ((words[i] ?? 0) & 0x80000000) | ((words[(i + 1) % N] ?? 0) & 0x7fffffff);
    words[i] = (words[(i + LAG) % N] ?? 0) ^ (t >>> 1) ^ (t & 1 ? 0x9908b0df : 0);
  }
}

function temper(word: number): bigint {
  let y = word;
  y ^= y >>> 11;
  y ^= (y << 7) & 0x9d2c5680;
  y ^= (y << 15) & 0xefc60000;
  y ^= y >>> 18;
  return BigInt(y >>> 0);
}

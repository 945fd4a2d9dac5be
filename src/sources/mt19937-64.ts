/**
 * MT19937-64: T. Nishimura, "Tables of 64-bit Mersenne twisters", ACM Transactions on Modeling and Computer Simulation 10
 * (2000) 348-357. The Mersenne twister's recurrence over GF(2) on 64-bit words. Good and bad for what MT19937 is, at the
 * full resolution of a coordinate.
 *
 * Starting states: the authors' `init_by_array64` (2004) of four key words. The published form is the seed of
 * `init_genrand64`, "5489", or the key of `init_by_array64`, "74565,144470,214375,284280".
 */
import { pseudoRandom, type State } from "./pseudo-random.js";

const N = 312;
const LAG = 156;
const KEY_WORDS = 4;
const SIZE = 1n << 64n;
const MASK = SIZE - 1n;

/** `init_genrand64`: x(i) = 6364136223846793005 (x(i-1) xor x(i-1) / 2^62) + i mod 2^64. */
function fromSeed(seed: bigint): bigint[] {
  const words = [seed];
  for (let i = 1n; i < BigInt(N); i++) {
    const previous = words.at(-1) ?? 0n;
    words.push((6364136223846793005n * (previous ^ (previous >> 62n)) + i) & MASK);
  }
  return words;
}

/** `init_by_array64`: every key word reaches every state word, by two passes over the state. */
function fromArray(key: BigUint64Array): bigint[] {
  const words = fromSeed(19650218n);
  let i = 1;
  const next = (multiplier: bigint, added: bigint): void => {
    const previous = words[i - 1] ?? 0n;
    const mixed = (words[i] ?? 0n) ^ ((previous ^ (previous >> 62n)) * multiplier);
    words[i] = BigInt.asUintN(64, mixed + added);
    if (++i >= N) {
      words[0] = words[N - 1] ?? 0n;
      i = 1;
    }
  };
  for (let k = 0; k < Math.max(N, key.length); k++) {
    const j = k % key.length;
    next(3935559000370003845n, (key[j] ?? 0n) + BigInt(j));
  }
  for (let k = 1; k < N; k++) next(2862933555777941757n, BigInt(-i));
  words[0] = 1n << 63n;
  return words;
}

/** One number is the seed of `init_genrand64`, several are the key of `init_by_array64`. */
function seeded(text: string): bigint[] {
  const numbers = /^\d+(\s*,\s*\d+){0,311}$/.test(text.trim())
    ? text.split(",").map((word) => BigInt(word))
    : [];
  const [seed] = numbers;
  if (seed !== undefined && numbers.every((number) => number < SIZE)) {
    return numbers.length === 1 ? fromSeed(seed) : fromArray(BigUint64Array.from(numbers));
  }
  throw new RangeError(
    `state: expected a seed below 2^64, or 2 to 312 of them as a key, for source "mt19937-64", found "${text}"`,
  );
}

/** The kernel's layout: the words, then the index of the next (312: a new block is due). */
function pack(words: readonly bigint[]): State {
  return [...words, BigInt(N)];
}

export const mt19937x64 = pseudoRandom({
  about: {
    id: "mt19937-64",
    title: "Mersenne twister MT19937-64",
    citation:
      "T. Nishimura, Tables of 64-bit Mersenne twisters, ACM Transactions on Modeling and Computer Simulation 10 (2000) 348-357",
    method: "linear feedback",
    outputBits: 64,
    period: (1n << 19937n) - 1n,
    knownStructure: null,
  },
  output: { modulus: SIZE, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: (key) => pack(fromArray(key.words64(KEY_WORDS))),
  stateFromText: (text) => pack(seeded(text)),
  binary: { stateBits: 19937, of: "outputs", wordBits: 64, words: integers },
  kernel: (exports) => exports.fillMt19937x64,
  integers,
});

function* integers(state: State): Generator<bigint, never> {
  const words = state.slice(0, N);
  for (let index = Number(state[N] ?? 0n); ; index++) {
    const i = index % N;
    if (i === 0) twist(words);
    yield temper(words[i] ?? 0n);
  }
}

/** x(i) = x(i + 156) xor (33 upper bits of x(i), 31 lower of x(i + 1)) A, all indices mod 312. */
function twist(words: bigint[]): void {
  for (let i = 0; i < N; i++) {
    const t = ((words[i] ?? 0n) & 0xffffffff80000000n) | ((words[(i + 1) % N] ?? 0n) & 0x7fffffffn);
    words[i] = (words[(i + LAG) % N] ?? 0n) ^ (t >> 1n) ^ (t & 1n ? 0xb5026f5aa96619e9n : 0n);
  }
}

function temper(word: bigint): bigint {
  let y = word;
  y ^= (y >> 29n) & 0x5555555555555555n;
  y ^= (y << 17n) & 0x71d67fffeda60000n;
  y ^= (y << 37n) & 0xfff7eee000000000n;
  return y ^ (y >> 43n);
}

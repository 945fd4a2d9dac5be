/**
 * xoshiro256++: D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM Transactions on
 * Mathematical Software 47 (2021) 36. A linear recurrence over GF(2) on 256 bits whose output is scrambled by two
 * additions and a rotation. Good for: speed, with a sound output. Bad at: states with few set bits (it takes some
 * dozens of outputs to leave them).
 *
 * Starting states: uniform over the 2^256 - 1 that are not zero. The published form is the four words, "1,2,3,4".
 */
import { applyPolynomial, characteristicPolynomial, powerOfX } from "../numeric/gf2-polynomial.js";
import { pseudoRandom, type State } from "./pseudo-random.js";

const MASK = (1n << 64n) - 1n;

function rotl(x: bigint, k: bigint): bigint {
  return ((x << k) | (x >> (64n - k))) & MASK;
}

function step([s0 = 0n, s1 = 0n, s2 = 0n, s3 = 0n]: State): State {
  const [a, b] = [s2 ^ s0, s3 ^ s1];
  return [s0 ^ b, s1 ^ a, a ^ ((s1 << 17n) & MASK), rotl(b, 45n)];
}

/** Characteristic polynomial of `step`, from 512 successive values of one state bit (found once, when first needed). */
let characteristic: bigint | undefined;

function advance(state: State, words: bigint): State {
  characteristic ??= characteristicPolynomial(step, [1n, 2n, 3n, 4n], 256);
  return applyPolynomial(powerOfX(words, characteristic), step, state);
}

export const xoshiro256PlusPlus = pseudoRandom({
  about: {
    id: "xoshiro256++",
    title: "xoshiro256++",
    citation:
      "D. Blackman, S. Vigna, Scrambled linear pseudorandom number generators, ACM Transactions on Mathematical Software 47 (2021) 36",
    method: "linear feedback",
    outputBits: 64,
    period: (1n << 256n) - 1n,
    knownStructure: null,
  },
  output: { modulus: 1n << 64n, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: (key) => {
    const words = [...key.words64(4)];
    return words.some((word) => word !== 0n) ? words : [1n, 0n, 0n, 0n];
  },
  stateFromText: (text) => {
    const words = /^\d+(\s*,\s*\d+){3}$/.test(text) ? text.split(",").map((word) => BigInt(word)) : [];
    if (words.length === 4 && words.every((word) => word <= MASK) && words.some((word) => word > 0n))
      return words;
    throw new RangeError(
      `state: expected four words below 2^64, not all 0, like "1,2,3,4", for source "xoshiro256++", found "${text}"`,
    );
  },
  kernel: (exports) => exports.fillXoshiro256PlusPlus,
  *integers(start) {
    for (let state = start; ; state = step(state)) {
      const [s0 = 0n, , , s3 = 0n] = state;
      yield (rotl((s0 + s3) & MASK, 23n) + s0) & MASK;
    }
  },
  advance,
});

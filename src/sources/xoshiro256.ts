/**
 * xoshiro256+, ++ and **: D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM Transactions
 * on Mathematical Software 47 (2021) 36. One linear recurrence over GF(2) on 256 bits and three ways of scrambling its
 * output. Good for: speed, with a sound output (++ and **). Bad at: the lowest bits of + are a linear register; states
 * with few set bits take some dozens of outputs to leave.
 */
import { f2Linear, rotl64, type F2Linear } from "./f2-linear.js";
import { pseudoRandom, type State } from "./pseudo-random.js";

const MASK = (1n << 64n) - 1n;

function step([s0 = 0n, s1 = 0n, s2 = 0n, s3 = 0n]: State): State {
  const [a, b] = [s2 ^ s0, s3 ^ s1];
  return [s0 ^ b, s1 ^ a, a ^ ((s1 << 17n) & MASK), rotl64(b, 45n)];
}

function member(
  id: string,
  knownStructure: string | null,
  { output, linear, kernel }: Pick<F2Linear, "output" | "linear" | "kernel">,
): F2Linear {
  const about = {
    id,
    title: id,
    citation:
      "D. Blackman, S. Vigna, Scrambled linear pseudorandom number generators, ACM Transactions on Mathematical Software 47 (2021) 36",
    method: "linear feedback",
    outputBits: 64,
    period: (1n << 256n) - 1n,
    knownStructure,
  };
  return { about, words: 4, wordBits: 64, step, output, linear, outputFrom: "before", kernel };
}

export const xoshiro256Plus = pseudoRandom(
  f2Linear(
    member("xoshiro256+", "the lowest bits are linear over GF(2)", {
      output: ([s0 = 0n, , , s3 = 0n]) => (s0 + s3) & MASK,
      linear: "state",
      kernel: (exports) => exports.fillXoshiro256Plus,
    }),
  ),
);

export const xoshiro256PlusPlus = pseudoRandom(
  f2Linear(
    member("xoshiro256++", null, {
      output: ([s0 = 0n, , , s3 = 0n]) => (rotl64((s0 + s3) & MASK, 23n) + s0) & MASK,
      linear: "state",
      kernel: (exports) => exports.fillXoshiro256PlusPlus,
    }),
  ),
);

export const xoshiro256StarStar = pseudoRandom(
  f2Linear(
    member("xoshiro256**", null, {
      output: ([, s1 = 0n]) => (rotl64((s1 * 5n) & MASK, 7n) * 9n) & MASK,
      linear: ([, s1 = 0n]) => s1,
      kernel: (exports) => exports.fillXoshiro256StarStar,
    }),
  ),
);

/**
 * xoroshiro128+, ++ and **: D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM
 * Transactions on Mathematical Software 47 (2021) 36. A linear recurrence over GF(2) on 128 bits, shifts (24, 16, 37)
 * for + and **, (49, 21, 28) for ++. Good for: speed in little space. Bad at: the lowest bits of + are a linear
 * register, and a period of 2^128 leaves little room for many streams of great length.
 */
import { f2Linear, rotl64, type F2Linear } from "./f2-linear.js";
import { pseudoRandom, type State } from "./pseudo-random.js";

const MASK = (1n << 64n) - 1n;

/** One step with these shifts. */
function shifting(a: bigint, b: bigint, c: bigint): (state: State) => State {
  return ([s0 = 0n, s1 = 0n]) => {
    const t = s1 ^ s0;
    return [rotl64(s0, a) ^ t ^ ((t << b) & MASK), rotl64(t, c)];
  };
}

function member(
  id: string,
  knownStructure: string | null,
  { step, output, linear, kernel }: Pick<F2Linear, "step" | "output" | "linear" | "kernel">,
): F2Linear {
  const about = {
    id,
    title: id,
    citation:
      "D. Blackman, S. Vigna, Scrambled linear pseudorandom number generators, ACM Transactions on Mathematical Software 47 (2021) 36",
    method: "linear feedback",
    outputBits: 64,
    period: (1n << 128n) - 1n,
    knownStructure,
  };
  return { about, words: 2, wordBits: 64, step, output, linear, outputFrom: "before", kernel };
}

export const xoroshiro128Plus = pseudoRandom(
  f2Linear(
    member("xoroshiro128+", "the lowest bits are linear over GF(2)", {
      step: shifting(24n, 16n, 37n),
      output: ([s0 = 0n, s1 = 0n]) => (s0 + s1) & MASK,
      linear: "state",
      kernel: (exports) => exports.fillXoroshiro128Plus,
    }),
  ),
);

export const xoroshiro128PlusPlus = pseudoRandom(
  f2Linear(
    member("xoroshiro128++", null, {
      step: shifting(49n, 21n, 28n),
      output: ([s0 = 0n, s1 = 0n]) => (rotl64((s0 + s1) & MASK, 17n) + s0) & MASK,
      linear: "state",
      kernel: (exports) => exports.fillXoroshiro128PlusPlus,
    }),
  ),
);

export const xoroshiro128StarStar = pseudoRandom(
  f2Linear(
    member("xoroshiro128**", null, {
      step: shifting(24n, 16n, 37n),
      output: ([s0 = 0n]) => (rotl64((s0 * 5n) & MASK, 7n) * 9n) & MASK,
      linear: ([s0 = 0n]) => s0,
      kernel: (exports) => exports.fillXoroshiro128StarStar,
    }),
  ),
);

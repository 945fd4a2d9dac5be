/**
 * L'Ecuyer's combined generator of 1988: P. L'Ecuyer, "Efficient and portable combined random number generators",
 * Communications of the ACM 31 (1988) 742-751, figure 3. Two congruential generators, 40014 mod 2147483563 and 40692 mod
 * 2147483399, combined as z = s1 - s2, taken from 1 ... 2147483562; the coordinate is z / 2147483563, between 4.7e-10
 * and 1 - 4.7e-10. Good for: its time. Bad at: 31 bits of resolution; the lattice of the combination is that of a
 * congruential generator of modulus near 2^62, good but not for long runs.
 */
import { combinedCongruential } from "./combined-congruential.js";
import { pseudoRandom } from "./pseudo-random.js";

export const lecuyer1988 = pseudoRandom(
  combinedCongruential({
    about: {
      id: "lecuyer1988",
      title: "L'Ecuyer's combined generator of 1988",
      citation:
        "P. L'Ecuyer, Efficient and portable combined random number generators, Communications of the ACM 31 (1988) 742-751",
      method: "combined congruential",
      outputBits: 31,
      period: (2147483562n * 2147483398n) / 2n,
      knownStructure: null,
    },
    components: [
      { multiplier: 40014n, modulus: 2147483563n },
      { multiplier: 40692n, modulus: 2147483399n },
    ],
    output: { modulus: 2147483563n, bytes: 8, zeroless: true, integers: 1 },
    combine: ([s1 = 0n, s2 = 0n]) => (s1 > s2 ? s1 - s2 : s1 - s2 + 2147483562n),
    note: "the output z / 2147483563 differs from s1 / m1 - s2 / m2 by less than 8e-8",
    kernel: (exports) => exports.fillLecuyer1988,
  }),
);

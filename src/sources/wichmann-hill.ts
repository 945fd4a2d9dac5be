/**
 * Wichmann and Hill's generator: B. A. Wichmann and I. D. Hill, "Algorithm AS 183: an efficient and portable
 * pseudo-random number generator", Applied Statistics 31 (1982) 188-190. Three congruential generators modulo 30269,
 * 30307 and 30323 whose fractions are added modulo 1. The sum is a whole number w over the product of the moduli, and
 * w / 27817185604309 is returned, correctly rounded (adding three rounded fractions differs in the last bit); it lies
 * between 3.6e-14 and 1 - 3.6e-14. It is one congruential generator of that modulus (H. Zeisel, Applied Statistics 35
 * (1986) 89). Good for: running on any machine. Bad at: a period of 7e12 only.
 */
import { combinedCongruential } from "./combined-congruential.js";
import { pseudoRandom } from "./pseudo-random.js";

const PRODUCT = 30269n * 30307n * 30323n;

export const wichmannHill = pseudoRandom(
  combinedCongruential({
    about: {
      id: "wichmann-hill",
      title: "Wichmann and Hill, AS 183",
      citation:
        "B. A. Wichmann, I. D. Hill, Algorithm AS 183: an efficient and portable pseudo-random number generator, Applied Statistics 31 (1982) 188-190",
      method: "combined congruential",
      outputBits: 44,
      period: (30268n * 30306n * 30322n) / 4n,
      knownStructure: "tuples lie on a lattice of 2.8e13 points; short period",
    },
    components: [
      { multiplier: 171n, modulus: 30269n },
      { multiplier: 172n, modulus: 30307n },
      { multiplier: 170n, modulus: 30323n },
    ],
    output: { modulus: PRODUCT, bytes: 8, zeroless: true, integers: 1 },
    combine: ([x = 0n, y = 0n, z = 0n]) =>
      (x * 30307n * 30323n + y * 30269n * 30323n + z * 30269n * 30307n) % PRODUCT,
    note: null,
    kernel: (exports) => exports.fillWichmannHill,
  }),
);

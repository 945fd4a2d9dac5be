/**
 * Xorshift generators: G. Marsaglia, "Xorshift RNGs", Journal of Statistical Software 8 (2003) 14: 32 bits with the
 * triple (13, 17, 5), and 128 bits with (11, 8, 19); xorshift64*: S. Vigna, "An experimental exploration of
 * Marsaglia's xorshift generators, scrambled", ACM Transactions on Mathematical Software 42 (2016) 30. Good for: being
 * small. Bad at: all but 64* are linear over GF(2) to the last output bit, and states with few set bits are left slowly
 * (F. Panneton and P. L'Ecuyer, "On the xorshift random number generators", ACM Transactions on Modeling and Computer
 * Simulation 15 (2005) 346-361). An output of xorshift32 is its state, never 0, but x / 2^32 would be no better founded
 * than for any register: the midpoint is used as everywhere.
 */
import { f2Linear } from "./f2-linear.js";
import { pseudoRandom } from "./pseudo-random.js";

const MASK32 = (1n << 32n) - 1n;
const MASK64 = (1n << 64n) - 1n;

const MARSAGLIA = "G. Marsaglia, Xorshift RNGs, Journal of Statistical Software 8 (2003) 14";

export const xorshift32 = pseudoRandom(
  f2Linear({
    about: {
      id: "xorshift32",
      title: "Xorshift, 32 bits (13, 17, 5)",
      citation: MARSAGLIA,
      method: "linear feedback",
      outputBits: 32,
      period: (1n << 32n) - 1n,
      knownStructure: "linear over GF(2); short period",
    },
    words: 1,
    wordBits: 32,
    step: ([x = 0n]) => {
      const a = x ^ ((x << 13n) & MASK32);
      const b = a ^ (a >> 17n);
      return [b ^ ((b << 5n) & MASK32)];
    },
    output: ([x = 0n]) => x,
    linear: "outputs",
    outputFrom: "after",
    kernel: (exports) => exports.fillXorshift32,
  }),
);

export const xorshift64Star = pseudoRandom(
  f2Linear({
    about: {
      id: "xorshift64*",
      title: "Xorshift64*, 64 bits (12, 25, 27), multiplied",
      citation:
        "S. Vigna, An experimental exploration of Marsaglia's xorshift generators, scrambled, ACM Transactions on Mathematical Software 42 (2016) 30",
      method: "linear feedback",
      outputBits: 64,
      period: (1n << 64n) - 1n,
      knownStructure: "the lowest bits are linear over GF(2)",
    },
    words: 1,
    wordBits: 64,
    step: ([x = 0n]) => {
      const a = x ^ (x >> 12n);
      const b = a ^ ((a << 25n) & MASK64);
      return [b ^ (b >> 27n)];
    },
    output: ([x = 0n]) => (x * 2685821657736338717n) & MASK64,
    linear: ([x = 0n]) => x,
    outputFrom: "after",
    kernel: (exports) => exports.fillXorshift64Star,
  }),
);

export const xorshift128 = pseudoRandom(
  f2Linear({
    about: {
      id: "xorshift128",
      title: "Xorshift, 128 bits (11, 8, 19)",
      citation: MARSAGLIA,
      method: "linear feedback",
      outputBits: 32,
      period: (1n << 128n) - 1n,
      knownStructure: "linear over GF(2)",
    },
    words: 4,
    wordBits: 32,
    step: ([x = 0n, y = 0n, z = 0n, w = 0n]) => {
      const t = x ^ ((x << 11n) & MASK32);
      return [y, z, w, w ^ (w >> 19n) ^ t ^ (t >> 8n)];
    },
    output: ([, , , w = 0n]) => w,
    linear: "outputs",
    outputFrom: "after",
    kernel: (exports) => exports.fillXorshift128,
  }),
);

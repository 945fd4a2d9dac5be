/**
 * Xorshift with any three shifts of one word of 32 or 64 bits: G. Marsaglia, "Xorshift RNGs", Journal of Statistical
 * Software 8 (2003) 14, whose tables list the triples of full period. A positive shift goes left, a negative one right.
 * Good for: being small. Bad at: every output bit is linear over GF(2); a triple outside the tables may have short cycles.
 */
import { f2Linear } from "./f2-linear.js";
import type { About, Recurrence } from "./pseudo-random.js";

export function xorshiftTriple(
  about: About,
  bits: 32 | 64,
  shifts: readonly [number, number, number],
): Recurrence {
  const mask = (1n << BigInt(bits)) - 1n;
  const recurrence = f2Linear({
    about,
    words: 1,
    wordBits: bits,
    step: ([word = 0n]) => [
      shifts.reduce((x, by) => (by > 0 ? x ^ ((x << BigInt(by)) & mask) : x ^ (x >> BigInt(-by))), word),
    ],
    output: ([x = 0n]) => x,
    linear: "outputs",
    outputFrom: "after",
    kernel: (exports) => (bits === 32 ? exports.fillXorshiftTriple32 : exports.fillXorshiftTriple64),
  });
  return { ...recurrence, constants: shifts.map((by) => BigInt.asUintN(64, BigInt(by))) };
}

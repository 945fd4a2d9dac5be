/**
 * Congruential generators modulo a power of two that stand in languages, libraries and textbooks. All have full period
 * (T. E. Hull and A. R. Dobell 1962). Good for: meeting again what is in use. Bad at: the low k bits of every one of
 * them repeat after 2^k outputs, and tuples lie on a lattice of as many points as the modulus has values.
 */
import { congruential } from "./congruential.js";
import type { Bits } from "./conversion.js";
import { pseudoRandom, USUAL, type PseudoRandomSource } from "./pseudo-random.js";

const LOW_BITS = "tuples lie on a lattice; the low k bits repeat after 2^k outputs";

function binary(
  id: string,
  title: string,
  citation: string,
  [multiplier, increment, exponent]: readonly [bigint, bigint, bigint],
  bits: Bits | null = null,
): PseudoRandomSource {
  const modulus = 1n << exponent;
  const about = {
    id,
    title,
    citation,
    method: "congruential",
    outputBits: bits?.count ?? Number(exponent),
    period: modulus,
    knownStructure: bits === null ? LOW_BITS : "tuples lie on a lattice",
  };
  return pseudoRandom(congruential(about, { multiplier, increment, modulus }), { ...USUAL, bits });
}

const KNUTH = "D. E. Knuth, The Art of Computer Programming, vol. 2, 3rd ed. (1997), 3.3.4, table 1";
const POSIX = "The Open Group, IEEE Std 1003.1 (POSIX), drand48 family (2018)";
const RAND48 = [25214903917n, 11n, 48n] as const;

/** Marsaglia's candidate for "the best of all multipliers" (1972), with increment 1 as on VAX machines. */
export const lcg69069 = binary(
  "lcg-69069",
  "69069 x + 1 mod 2^32",
  "G. Marsaglia, The structure of linear congruential sequences, in Applications of Number Theory to Numerical Analysis (1972) 249-285",
  [69069n, 1n, 32n],
);

export const lcg1103515245 = binary(
  "lcg-1103515245",
  "1103515245 x + 12345 mod 2^31, the C standard's example",
  "ISO/IEC 9899 (C), example of rand, 7.20.2.2 (1999)",
  [1103515245n, 12345n, 31n],
);

export const lcg1664525 = binary("lcg-1664525", "1664525 x + 1013904223 mod 2^32", KNUTH, [
  1664525n,
  1013904223n,
  32n,
]);

export const lcg6364136223846793005 = binary(
  "lcg-6364136223846793005",
  "6364136223846793005 x + 1442695040888963407 mod 2^64",
  KNUTH,
  [6364136223846793005n, 1442695040888963407n, 64n],
);

/** All 48 bits; a state set by srand48(s) is 65536 s + 13070. */
export const drand48 = binary("drand48", "25214903917 x + 11 mod 2^48, all bits", POSIX, RAND48);

/** The top 31 bits of the same state. */
export const lrand48 = binary("lrand48", "25214903917 x + 11 mod 2^48, top 31 bits", POSIX, RAND48, {
  end: "top",
  count: 31,
});

/** The top 32 bits of the same state (mrand48 without its sign). */
export const mrand48 = binary("mrand48", "25214903917 x + 11 mod 2^48, top 32 bits", POSIX, RAND48, {
  end: "top",
  count: 32,
});

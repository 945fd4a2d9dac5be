/**
 * Multiplicative congruential generators modulo the prime 2^31 - 1 found by exhaustive search: the five best of G. S.
 * Fishman and L. R. Moore, "An exhaustive analysis of multiplicative congruential random number generators with modulus
 * 2^31 - 1", SIAM Journal on Scientific and Statistical Computing 7 (1986) 24-45, and the two of P. L'Ecuyer, "Tables
 * of linear congruential generators of different sizes and good lattice structure", Mathematics of Computation 68
 * (1999) 249-260, table 2. Multipliers are from memory; that each is a primitive root is tested. Good for: the best
 * that 31 bits can do. Bad at: a period of 2^31 - 2 is used up in seconds.
 */
import { congruential } from "./congruential.js";
import { pseudoRandom, type PseudoRandomSource } from "./pseudo-random.js";

const MODULUS = (1n << 31n) - 1n;

const FISHMAN_MOORE =
  "G. S. Fishman, L. R. Moore, An exhaustive analysis of multiplicative congruential random number generators with modulus 2^31 - 1, SIAM Journal on Scientific and Statistical Computing 7 (1986) 24-45";
const LECUYER =
  "P. L'Ecuyer, Tables of linear congruential generators of different sizes and good lattice structure, Mathematics of Computation 68 (1999) 249-260";

function prime(multiplier: bigint, citation: string): PseudoRandomSource {
  const about = {
    id: `lcg-${multiplier}`,
    title: `${multiplier} x mod 2^31 - 1`,
    citation,
    method: "congruential",
    outputBits: 31,
    period: MODULUS - 1n,
    knownStructure: "tuples lie on a lattice of 2^31 - 1 points; short period",
  };
  return pseudoRandom(congruential(about, { multiplier, increment: 0n, modulus: MODULUS }));
}

export const lcg742938285 = prime(742938285n, FISHMAN_MOORE);
export const lcg950706376 = prime(950706376n, FISHMAN_MOORE);
export const lcg1226874159 = prime(1226874159n, FISHMAN_MOORE);
export const lcg62089911 = prime(62089911n, FISHMAN_MOORE);
export const lcg1343714438 = prime(1343714438n, FISHMAN_MOORE);
export const lcg1583458089 = prime(1583458089n, LECUYER);
export const lcg784588716 = prime(784588716n, LECUYER);

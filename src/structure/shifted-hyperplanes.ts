/**
 * How many hyperplanes h.u = whole number + c meet the half-open cube [0, 1)^t for the shifted lattices of a multiplicative
 * generator modulo 2^e. Tuples s (v_1, v_2, ...) / 2^e of an odd state s, h in the dual of a smaller modulus, have c = s
 * (h.v) / 2^e mod 1, which is 0 for one odd s as for all. h.u takes values above -N and below P, P and N the sums of
 * positive and of negative entries (from 0, or to 0, where there are none): P + N planes if c is not 0, else P + N - 1 if h
 * has both signs, or P + N.
 */
import { absoluteSum, isMixed } from "../numeric/lattice-enumeration.js";
import type { TupleLattice } from "./congruential-lattices.js";
import type { Tuples } from "./tuples.js";

/** `tuples` are those of the full modulus; several copies of the lattice may differ in c, so there are up to that many. */
export function shiftedHyperplanes(h: readonly bigint[], { copies }: TupleLattice, tuples: Tuples): bigint {
  const sum = h.reduce((total, entry, j) => total + entry * (tuples.vector(j)[0] ?? 0n), 0n);
  const length = absoluteSum(h);
  if (sum % tuples.modulus === 0n) return isMixed(h) ? length - 1n : length;
  return length * BigInt(copies);
}

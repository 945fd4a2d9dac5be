/**
 * Outputs of a source as linear functions of a few residues: output i is (v_i . s) mod m over m, s the state in k words.
 * Tuples of outputs then lie on a lattice, and its dual is the lattice of integer relations between the v_i modulo m
 * (numeric/kernel-lattice).
 */
import { powerMod } from "../numeric/factor.js";
import { polynomialPower } from "../numeric/polynomial-power.js";
import type { LinearRecurrence } from "../sources/linear.js";

export interface Tuples {
  readonly modulus: bigint;
  /** k. */
  readonly residues: number;
  /** v_i; i from 0, as far as `size` goes. */
  vector(index: number): readonly bigint[];
  /** How many outputs there are; null where there is no end. */
  readonly size: number | null;
}

/** Every `stride`-th output of a recurrence: v_i is x^(i stride) modulo the characteristic polynomial. */
export function recurrenceTuples(
  recurrence: Pick<LinearRecurrence, "multipliers" | "modulus">,
  stride = 1,
): Tuples {
  const { multipliers, modulus } = recurrence;
  const [a = 0n] = multipliers;
  const vector =
    multipliers.length === 1
      ? (index: number) => [powerMod(a, BigInt(index) * BigInt(stride), modulus)]
      : (index: number) => polynomialPower(multipliers, BigInt(index) * BigInt(stride), modulus);
  return { modulus, residues: multipliers.length, vector, size: null };
}

/** The rank-1 lattice {k z / n}. */
export function rankOneTuples(n: bigint, z: readonly bigint[]): Tuples {
  return { modulus: n, residues: 1, vector: (index) => [z[index] ?? 0n], size: z.length };
}

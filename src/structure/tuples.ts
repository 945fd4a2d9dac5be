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

/** Every `stride`-th output of a recurrence, output i its term n(i): v_i is x^(n(i)) modulo the characteristic polynomial. */
export function recurrenceTuples(
  recurrence: Pick<LinearRecurrence, "multipliers" | "modulus" | "luxury">,
  stride = 1,
): Tuples {
  const { multipliers, modulus, luxury = { kept: 1, block: 1 } } = recurrence;
  const term = (index: number): bigint => {
    const output = BigInt(index) * BigInt(stride);
    const kept = BigInt(luxury.kept);
    return (output / kept) * BigInt(luxury.block) + (output % kept);
  };
  const [a = 0n] = multipliers;
  const vector =
    multipliers.length === 1
      ? (index: number) => [powerMod(a, term(index), modulus)]
      : (index: number) => polynomialPower(multipliers, term(index), modulus);
  return { modulus, residues: multipliers.length, vector, size: null };
}

/** The rank-1 lattice {k z / n}. */
export function rankOneTuples(n: bigint, z: readonly bigint[]): Tuples {
  return { modulus: n, residues: 1, vector: (index) => [z[index] ?? 0n], size: z.length };
}

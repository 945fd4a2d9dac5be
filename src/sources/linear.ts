/**
 * Linear recurrences x(n) = a1 x(n-1) + ... + ak x(n-k) + c mod m as what the lattice structure of a generator follows
 * from, and combinations of them: the sum of fractions x/m1 + y/m2 + ... mod 1 is w / (m1 m2 ...) with w from one recurrence
 * whose multipliers are those of the components by the Chinese remainder theorem (P. L'Ecuyer and S. Tezuka, "Structural
 * properties for two classes of combined random number generators", Mathematics of Computation 57 (1991) 735-746).
 */
import { inverseMod } from "../numeric/factor.js";

export interface LinearRecurrence {
  /** a1 ... ak, each from 0 to m - 1. */
  readonly multipliers: readonly bigint[];
  readonly increment: bigint;
  readonly modulus: bigint;
  /** What outputs are beside x / m, in a few words; null where they are just that (or the middle of its cell). */
  readonly note: string | null;
  /** Where some of every `block` terms are dropped: the first `kept` are outputs. Absent where every term is one. */
  readonly luxury?: { readonly kept: number; readonly block: number };
  /** Words of state, which fill a cube of this dimension evenly, where they are more than the multipliers. */
  readonly words?: number;
  /** Terms that a short relation ties together, 0-based, where the multipliers do not show them. */
  readonly lags?: readonly number[];
}

/** The recurrence of the sum of fractions of components without increment, whose moduli are coprime in pairs. */
export function combined(
  components: readonly Pick<LinearRecurrence, "multipliers" | "modulus">[],
  note: string | null,
): LinearRecurrence {
  const modulus = components.reduce((product, component) => product * component.modulus, 1n);
  const order = Math.max(...components.map(({ multipliers }) => multipliers.length));
  const multipliers = Array.from({ length: order }, (_, k) => {
    const sum = components.reduce((total, { multipliers, modulus: m }) => {
      const rest = modulus / m;
      return total + (multipliers[k] ?? 0n) * rest * inverseMod(rest % m, m);
    }, 0n);
    return sum % modulus;
  });
  return { multipliers, increment: 0n, modulus, note };
}

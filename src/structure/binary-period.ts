/**
 * The period of a linear map over GF(2) on k bits of state: 2^k - 1, the longest possible, if its characteristic polynomial is
 * primitive, that is if x has this order modulo the polynomial (Knuth, The Art of Computer Programming, vol. 2, 3rd ed. (1997),
 * 3.2.2). The polynomial comes from 2 k outputs by Berlekamp and Massey's method.
 */
import { factorise } from "../numeric/factor.js";
import { berlekampMassey, powerOfX } from "../numeric/gf2-polynomial.js";
import type { Reason } from "./period.js";

export interface BinaryPeriod {
  /** Null where the polynomial is not primitive. */
  readonly period: bigint | null;
  readonly reasons: readonly Reason[];
}

/** `words` are 2 k successive linear words at least; throws UnfinishedFactorisation after `steps` of the rho method. */
export function binaryPeriod(words: readonly bigint[], stateBits: number, steps: number): BinaryPeriod {
  const polynomial = berlekampMassey(words.slice(0, 2 * stateBits).map((word) => (word & 1n ? 1 : 0)));
  const whole = polynomial >> BigInt(stateBits) === 1n;
  const reasons: Reason[] = [
    { condition: `one recurrence of ${stateBits} terms goes through all bits of the state`, holds: whole },
  ];
  if (!whole) return { period: null, reasons };
  const longest = (1n << BigInt(stateBits)) - 1n;
  reasons.push({
    condition: `x^(2^${stateBits} − 1) is 1 modulo the characteristic polynomial`,
    holds: powerOfX(longest, polynomial) === 1n,
  });
  const early = [...factorise(longest, steps).keys()].filter((q) => powerOfX(longest / q, polynomial) === 1n);
  reasons.push({
    condition: `x^((2^${stateBits} − 1)/q) is not 1 for any prime factor q${early.length > 0 ? ` (it is for ${early.join(", ")})` : ""}`,
    holds: early.length === 0,
  });
  return { period: reasons.every(({ holds }) => holds) ? longest : null, reasons };
}

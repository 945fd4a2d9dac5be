/** Exact periods of x <- (a x + c) mod m. */
import type { Affine } from "./affine.js";
import { coprime, factorise, multiplicativeOrder } from "./factor.js";

/**
 * The period that all valid states share, or null where they do not share one.
 *
 * With an increment: m, if c is coprime to m, every prime of m divides a - 1, and 4 does where it divides m
 * (T. E. Hull and A. R. Dobell, "Random number generators", SIAM Review 4 (1962) 230-254). Without one: the order of a
 * modulo m, for every state coprime to m.
 */
export function congruentialPeriod({ multiplier, increment, modulus }: Affine): bigint | null {
  if (increment === 0n) return multiplicativeOrder(multiplier, modulus);
  const below = multiplier - 1n;
  const primes = [...factorise(modulus).keys()];
  const full =
    coprime(increment, modulus) &&
    primes.every((p) => below % p === 0n) &&
    (modulus % 4n !== 0n || below % 4n === 0n);
  return full ? modulus : null;
}

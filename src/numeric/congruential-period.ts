/** Exact periods of x <- (a x + c) mod m. */
import { affinePower, applyAffine, type Affine } from "./affine.js";
import { coprime, factorise, gcd, multiplicativeOrder } from "./factor.js";

/** The three conditions of T. E. Hull and A. R. Dobell, "Random number generators", SIAM Review 4 (1962) 230-254. */
export interface HullDobell {
  readonly incrementCoprime: boolean;
  readonly primesDivide: boolean;
  readonly fourDivides: boolean;
}

export function hullDobell({ multiplier, increment, modulus }: Affine, steps = Infinity): HullDobell {
  const below = multiplier - 1n;
  return {
    incrementCoprime: coprime(increment, modulus),
    primesDivide: [...factorise(modulus, steps).keys()].every((p) => below % p === 0n),
    fourDivides: modulus % 4n !== 0n || below % 4n === 0n,
  };
}

/**
 * The period that all valid states share, or null where they do not share one.
 *
 * With an increment: m, if the conditions of Hull and Dobell hold. Without one: the order of a modulo m, for every state
 * coprime to m. Throws UnfinishedFactorisation where a factorisation takes more than `steps` steps.
 */
export function congruentialPeriod(map: Affine, steps = Infinity): bigint | null {
  const { multiplier, increment, modulus } = map;
  if (increment === 0n) return multiplicativeOrder(multiplier, modulus, steps);
  const { incrementCoprime, primesDivide, fourDivides } = hullDobell(map, steps);
  return incrementCoprime && primesDivide && fourDivides ? modulus : null;
}

export interface Cycle {
  /** Steps before the state is on its cycle. */
  readonly preperiod: bigint;
  readonly period: bigint;
}

/**
 * The cycle that a state runs into, for any map. Let m = m1 m2, every prime of m1 dividing a and m2 coprime to a. Modulo m1
 * the map runs into a fixed point within log2(m) steps. Modulo m2 it is a permutation: a^k = 1 for k the order of a, so k
 * steps add some d, and k m2 / gcd(d, m2) steps do nothing; primes are taken out of that number while the state stays.
 * Throws UnfinishedFactorisation where a factorisation takes more than `steps` steps.
 */
export function congruentialCycle(map: Affine, state: bigint, steps = Infinity): Cycle {
  const [falling, lasting] = split(map);
  let preperiod = 0n;
  let x = state % falling.modulus;
  for (let next = applyAffine(falling, x); next !== x; next = applyAffine(falling, x)) {
    x = next;
    preperiod++;
  }
  const { multiplier, modulus } = lasting;
  const order = multiplicativeOrder(multiplier % modulus, modulus, steps) ?? 1n;
  const { increment: added } = affinePower(lasting, order);
  const start = state % modulus;
  const turns = modulus / gcd(added, modulus);
  let period = order * turns;
  const primes = new Set([...factorise(order, steps).keys(), ...factorise(turns, steps).keys()]);
  for (const p of primes) {
    while (period % p === 0n && applyAffine(affinePower(lasting, period / p), start) === start) period /= p;
  }
  return { preperiod, period };
}

/** The map modulo m1 and modulo m2. */
function split({ multiplier, increment, modulus }: Affine): [Affine, Affine] {
  let [falling, lasting] = [1n, modulus];
  for (let common = gcd(multiplier, lasting); common > 1n; common = gcd(multiplier, lasting)) {
    falling *= common;
    lasting /= common;
  }
  const reduced = (m: bigint): Affine => ({
    multiplier: multiplier % m,
    increment: increment % m,
    modulus: m,
  });
  return [reduced(falling), reduced(lasting)];
}

/**
 * The period of x(n) = a1 x(n-1) + ... + ak x(n-k) modulo primes, or modulo a product of different primes as combined
 * generators have it. Modulo a prime p it is p^k - 1, the longest possible, if the characteristic polynomial f is primitive; with
 * r = (p^k - 1) / (p - 1) and c = (-1)^(k-1) ak that is: c is a primitive root, x^r = c modulo f, and x^(r/q) is no constant modulo f for
 * any prime factor q of r (Knuth, The Art of Computer Programming, vol. 2, 3rd ed. (1997), 3.2.2; J. D. Alanen and
 * D. E. Knuth, "Tables of finite fields", Sankhya A 26 (1964) 305-328). Together: the least common multiple.
 */
import { factorise, gcd, isPrime, powerMod } from "../numeric/factor.js";
import { polynomialPower } from "../numeric/polynomial-power.js";
import type { LinearRecurrence } from "../sources/linear.js";
import type { Reason } from "./period.js";

export interface RecurrencePeriod {
  /** Null where a component is not of full period or the modulus has a repeated factor. */
  readonly period: bigint | null;
  readonly reasons: readonly Reason[];
}

/** For a recurrence without increment. Throws UnfinishedFactorisation after `steps` of the rho method. */
export function recurrencePeriod(
  { multipliers, modulus }: Pick<LinearRecurrence, "multipliers" | "modulus">,
  steps: number,
): RecurrencePeriod {
  const primes = factorise(modulus, steps);
  const repeated = [...primes].find(([, exponent]) => exponent > 1);
  if (repeated !== undefined) {
    const condition = `the modulus is a product of different primes (${repeated[0]} comes ${repeated[1]} times)`;
    return { period: null, reasons: [{ condition, holds: false }] };
  }
  const several = primes.size > 1;
  const reasons: Reason[] = [];
  let period = 1n;
  for (const p of primes.keys()) {
    const reduced = multipliers.map((a) => a % p);
    const component = reduced.slice(0, reduced.findLastIndex((a) => a !== 0n) + 1);
    const found = component.length === 0 ? [] : primitiveReasons(component, p, steps);
    reasons.push(
      ...found.map(({ condition, holds }) => ({
        condition: several ? `modulo ${p}: ${condition}` : condition,
        holds,
      })),
    );
    const longest = p ** BigInt(component.length) - 1n;
    period = (period / gcd(period, longest)) * longest;
  }
  if (several) {
    reasons.push({
      condition: "together: the least common multiple of the components' periods",
      holds: true,
    });
  }
  return { period: reasons.every(({ holds }) => holds) ? period : null, reasons };
}

function primitiveReasons(multipliers: readonly bigint[], p: bigint, steps: number): Reason[] {
  const k = multipliers.length;
  const last = multipliers[k - 1] ?? 0n;
  const c = k % 2 === 1 ? last : p - last;
  const root = [...factorise(p - 1n, steps).keys()].every((q) => powerMod(c, (p - 1n) / q, p) !== 1n);
  const rootCondition =
    k === 1
      ? `the multiplier is a primitive root modulo ${p}`
      : `(−1)^(k−1) a_k is a primitive root modulo ${p}`;
  const reasons: Reason[] = [{ condition: rootCondition, holds: root || p === 2n }];
  if (k === 1) return reasons;
  const r = (p ** BigInt(k) - 1n) / (p - 1n);
  const power = polynomialPower(multipliers, r, p);
  reasons.push({
    condition: "x^r is that constant modulo the characteristic polynomial, r = (p^k − 1)/(p − 1)",
    holds: isConstant(power) && power[0] === c,
  });
  const stays = primesOfQuotient(p, k, steps).filter((q) =>
    isConstant(polynomialPower(multipliers, r / q, p)),
  );
  reasons.push({
    condition: `x^(r/q) is no constant for any prime factor q of r${stays.length > 0 ? ` (it is for ${stays.join(", ")})` : ""}`,
    holds: stays.length === 0,
  });
  return reasons;
}

function isConstant(polynomial: readonly bigint[]): boolean {
  return polynomial.slice(1).every((coefficient) => coefficient === 0n);
}

/** Prime factors of (p^k - 1) / (p - 1), which is the product of the cyclotomic values Phi_d(p) for d > 1 that divide k. */
function primesOfQuotient(p: bigint, k: number, steps: number): bigint[] {
  const values = new Map<number, bigint>();
  const primes = new Set<bigint>();
  for (let d = 1; d <= k; d++) {
    if (k % d !== 0) continue;
    let value = p ** BigInt(d) - 1n;
    for (const [e, earlier] of values) if (d % e === 0) value /= earlier;
    values.set(d, value);
    if (d === 1) continue;
    for (const q of isPrime(value) ? [value] : factorise(value, steps).keys()) primes.add(q);
  }
  return [...primes];
}

/** Periods of recurrences against running them. */
import { describe, expect, test } from "vitest";
import { recurrencePeriod } from "../../src/structure/recurrence-period.js";

/** How often (0, ..., 0, 1) steps until it comes again; 0 where it does not within the number of states. */
function run(multipliers: readonly number[], modulus: number): number {
  const start = [...multipliers.slice(1).fill(0), 1];
  let words = start;
  for (let steps = 1; steps <= modulus ** multipliers.length; steps++) {
    const next = multipliers.reduce((sum, a, k) => sum + a * (words.at(-1 - k) ?? 0), 0) % modulus;
    words = [...words.slice(1), next];
    if (words.every((word, k) => word === start[k])) return steps;
  }
  return 0;
}

describe("recurrences modulo a prime", () => {
  test.each([
    [2, 2],
    [2, 4],
    [3, 2],
    [3, 3],
    [5, 2],
    [7, 2],
    [11, 2],
  ])("p = %d, order %d: all multipliers", (p, order) => {
    let full = 0;
    for (let code = 0; code < p ** order; code++) {
      const multipliers = Array.from({ length: order }, (_, k) => Math.floor(code / p ** k) % p);
      if (multipliers.at(-1) === 0) continue;
      const longest = p ** order - 1;
      const { period } = recurrencePeriod({ multipliers: multipliers.map(BigInt), modulus: BigInt(p) }, 1e6);
      const expected = run(multipliers, p) === longest ? BigInt(longest) : null;
      expect([multipliers, period]).toEqual([multipliers, expected]);
      if (expected !== null) full++;
    }
    // phi(p^k - 1) / k primitive polynomials
    expect(full * order).toBe(totient(p ** order - 1));
  });

  test("two primes: the least common multiple", () => {
    // x <- 3 x mod 7 of period 6, x <- 2 x mod 11 of period 10
    const multiplier = [...Array(77).keys()].find((a) => a % 7 === 3 && a % 11 === 2) ?? 0;
    const { period } = recurrencePeriod({ multipliers: [BigInt(multiplier)], modulus: 77n }, 1e6);
    expect(period).toBe(30n);
  });

  test("a square in the modulus is said", () => {
    const { period, reasons } = recurrencePeriod({ multipliers: [1n, 1n], modulus: 9n }, 1e6);
    expect(period).toBeNull();
    expect(reasons).toEqual([
      { condition: "the modulus is a product of different primes (3 comes 2 times)", holds: false },
    ]);
  });
});

function totient(n: number): number {
  let count = 0;
  for (let k = 1; k <= n; k++) if (gcd(k, n) === 1) count++;
  return count;
}

function gcd(a: number, b: number): number {
  return b === 0 ? a : gcd(b, a % b);
}

import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { congruentialPeriod } from "../../src/numeric/congruential-period.js";
import { factorise, isPrime, multiplicativeOrder } from "../../src/numeric/factor.js";

describe("primes and factors", () => {
  test("the primes below 100, and Carmichael numbers are composite (Hardy and Wright)", () => {
    const primes = Array.from({ length: 100 }, (_, n) => n).filter((n) => isPrime(BigInt(n)));
    expect(primes.join(" ")).toBe("2 3 5 7 11 13 17 19 23 29 31 37 41 43 47 53 59 61 67 71 73 79 83 89 97");
    for (const n of [561n, 1105n, 1729n, 825265n, 3215031751n]) expect(isPrime(n)).toBe(false);
  });

  test("2^31 - 1, 2^61 - 1 and 2^64 - 59 are prime, 2^59 - 1 and 2^64 - 1 are not", () => {
    for (const n of [(1n << 31n) - 1n, (1n << 61n) - 1n, (1n << 64n) - 59n]) expect(isPrime(n)).toBe(true);
    // Mersenne numbers: M59 = 179951 x 3203431780337 (F. Landry 1867)
    expect([...factorise((1n << 59n) - 1n).keys()]).toEqual([179951n, 3203431780337n]);
    // Fermat numbers: 2^64 - 1 is their product up to F5 = 641 x 6700417 (Euler 1732)
    expect([...factorise((1n << 64n) - 1n).keys()].sort((a, b) => (a < b ? -1 : 1))).toEqual([
      3n,
      5n,
      17n,
      257n,
      641n,
      65537n,
      6700417n,
    ]);
  });

  test("two primes of 32 bits are found again", () => {
    expect([...factorise(4294967291n * 4294967279n).keys()].sort()).toEqual([4294967279n, 4294967291n]);
    expect([...factorise(4294967291n * 4294967291n)]).toEqual([[4294967291n, 2]]);
  });

  test("the factors of any number multiply back to it and are prime", () => {
    fc.assert(
      fc.property(fc.bigInt(1n, (1n << 64n) - 1n), (n) => {
        const factors = [...factorise(n)];
        expect(factors.every(([p]) => isPrime(p))).toBe(true);
        expect(factors.reduce((product, [p, k]) => product * p ** BigInt(k), 1n)).toBe(n);
      }),
      { numRuns: 60, seed: 1 },
    );
  });
});

describe("orders and periods", () => {
  test("the order equals the length of the cycle, counted", () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 3000 }), fc.integer({ min: 1, max: 3000 }), (m, a) => {
        let x = a % m;
        let steps = 1;
        for (; x !== 1 % m && steps <= m; steps++) x = (x * a) % m;
        expect(multiplicativeOrder(BigInt(a), BigInt(m))).toBe(steps <= m ? BigInt(steps) : null);
      }),
      { numRuns: 200, seed: 2 },
    );
  });

  test("full period exactly where counting finds it", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 400 }),
        fc.nat(400),
        fc.integer({ min: 1, max: 400 }),
        (modulus, a, c) => {
          const [multiplier, increment] = [a % modulus, c % modulus];
          if (increment === 0) return;
          let x = 0;
          const seen = new Set<number>();
          for (; !seen.has(x); x = (multiplier * x + increment) % modulus) seen.add(x);
          const map = {
            multiplier: BigInt(multiplier),
            increment: BigInt(increment),
            modulus: BigInt(modulus),
          };
          expect(congruentialPeriod(map)).toBe(seen.size === modulus && x === 0 ? BigInt(modulus) : null);
        },
      ),
      { numRuns: 400, seed: 3 },
    );
  });
});

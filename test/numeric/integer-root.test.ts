import fc from "fast-check";
import { expect, test } from "vitest";
import { integerRoot, logOf } from "../../src/numeric/integer-root.js";

test("the integer root is the last whole number whose power does not pass", () => {
  fc.assert(
    fc.property(fc.bigInt({ min: 0n, max: 2n ** 300n }), fc.integer({ min: 1, max: 48 }), (n, k) => {
      const root = integerRoot(n, k);
      expect(root ** BigInt(k) <= n && n < (root + 1n) ** BigInt(k)).toBe(true);
    }),
    { seed: 4004, numRuns: 500 },
  );
});

test("logarithms of whole numbers against Math.log where it can, and of powers of two", () => {
  fc.assert(
    fc.property(fc.bigInt({ min: 2n, max: 2n ** 1000n }), (n) => {
      expect(Math.abs(logOf(n) / Math.log(Number(n)) - 1)).toBeLessThan(1e-15);
    }),
    { seed: 4005 },
  );
  expect(logOf(2n ** 5000n)).toBeCloseTo(5000 * Math.LN2, 10);
});

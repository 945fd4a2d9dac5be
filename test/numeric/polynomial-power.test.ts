import fc from "fast-check";
import { expect, test } from "vitest";
import { polynomialPower } from "../../src/numeric/polynomial-power.js";

test("powers say what an output is made of, as running the recurrence does", () => {
  const residue = fc.bigInt({ min: 0n, max: 2n ** 70n });
  fc.assert(
    fc.property(
      fc.bigInt({ min: 2n, max: 2n ** 70n }),
      fc.array(fc.tuple(residue, residue), { minLength: 1, maxLength: 6 }),
      fc.integer({ min: 0, max: 40 }),
      (m, pairs, n) => {
        const multipliers = pairs.map(([a]) => a % m);
        const outputs = pairs.map(([, x]) => x % m);
        while (outputs.length <= n) {
          const last = outputs.toReversed();
          outputs.push(multipliers.reduce((sum, a, k) => sum + a * (last[k] ?? 0n), 0n) % m);
        }
        const made = polynomialPower(multipliers, BigInt(n), m);
        expect(made.reduce((sum, r, j) => sum + r * (outputs[j] ?? 0n), 0n) % m).toBe(outputs[n]);
      },
    ),
    { seed: 4006, numRuns: 200 },
  );
});

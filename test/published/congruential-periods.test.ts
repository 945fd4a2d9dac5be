/** Exact periods of congruential generators in use or in print; where the values come from stands in the data file. */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { congruentialPeriod } from "../../src/numeric/congruential-period.js";
import { isPseudoRandom } from "../../src/sources/pseudo-random.js";
import { findSource, sourceIds } from "../../src/sources/registry.js";

interface Row {
  readonly id: string;
  readonly a: string;
  readonly c: string;
  readonly m: string;
  readonly period: string | null;
}

const { rows } = JSON.parse(
  readFileSync(new URL("./data/congruential-periods.json", import.meta.url), "utf8"),
) as unknown as { rows: readonly Row[] };

describe("periods of congruential generators", () => {
  for (const { id, a, c, m, period } of rows) {
    test(`${id}: ${a} x + ${c} mod ${m}`, () => {
      const map = { multiplier: BigInt(a), increment: BigInt(c), modulus: BigInt(m) };
      expect(congruentialPeriod(map)).toBe(period === null ? null : BigInt(period));
    });
  }

  test("every congruential source of the registry states the period that its numbers have", () => {
    const congruential = sourceIds()
      .map(findSource)
      .filter(isPseudoRandom)
      .filter(({ method }) => method === "congruential");
    expect(congruential.length).toBeGreaterThan(10);
    for (const { id, recurrence, period } of congruential) {
      const [multiplier = 0n, increment = 0n] = recurrence.constants ?? [];
      const { modulus } = recurrence.output;
      expect([id, congruentialPeriod({ multiplier, increment, modulus })]).toEqual([id, period]);
    }
  });
});

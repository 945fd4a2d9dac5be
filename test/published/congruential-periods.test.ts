/** Exact periods of congruential generators in use or in print; where the values come from stands in the data file. */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { congruentialPeriod } from "../../src/numeric/congruential-period.js";
import { findSource } from "../../src/sources/registry.js";

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

  test.each(["randu", "minstd-16807"])("%s states its period", (id) => {
    const row = rows.find((candidate) => candidate.id === id);
    expect(findSource(id)?.period?.toString()).toBe(row?.period);
  });
});

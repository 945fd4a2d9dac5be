/**
 * Periods and their reasons against PARI/GP 2.15.2 and small generators run to their end (data/period-reasons.json), and
 * periods in print: P. L'Ecuyer, Communications of the ACM 31 (1988) 742-749 and Operations Research 47 (1999) 159-164; P. L'Ecuyer,
 * F. Blouin and R. Couture, ACM Transactions on Modeling and Computer Simulation 3 (1993) 87-98.
 */
import { describe, expect, test } from "vitest";
import { hullDobell } from "../../src/numeric/congruential-period.js";
import { factorise, powerMod } from "../../src/numeric/factor.js";
import { isPseudoRandom } from "../../src/sources/pseudo-random.js";
import { findSource } from "../../src/sources/registry.js";
import { periodOf } from "../../src/structure/period.js";
import { recurrencePeriod } from "../../src/structure/recurrence-period.js";
import { dualLattices, periods } from "./lattice-data.js";

const STEPS = 2 ** 22;

describe("congruential generators, PARI/GP", () => {
  for (const row of periods.rows) {
    test(`${row.id}: ${row.a} x + ${row.c} mod ${row.m}`, () => {
      const map = { multiplier: BigInt(row.a), increment: BigInt(row.c), modulus: BigInt(row.m) };
      expect([...factorise(map.modulus)].map(([p, k]) => [String(p), k])).toEqual(row.m_factors);
      const conditions = hullDobell(map);
      expect(conditions).toEqual({
        incrementCoprime: row.hull_dobell.c_coprime_m,
        primesDivide: row.hull_dobell.a_minus_1_divisible_by_every_prime_of_m,
        fourDivides: row.hull_dobell.a_minus_1_divisible_by_4_if_m_is,
      });
      expect(Object.values(conditions).every(Boolean)).toBe(row.hull_dobell.full_period_m);
      const found = periodOf(map, row.preperiod_from_seed_0 === undefined ? null : 0n, STEPS);
      if (row.preperiod_from_seed_0 !== undefined) {
        expect(found.from).toEqual({
          state: 0n,
          preperiod: BigInt(row.preperiod_from_seed_0),
          period: BigInt(row.period ?? 0),
        });
      } else if (row.period !== undefined) expect(found.period).toBe(BigInt(row.period));
      else expect(found.period).toBeNull();
      if (row.order_of_a !== undefined) expect(found.period).toBe(BigInt(row.order_of_a));
      if (row.period_of_low_k_bits_k_1_to_e !== undefined) {
        const known = row.period_of_low_k_bits_k_1_to_e;
        known.forEach((period, k) => {
          if (period !== null) expect([k, String(found.lowBits?.[k])]).toEqual([k, period]);
        });
      }
      for (const [q, power] of row.primitive_root_check ?? []) {
        expect(powerMod(map.multiplier, (map.modulus - 1n) / BigInt(q), map.modulus)).toBe(BigInt(power));
        const reason = found.reasons.find(({ condition }) => condition.includes(`(m - 1)/${q})`));
        expect(reason?.holds).toBe(power !== "1");
      }
      if (row.primitive_root !== undefined) {
        expect(found.reasons.every(({ holds }) => holds)).toBe(row.primitive_root);
      }
    });
  }
});

describe("recursive and combined generators", () => {
  test.each([
    ["lecuyer1988", 2305842648436451838n],
    ["mrg32k3a", 3138500310241109354368945108483880589370355473753018713806n],
    ["wichmann-hill", 6953607871644n],
  ])("%s: %d", (id, period) => {
    const source = findSource(id);
    const linear = isPseudoRandom(source) ? source.recurrence.linear : undefined;
    expect(linear && recurrencePeriod(linear, STEPS).period).toBe(period);
  });

  test.each(["mrg32k3a-component1", "mrg32k3a-component2"])("%s is of full period", (id) => {
    const row = dualLattices.recursive.find((one) => one.id === id);
    const modulus = BigInt(row?.m ?? 0);
    const multipliers = (row?.coefficients ?? []).map((a) => (BigInt(a) + modulus) % modulus);
    const { period, reasons } = recurrencePeriod({ multipliers, modulus }, STEPS);
    expect(period).toBe(modulus ** 3n - 1n);
    expect(reasons.map(({ holds }) => holds)).toEqual([true, true, true]);
  });
});

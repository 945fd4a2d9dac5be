import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  allocate,
  equalAllocation,
  type AllocationChoice,
  type AllocationItem,
} from "../../src/findings/allocation.js";

function choice(
  constant: number,
  order: number,
  cost: number,
  changes: Partial<AllocationChoice> = {},
): AllocationChoice {
  const deviation = (n: number) => constant * n ** -order;
  return {
    source: "s",
    cost,
    order,
    constant,
    bias: 0,
    deviation,
    up: Math.ceil,
    known: Infinity,
    ...changes,
  };
}

const item = (problem: string, weight: number, ...choices: AllocationChoice[]): AllocationItem => ({
  problem,
  weight,
  choices,
});

const positive = fc.double({ min: 0.5, max: 20, noNaN: true });

describe("allocation for a tolerance", () => {
  it("is Cochran's formula for crude sampling (Sampling Techniques, 3rd ed., 1977, section 5.5)", () => {
    // Cochran: n_h in proportion to W_h S_h / sqrt(c_h), and sum n_h fixed by
    // V = sum W_h^2 S_h^2 / n_h; hence n_h = (W_h S_h / sqrt(c_h)) sum(W S sqrt(c)) / V.
    const rows = [
      { w: 3, sigma: 2, c: 1e-6 },
      { w: -1, sigma: 5, c: 4e-6 },
      { w: 10, sigma: 0.4, c: 9e-6 },
    ];
    const [tolerance, k] = [0.02, 2.5];
    const variance = (tolerance / k) ** 2;
    const lift =
      rows.reduce((sum, { w, sigma, c }) => sum + Math.abs(w) * sigma * Math.sqrt(c), 0) / variance;
    const items = rows.map(({ w, sigma, c }, i) => item(`p${i}`, w, choice(sigma, 0.5, c)));
    const found = allocate(items, { tolerance }, k);
    for (const [i, { w, sigma, c }] of rows.entries()) {
      expect((found?.rows[i]?.n ?? 0) / ((Math.abs(w) * sigma * lift) / Math.sqrt(c))).toBeCloseTo(1, 3);
    }
    expect(found?.total).toBeLessThanOrEqual(tolerance);
  });

  it("costs no more after any small change that keeps the variance (orders from 0.4 to 1.5)", () => {
    const made = fc.tuple(positive, positive, fc.double({ min: 0.4, max: 1.5, noNaN: true }), positive);
    fc.assert(
      fc.property(fc.array(made, { minLength: 2, maxLength: 5 }), (rows) => {
        const items = rows.map(([w, constant, p, c], i) =>
          item(`p${i}`, w, choice(constant, p, c, { up: (n) => Math.max(1e-9, n) })),
        );
        const found = allocate(items, { tolerance: 0.05 }, 3);
        if (found === null) throw new Error("no allocation");
        const n = found.rows.map((row) => row.n);
        fc.pre(n.every((size) => size > 1));
        const part = (i: number, size: number) => {
          const [w = 0, constant = 0, p = 0] = rows[i] ?? [];
          return (w * constant * size ** -p) ** 2;
        };
        // Move e of relative size into problem i, take the variance that this saves out of problem j.
        for (const e of [0.05, -0.05]) {
          const [i, j] = [0, 1];
          const [ni, nj] = [(n[i] ?? NaN) * (1 + e), n[j] ?? NaN];
          const target = part(j, nj) + part(i, n[i] ?? NaN) - part(i, ni);
          if (!(target > 0)) continue;
          const p = rows[j]?.[2] ?? NaN;
          const moved = nj * (part(j, nj) / target) ** (1 / (2 * p));
          const change = (ni - (n[i] ?? NaN)) * (rows[i]?.[3] ?? NaN) + (moved - nj) * (rows[j]?.[3] ?? NaN);
          expect(change).toBeGreaterThan(-1e-3 * found.seconds);
        }
      }),
      { seed: 5, numRuns: 60 },
    );
  });

  it("subtracts the weighted biases first, and gives up where they take the tolerance", () => {
    const biased = (bias: number) => [item("p", 2, choice(1, 0.5, 1, { bias }))];
    expect(allocate(biased(0.04), { tolerance: 0.1 }, 1)?.rows[0]?.n).toBeCloseTo((2 / 0.02) ** 2, -2);
    expect(allocate(biased(0.05), { tolerance: 0.1 }, 1)).toBeNull();
  });

  it("takes for each problem the source with the smaller cost", () => {
    const slow = choice(1, 0.5, 1e-8, { source: "plain" });
    const fast = choice(5, 1, 1e-6, { source: "net", up: (n) => 2 ** Math.ceil(Math.log2(n)) });
    const fine = allocate([item("p", 1, slow, fast)], { tolerance: 1e-4 }, 2);
    const coarse = allocate([item("p", 1, slow, fast)], { tolerance: 0.5 }, 2);
    expect([fine?.rows[0]?.source, coarse?.rows[0]?.source]).toEqual(["net", "plain"]);
    expect(Math.log2(fine?.rows[0]?.n ?? 0) % 1).toBe(0);
  });

  it("never costs more than equal sizes, which keep the same tolerance", () => {
    const items = [item("a", 100, choice(1, 0.5, 1e-6)), item("b", 1, choice(1, 0.5, 1e-6))];
    const found = allocate(items, { tolerance: 0.1 }, 2.6);
    const equal = found && equalAllocation(items, found, 0.1, 2.6);
    expect(equal?.total).toBeLessThanOrEqual(0.1);
    expect(equal?.rows[0]?.n).toBe(equal?.rows[1]?.n);
    // Closed form: (sum w s sqrt c)^2 against (sum w^2 s^2)(sum c) = 101^2 / (10001 x 2).
    expect((found?.seconds ?? 0) / (equal?.seconds ?? 1)).toBeCloseTo(101 ** 2 / 20_002, 2);
  });
});

describe("allocation for a time", () => {
  it("spends the time in Cochran's proportions (the same section, cost fixed)", () => {
    const items = [item("a", 4, choice(1, 0.5, 1e-6)), item("b", 1, choice(2, 0.5, 4e-6))];
    const found = allocate(items, { seconds: 10 }, 2);
    expect(found?.seconds).toBeLessThanOrEqual(10);
    expect(found?.seconds).toBeGreaterThan(9);
    // n_a : n_b = 4 x 1 / 1 : 1 x 2 / 2; the last seconds go in steps of a tenth.
    const ratio = (found?.rows[0]?.n ?? 0) / (found?.rows[1]?.n ?? 1);
    expect(ratio).toBeGreaterThan(3.6);
    expect(ratio).toBeLessThan(4.4);
  });

  it("is nothing where not even the smallest sizes are affordable", () => {
    const items = [item("a", 1, choice(1, 0.5, 1, { up: (n) => Math.max(256, Math.ceil(n)) }))];
    expect(allocate(items, { seconds: 10 }, 2)).toBeNull();
  });
});

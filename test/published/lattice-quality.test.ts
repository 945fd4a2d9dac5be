/**
 * P_2, P_4, P_6 and Zaremba's index of rank-1 lattices against data/qmc.json: mpmath to 25 digits, P_2 checked there by a sum
 * over the dual in two dimensions; indices of Fibonacci lattices by exhaustive search.
 */
import { describe, expect, it } from "vitest";
import { pAlpha, rankOne, zarembaIndex, zarembaPair } from "../../src/structure/lattice-quality.js";
import { reference } from "./qmc-data.js";

const { lattices, fibonacci_rho_check } = reference.rank1_lattices;

describe.each(lattices)("$id, qmc.json", ({ n, z, d, P2, P4, P6, zaremba_rho }) => {
  const lattice = rankOne(n, z);

  it("P_2, P_4 and P_6 to 12 digits", () => {
    const found = pAlpha(lattice).at(-1);
    expect((found?.P2 ?? NaN) / Number(P2)).toBeCloseTo(1, 12);
    expect((found?.P4 ?? NaN) / Number(P4)).toBeCloseTo(1, 12);
    expect((found?.P6 ?? NaN) / Number(P6)).toBeCloseTo(1, 12);
  });

  it("Zaremba's index, and a vector that has it", () => {
    const { rho, vector, complete } = zarembaIndex(lattice);
    expect([rho, complete]).toEqual([zaremba_rho, true]);
    expect(vector.reduce((product, h) => product * Math.max(1, Math.abs(h)), 1)).toBe(rho);
    expect(vector.reduce((sum, h, j) => sum + h * (z[j] ?? NaN), 0) % n).toBeCloseTo(0, 15);
    if (d === 2) expect(zarembaPair(n, z[0] ?? NaN, z[1] ?? NaN).rho).toBe(zaremba_rho);
  });
});

describe("Zaremba's index of Fibonacci lattices is the second last Fibonacci number (Zaremba 1966), qmc.json", () => {
  const fibonacci = [1, 1];
  while ((fibonacci.at(-1) ?? 0) < 1597) fibonacci.push((fibonacci.at(-1) ?? 0) + (fibonacci.at(-2) ?? 0));

  it.each(Object.entries(fibonacci_rho_check))("%s: %i", (id, rho) => {
    const n = Number(id.split("-")[1]);
    const z = fibonacci[fibonacci.indexOf(n) - 1] ?? NaN;
    expect(zarembaPair(n, 1, z).rho).toBe(rho);
    expect(zarembaIndex(rankOne(n, [1, z])).rho).toBe(rho);
  });
});

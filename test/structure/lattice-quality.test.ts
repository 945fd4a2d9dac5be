/** Zaremba's index and P_alpha against their definitions, for any lattice; limits and bad input. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  pAlpha,
  rankOne,
  worstLatticePairs,
  zarembaIndex,
  zarembaPair,
} from "../../src/structure/lattice-quality.js";

/** The least product over all vectors of components up to n in absolute value. */
function byTryingAll(n: number, z: readonly number[]): number {
  let least = Infinity;
  const visit = (j: number, sum: number, product: number, zero: boolean): void => {
    if (product >= least) return;
    if (j === z.length) {
      if (!zero && sum % n === 0) least = product;
      return;
    }
    for (let h = -n; h <= n; h++)
      visit(j + 1, sum + h * (z[j] ?? 0), product * Math.max(1, Math.abs(h)), zero && h === 0);
  };
  visit(0, 0, 1, true);
  return least;
}

const lattices = fc
  .record({ n: fc.integer({ min: 1, max: 40 }), d: fc.integer({ min: 1, max: 3 }) })
  .chain(({ n, d }) =>
    fc.record({ n: fc.constant(n), z: fc.array(fc.nat(n - 1), { minLength: d, maxLength: d }) }),
  );

describe("Zaremba's index", () => {
  it("is the least product over the dual, components with common factors and zeros too", () => {
    fc.assert(
      fc.property(lattices, ({ n, z }) => {
        const { rho, vector, complete } = zarembaIndex(rankOne(n, z));
        expect([rho, complete]).toEqual([byTryingAll(n, z), true]);
        expect(Math.abs(vector.reduce((sum, h, j) => sum + h * (z[j] ?? 0), 0) % n)).toBe(0);
        if (z.length === 2) expect(zarembaPair(n, z[0] ?? 0, z[1] ?? 0).rho).toBe(rho);
      }),
      { seed: 20260401, numRuns: 150 },
    );
  });

  it("is at most what was found where the steps run out", () => {
    const lattice = rankOne(4093, [1, 1516, 2083, 2085, 1024]);
    const exact = zarembaIndex(lattice);
    const cut = zarembaIndex(lattice, 5);
    expect(exact.complete).toBe(true);
    expect(cut.complete).toBe(false);
    expect(cut.rho).toBeGreaterThanOrEqual(exact.rho);
  });

  it("ranks pairs, two equal components first", () => {
    const worst = worstLatticePairs(rankOne(1024, [1, 115, 433, 115, 909]), 3);
    expect(worst[0]).toEqual({ indices: [1, 3], rho: 1, vector: [-1, 1] });
    expect(worst.map(({ rho }) => rho)).toEqual(worst.map(({ rho }) => rho).sort((a, b) => a - b));
  });
});

describe("P_alpha", () => {
  it("is the sum over projections of their own shares", () => {
    const [n, z] = [128, [1, 47, 33]] as const;
    const share = (indices: number[]): number =>
      pAlpha(
        rankOne(
          n,
          indices.map((j) => z[j] ?? 0),
        ),
        true,
      ).at(-1)?.P2 ?? NaN;
    const sum = [[0], [1], [2], [0, 1], [0, 2], [1, 2], [0, 1, 2]].map(share).reduce((a, b) => a + b, 0);
    expect((pAlpha(rankOne(n, z)).at(-1)?.P2 ?? NaN) / sum).toBeCloseTo(1, 12);
  });

  it("of one coordinate is 2 zeta(alpha) / n^alpha", () => {
    const [found] = pAlpha(rankOne(1000, [1]));
    const expected = [Math.PI ** 2 / 6, Math.PI ** 4 / 90, Math.PI ** 6 / 945];
    for (const [i, value] of [found?.P2, found?.P4, found?.P6].entries()) {
      expect((value ?? NaN) / ((2 * (expected[i] ?? NaN)) / 1000 ** (2 * i + 2))).toBeCloseTo(1, 12);
    }
  });
});

describe("bad input", () => {
  it.each([
    [0, [1], "n: expected a whole number from 1 to 2^26 for the quality of a lattice, found 0"],
    [2 ** 27, [1], "n: expected a whole number from 1 to 2^26 for the quality of a lattice, found 134217728"],
    [8, [1, 9], "vector[2]: expected a whole number from 0 to 7, found 9"],
    [8, [NaN], "vector[1]: expected a whole number from 0 to 7, found NaN"],
  ])("n = %j, z = %j", (n, z, message) => {
    expect(() => rankOne(n, z)).toThrow(new RangeError(message));
  });
});

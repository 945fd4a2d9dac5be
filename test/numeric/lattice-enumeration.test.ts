/** Shortest vectors against looking at all vectors of a box, and what a bound on steps does. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { KernelLattice } from "../../src/numeric/kernel-lattice.js";
import { absoluteSum, isMixed, shortestVectors } from "../../src/numeric/lattice-enumeration.js";
import { dot, ReducedBasis } from "../../src/numeric/lattice-reduction.js";

/** The lattice of h with sum h_j z_j = 0 mod m. */
function basisOf(m: bigint, z: readonly bigint[]): ReducedBasis {
  const lattice = new KernelLattice(m, 1);
  const basis = new ReducedBasis();
  for (const component of z) basis.append(lattice.append([component]));
  return basis;
}

/** All relations but 0 in the box |h_j| <= size, of h and -h one. */
function relations(m: number, z: readonly number[], size: number): bigint[][] {
  const found: bigint[][] = [];
  const side = 2 * size + 1;
  for (let code = 0; code < side ** z.length; code++) {
    const h = z.map((_, j) => (Math.floor(code / side ** j) % side) - size);
    const first = h.find((entry) => entry !== 0) ?? 0;
    const sum = h.reduce((total, entry, j) => total + entry * (z[j] ?? 0), 0);
    if (first > 0 && sum % m === 0) found.push(h.map(BigInt));
  }
  return found;
}

const lattices = fc
  .record({ m: fc.integer({ min: 2, max: 60 }), t: fc.integer({ min: 2, max: 4 }) })
  .chain(({ m, t }) =>
    fc.record({
      m: fc.constant(m),
      z: fc.array(fc.integer({ min: 0, max: m - 1 }), { minLength: t, maxLength: t }),
    }),
  )
  .filter(({ m, z }) => z.length < 4 || m < 12);

describe("shortest vectors of small lattices, all of them looked at", () => {
  test("squared length: every shortest vector is found", () => {
    fc.assert(
      fc.property(lattices, ({ m, z }) => {
        const all = relations(m, z, m);
        const least = all.reduce((best, h) => (dot(h, h) < best ? dot(h, h) : best), BigInt(m * m));
        const known = all.filter((h) => dot(h, h) === least).map((h) => h.join());
        const found = shortestVectors(basisOf(BigInt(m), z.map(BigInt)), "squared-length", 1e6);
        expect(found.complete).toBe(true);
        expect(found.norm).toBe(least);
        expect(found.vectors.map((h) => h.join()).sort()).toEqual(known.sort());
      }),
      { seed: 4002, numRuns: 150 },
    );
  });

  test("sum of absolute values: the least, and of both signs if one is", () => {
    fc.assert(
      fc.property(lattices, ({ m, z }) => {
        const all = relations(m, z, m);
        const least = all.reduce((best, h) => (absoluteSum(h) < best ? absoluteSum(h) : best), BigInt(m));
        const known = all.filter((h) => absoluteSum(h) === least);
        const { norm, vectors, complete } = shortestVectors(
          basisOf(BigInt(m), z.map(BigInt)),
          "absolute-sum",
          1e6,
        );
        expect(complete).toBe(true);
        expect(norm).toBe(least);
        expect(known.map((h) => h.join())).toContain(vectors[0]?.join());
        expect(isMixed(vectors[0] ?? [])).toBe(known.some(isMixed));
      }),
      { seed: 4003, numRuns: 150 },
    );
  });
});

test("where the bound on steps is reached, it says so", () => {
  const m = 2n ** 64n;
  const powers = [1n];
  while (powers.length < 20) powers.push(((powers.at(-1) ?? 0n) * 6364136223846793005n) % m);
  const basis = basisOf(m, powers);
  const short = shortestVectors(basis, "squared-length", 100);
  expect([short.complete, short.steps]).toEqual([false, 101]);
  const sparse = shortestVectors(basis, "absolute-sum", 100);
  expect(sparse.complete).toBe(false);
  // what is reported is a vector of the lattice all the same
  expect((sparse.vectors[0] ?? []).reduce((sum, h, j) => sum + h * (powers[j] ?? 0n), 0n) % m).toBe(0n);
});

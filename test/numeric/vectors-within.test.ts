import fc from "fast-check";
import { expect, test } from "vitest";
import { KernelLattice } from "../../src/numeric/kernel-lattice.js";
import { ReducedBasis } from "../../src/numeric/lattice-reduction.js";
import { vectorsWithin } from "../../src/numeric/vectors-within.js";

function basisOf(modulus: bigint, vectors: readonly bigint[]): ReducedBasis {
  const lattice = new KernelLattice(modulus, 1);
  const basis = new ReducedBasis();
  for (const v of vectors) basis.append(lattice.append([v]));
  return basis;
}

/** All h with |h|^2 <= squared in the dual, of h and -h one, by trying every one of them. */
function byTrial(modulus: number, v: readonly number[], squared: number): string[] {
  const reach = Math.floor(Math.sqrt(squared));
  let all: number[][] = [[]];
  for (let j = 0; j < v.length; j++) {
    all = all.flatMap((h) => Array.from({ length: 2 * reach + 1 }, (_, k) => [...h, k - reach]));
  }
  return all
    .filter((h) => h.reduce((sum, entry) => sum + entry * entry, 0) <= squared)
    .filter((h) => h.reduce((sum, entry, j) => sum + entry * (v[j] ?? 0), 0) % modulus === 0)
    .filter((h) => (h.find((entry) => entry !== 0) ?? 0) > 0)
    .map((h) => h.join())
    .sort();
}

function firstPositive(h: readonly number[]): string {
  const sign = Math.sign(h.find((entry) => entry !== 0) ?? 1);
  return h.map((entry) => (entry === 0 ? 0 : sign * entry)).join();
}

test("all vectors up to a length are found, each once", () => {
  const lattice = fc.record({
    modulus: fc.integer({ min: 2, max: 300 }),
    v: fc.array(fc.integer({ min: 0, max: 299 }), { minLength: 2, maxLength: 3 }),
    squared: fc.integer({ min: 1, max: 90 }),
  });
  fc.assert(
    fc.property(lattice, ({ modulus, v, squared }) => {
      const found = vectorsWithin(basisOf(BigInt(modulus), v.map(BigInt)), squared, 1e6);
      expect(found?.map(firstPositive).sort()).toEqual(byTrial(modulus, v, squared));
    }),
    { numRuns: 60 },
  );
});

test("more vectors than are wanted are not listed", () => {
  const basis = basisOf(2n, [1n, 1n]);
  expect(vectorsWithin(basis, 100, 10)).toBeNull();
  expect(vectorsWithin(basis, 2, 10)).toHaveLength(2);
});

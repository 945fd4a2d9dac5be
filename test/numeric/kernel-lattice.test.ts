/** Relations modulo m against counting all of them. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { KernelLattice } from "../../src/numeric/kernel-lattice.js";

/** All h in {0 ... m - 1}^t with sum h_j v_j = 0 mod m. */
function countRelations(m: number, vectors: readonly (readonly number[])[]): number {
  const t = vectors.length;
  let count = 0;
  for (let code = 0; code < m ** t; code++) {
    const h = vectors.map((_, j) => Math.floor(code / m ** j) % m);
    const sums = (vectors[0] ?? []).map((_, r) =>
      h.reduce((sum, x, j) => sum + x * (vectors[j]?.[r] ?? 0), 0),
    );
    if (sums.every((sum) => sum % m === 0)) count++;
  }
  return count;
}

const systems = fc
  .record({ m: fc.integer({ min: 1, max: 12 }), k: fc.integer({ min: 1, max: 3 }) })
  .chain(({ m, k }) =>
    fc.record({
      m: fc.constant(m),
      k: fc.constant(k),
      vectors: fc.array(fc.array(fc.integer({ min: 0, max: 11 }), { minLength: k, maxLength: k }), {
        minLength: 1,
        maxLength: 4,
      }),
    }),
  );

describe("relations between vectors of residues", () => {
  test("rows are relations, and their determinant leaves room for all there are", () => {
    fc.assert(
      fc.property(systems, ({ m, k, vectors }) => {
        const lattice = new KernelLattice(BigInt(m), k);
        const rows = vectors.map((vector) => lattice.append(vector.map(BigInt)));
        rows.forEach((row, i) => {
          expect(row.length).toBe(i + 1);
          expect(row[i]).toBeGreaterThan(0n);
          for (let r = 0; r < k; r++) {
            const sum = row.reduce((total, h, j) => total + h * BigInt(vectors[j]?.[r] ?? 0), 0n);
            expect(sum % BigInt(m)).toBe(0n);
          }
        });
        // (Z/m)^t has m^t elements; relations are a subgroup of index D
        expect(BigInt(countRelations(m, vectors)) * lattice.determinant).toBe(
          BigInt(m) ** BigInt(vectors.length),
        );
      }),
      { seed: 4001, numRuns: 300 },
    );
  });
});

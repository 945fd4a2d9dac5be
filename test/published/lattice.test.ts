/**
 * Rank-1 lattices against data/qmc.json: P_2 to 25 digits (mpmath, checked there by an independent sum over residues) and
 * component-by-component searches done by trying every candidate in double precision.
 */
import { describe, expect, it } from "vitest";
import { constructVector, inverseSquareWeights, latticeP2 } from "../../src/numeric/lattice-construction.js";
import { ownLattice } from "../../src/sources/lattice.js";
import { digitsOf, pointsOf } from "../sources/points.js";
import { reference } from "./qmc-data.js";

const unit = (dimension: number): Float64Array => new Float64Array(dimension).fill(1);

/** Relative difference of a computed value from the published digits. */
function difference(value: number, digits: string): number {
  return Math.abs(value / Number(digits) - 1);
}

describe("P_2 of rank-1 lattices, qmc.json", () => {
  it.each(reference.rank1_lattices.lattices)("$id", ({ n, z, d, P2, P2_weights_1_over_j2 }) => {
    expect(difference(latticeP2(n, z, unit(d)), P2)).toBeLessThan(1e-10);
    expect(difference(latticeP2(n, z, inverseSquareWeights(d)), P2_weights_1_over_j2)).toBeLessThan(1e-10);
  });
});

describe("component-by-component construction (Nuyens & Cools 2006), qmc.json", () => {
  it.each(reference.cbc)(
    "n = $n, d = $d, weights $gamma",
    ({ n, d, gamma, z, P2_weighted_per_dimension }) => {
      const weights = gamma === "1" ? unit(d) : inverseSquareWeights(d);
      const vector = constructVector(n, weights);
      expect([...vector]).toEqual(z);
      for (const [j, digits] of P2_weighted_per_dimension.entries()) {
        expect(difference(latticeP2(n, vector.subarray(0, j + 1), weights), digits)).toBeLessThan(1e-9);
      }
    },
  );
});

describe("points {k z / n} of the lattices, exact fractions cut to 52 bits", () => {
  it.each(reference.rank1_lattices.lattices)("$id", ({ n, z, d }) => {
    const points = pointsOf(ownLattice("own", z.map(BigInt)), { dimension: d, count: n });
    for (const [k, point] of points.entries()) {
      for (const [j, component] of z.entries()) {
        const residue = (BigInt(k) * BigInt(component)) % BigInt(n);
        const exact = (residue << 52n) / BigInt(n);
        // rounding upward before the cut: one unit too large where the fraction is within 2^-60 below the next
        const above = ((residue << 60n) / BigInt(n) + 1n) >> 8n;
        expect([exact, above]).toContain(digitsOf(point[j] ?? NaN));
      }
    }
  });
});

import { describe, expect, it } from "vitest";
import {
  constructEmbeddedVector,
  constructVector,
  inverseSquareWeights,
  latticeP2,
} from "../../src/numeric/lattice-construction.js";
import { embeddedTableVector, tableVector } from "../../src/sources/lattice-table.js";
import { latticeSequence } from "../../src/sources/lattice-sequence.js";
import { digitsOf, pointsOf } from "./points.js";

describe("the table holds what the construction gives", () => {
  it.each([
    [1, 1000],
    [2, 1000],
    [3, 1000],
    [6, 1000],
    [9, 1000],
    [12, 200],
    [15, 20],
    [18, 6],
    [20, 4],
  ])("n = 2^%i, the first %i components", (m, dimension) => {
    expect(tableVector(m, dimension)).toEqual(constructVector(2 ** m, inverseSquareWeights(dimension)));
  });

  it("the vector for all sizes, the first 3 components", () => {
    expect(embeddedTableVector(3)).toEqual(constructEmbeddedVector(6, 20, inverseSquareWeights(3)));
  });
});

describe("constructEmbeddedVector", () => {
  it("every component attains the least largest ratio of all odd candidates tried one by one", () => {
    const weights = inverseSquareWeights(4);
    const vector = [...constructEmbeddedVector(3, 7, weights)];
    const sizes = [3, 4, 5, 6, 7].map((m) => 2 ** m);
    for (let j = 0; j < vector.length; j++) {
      const before = vector.slice(0, j);
      const odd = Array.from({ length: 64 }, (_, i) => 2 * i + 1);
      const values = sizes.map((n) =>
        odd.map((z) =>
          latticeP2(
            n,
            [...before, z].map((c) => c % n),
            weights,
          ),
        ),
      );
      const ratios = odd.map((_, at) =>
        Math.max(...values.map((column) => (column[at] ?? NaN) / Math.min(...column))),
      );
      expect(ratios[((vector[j] ?? NaN) - 1) / 2]).toBeLessThan(Math.min(...ratios) * (1 + 1e-9));
    }
  });
});

describe("lattice-sequence", () => {
  it.each([0, 4, 8])("the first 2^%i points are the lattice {k z / n}", (m) => {
    const n = 2 ** m;
    const z = embeddedTableVector(5);
    const points = pointsOf(latticeSequence, { dimension: 5, count: n });
    const numerators = points.map((point) =>
      point.map((u) => Number((digitsOf(u) * BigInt(n)) >> 52n)).join(),
    );
    const lattice = Array.from({ length: n }, (_, k) =>
      [...z].map((component) => (k * component) % n).join(),
    );
    expect(numerators.sort()).toEqual(lattice.sort());
  });

  it("point i is frac(phi(i) z), phi the radical inverse, at any index", () => {
    const z = embeddedTableVector(9);
    for (const first of [0, 5, 1023, 2 ** 20 - 3, 2 ** 40 + 12345]) {
      const points = pointsOf(latticeSequence, { dimension: 9, first, count: 70 });
      for (const [i, point] of points.entries()) {
        const reversed = BigInt(`0b${[...(first + i).toString(2).padStart(52, "0")].reverse().join("")}`);
        const expected = [...z].map((component) => (reversed * BigInt(component)) % 2n ** 52n);
        expect(point.map(digitsOf)).toEqual(expected);
      }
    }
  });
});

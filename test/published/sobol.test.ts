/**
 * Sobol's sequence against values from outside: data/qmc.json, computed with SciPy 1.10.1 and 1.17.1 and cross-checked
 * there with Boost.Random 1.74 (`checks`); direction numbers of Joe & Kuo (2008), criterion D(6).
 */
import { describe, expect, it } from "vitest";
import type { Source } from "../../src/sources/contract.js";
import { packColumns } from "../../src/numeric/gf2.js";
import { sobol, sobolNatural } from "../../src/sources/sobol.js";
import { digitsOf, pointsOf } from "../sources/points.js";
import { reference } from "./qmc-data.js";

const data = reference.sobol;
const shift = BigInt(52 - 32);

/** Coordinate j (1-based) of point i in steps of 2^-32: the reference numerators are exact. */
function numerators(
  first: number,
  count: number,
  dimensions: readonly number[],
  source: Source = sobol,
): bigint[][] {
  const points = pointsOf(source, { dimension: Math.max(...dimensions), first, count });
  return points.map((point) => dimensions.map((j) => digitsOf(point[j - 1] ?? NaN) >> shift));
}

describe("Sobol' (Joe & Kuo 2008), qmc.json", () => {
  const ten = Array.from({ length: 10 }, (_, j) => j + 1);

  it("first 16 points in Gray-code order, dimensions 1 to 10", () => {
    const expected = data.first16_gray_numerators_2_32_dims1_10.map((point) => point.map(BigInt));
    expect(numerators(0, 16, ten)).toEqual(expected);
  });

  it.each(Object.entries(data.at_n_dims1_10))("point %s, dimensions 1 to 10", (n, { gray }) => {
    expect(numerators(Number(n), 1, ten)).toEqual([gray.map(BigInt)]);
  });

  it.each(Object.entries(data.selected_high_dims))(
    "dimension %s: first 16 points and far ones",
    (dimension, entry) => {
      const only = [Number(dimension)];
      expect(numerators(0, 16, only).flat()).toEqual(entry.numerators_gray.map(BigInt));
      for (const [n, { gray }] of Object.entries(entry.at_n)) {
        expect(numerators(Number(n), 1, only).flat()).toEqual([BigInt(gray)]);
      }
    },
  );

  it("first 16 points in natural order, dimensions 1 to 10", () => {
    const expected = data.first16_natural_numerators_2_32_dims1_10.map((point) => point.map(BigInt));
    expect(numerators(0, 16, ten, sobolNatural)).toEqual(expected);
  });

  it.each(Object.entries(data.at_n_dims1_10))("natural order, point %s", (n, { natural }) => {
    expect(numerators(Number(n), 1, ten, sobolNatural)).toEqual([natural.map(BigInt)]);
  });

  it("direction integers v_1 ... v_32 of 13 dimensions, from the generating matrices", () => {
    const dimensions = Object.keys(data.direction_integers_v_k_32bit).map(Number);
    const { matrices } = sobol.generatingMatrices(1111, 2 ** 32);
    for (const j of dimensions.filter((dimension) => dimension <= 1111)) {
      const matrix = matrices[j - 1];
      if (matrix === undefined) throw new Error(`no matrix for dimension ${j}`);
      const words = [...packColumns(matrix)].map((word) => word >> shift);
      expect(words, `dimension ${j}`).toEqual(data.direction_integers_v_k_32bit[String(j)]?.map(BigInt));
    }
  });

  it("the origin stays, at the midpoint 2^-53 of its cell", () => {
    expect(pointsOf(sobol, { dimension: 3, count: 2 })).toEqual([
      [2 ** -53, 2 ** -53, 2 ** -53],
      [0.5 + 2 ** -53, 0.5 + 2 ** -53, 0.5 + 2 ** -53],
    ]);
  });
});

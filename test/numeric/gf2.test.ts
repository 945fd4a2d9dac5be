import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { expect, it } from "vitest";
import { DIGITS, packColumns, unpackColumns } from "../../src/numeric/gf2.js";

it("packing undoes unpacking", () => {
  fc.assert(
    fc.property(
      fc.array(fc.bigInt({ min: 0n, max: 2n ** 52n - 1n }), { minLength: 1, maxLength: 20 }),
      (words) => {
        const matrix = unpackColumns(BigUint64Array.from(words));
        expect([matrix.rows, matrix.columns]).toEqual([DIGITS, words.length]);
        expect([...packColumns(matrix)]).toEqual(words);
      },
    ),
    { seed: 3 },
  );
});

it("the upper row is the most significant digit, missing rows are zero", () => {
  const matrix = new Matrix([
    [1, 0],
    [1, 1],
  ]);
  expect([...packColumns(matrix)]).toEqual([2n ** 51n + 2n ** 50n, 2n ** 50n]);
});

it("refuses other entries and too many rows, with the place", () => {
  expect(() => packColumns(new Matrix([[1, 2]]))).toThrow(
    "generating matrix: expected 0 or 1 in row 1, column 2, found 2",
  );
  expect(() => packColumns(Matrix.zeros(53, 1))).toThrow(
    "generating matrix: expected at most 52 rows, found 53",
  );
});

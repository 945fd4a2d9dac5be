/** Square matrices of whole numbers modulo m, exact in BigInt: the way to jump in multiple recursive generators. */

export type Matrix = readonly (readonly bigint[])[];

/** matrix times column vector, mod m. */
export function applyMatrix(matrix: Matrix, vector: readonly bigint[], m: bigint): bigint[] {
  return matrix.map((row) => row.reduce((sum, entry, k) => sum + entry * (vector[k] ?? 0n), 0n) % m);
}

function multiply(a: Matrix, b: Matrix, m: bigint): Matrix {
  return a.map((row) =>
    row.map((_, j) => row.reduce((sum, entry, k) => sum + entry * (b[k]?.[j] ?? 0n), 0n) % m),
  );
}

/** matrix^exponent mod m, exponent at least 0, by repeated squaring. */
export function powerMatrix(matrix: Matrix, exponent: bigint, m: bigint): Matrix {
  let result: Matrix = matrix.map((row, i) => row.map((_, j) => (i === j ? 1n % m : 0n)));
  let square = matrix;
  for (let left = exponent; left > 0n; left >>= 1n) {
    if (left & 1n) result = multiply(result, square, m);
    square = multiply(square, square, m);
  }
  return result;
}

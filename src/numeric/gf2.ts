/**
 * Matrices over the field of two elements in packed form: one word of 64 bits for every column, of which the upper
 * row is the most significant of the low `DIGITS` bits. So a column is, read as a number over 2^52, the coordinate that
 * it adds to a point of a digital net (H. Niederreiter, "Random Number Generation and Quasi-Monte Carlo Methods", SIAM,
 * 1992, section 4.3).
 */
import { Matrix } from "ml-matrix";

/** Rows of a packed matrix: the fraction bits of a double. */
export const DIGITS = 52;

/**
 * The packed columns of a matrix of zeros and ones with 1 to `DIGITS` rows; missing rows count as zero. Throws
 * RangeError for other entries or more rows.
 */
export function packColumns(matrix: Matrix): BigUint64Array {
  if (matrix.rows > DIGITS) {
    throw new RangeError(`generating matrix: expected at most ${DIGITS} rows, found ${matrix.rows}`);
  }
  const words = new BigUint64Array(matrix.columns);
  for (let row = 0; row < matrix.rows; row++) {
    const bit = 1n << BigInt(DIGITS - 1 - row);
    for (let column = 0; column < matrix.columns; column++) {
      const entry = matrix.get(row, column);
      if (entry !== 0 && entry !== 1) {
        const place = `row ${row + 1}, column ${column + 1}`;
        throw new RangeError(`generating matrix: expected 0 or 1 in ${place}, found ${entry}`);
      }
      if (entry === 1) words[column] = (words[column] ?? 0n) | bit;
    }
  }
  return words;
}

/** The matrix of `DIGITS` rows whose packed columns are `words`. */
export function unpackColumns(words: BigUint64Array): Matrix {
  const matrix = Matrix.zeros(DIGITS, words.length);
  for (const [column, word] of words.entries()) {
    // two halves of 26 bits: arithmetic on them is some ten times faster than on BigInt
    const halves = [Number(word >> 26n), Number(word & 0x3ffffffn)];
    for (let row = 0; row < DIGITS; row++) {
      const half = halves[row < 26 ? 0 : 1] ?? 0;
      matrix.set(row, column, (half >>> (25 - (row % 26))) & 1);
    }
  }
  return matrix;
}

/** Vectors of rank-1 lattices constructed once and for all; tools/build-lattice-table.mjs describes the file. */
import { readFileSync } from "node:fs";

/** Components of a vector in the table. */
export const TABLE_DIMENSIONS = 1000;
/** The largest lattice in the table has 2^20 points. */
export const TABLE_LOG_SIZE = 20;

let table: Buffer | undefined;

/** The first components of the vector for 2^m points, m = 1...20. */
export function tableVector(m: number, dimension: number): Uint32Array {
  return row(m - 1, dimension);
}

/** The first components of the vector for all of 2^6...2^20 points. */
export function embeddedTableVector(dimension: number): Uint32Array {
  return row(TABLE_LOG_SIZE, dimension);
}

function row(index: number, dimension: number): Uint32Array {
  table ??= readFileSync(new URL("../../dist/sources/tables/lattice.bin", import.meta.url));
  const first = index * TABLE_DIMENSIONS;
  const vector = new Uint32Array(dimension);
  for (let j = 0; j < dimension; j++) vector[j] = table.readUIntLE(3 * (first + j), 3);
  return vector;
}

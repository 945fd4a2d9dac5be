/** The digital net of generating matrices of one's own, in base 2 and natural order. */
import type { Matrix } from "ml-matrix";
import { DIGITS, packColumns } from "../numeric/gf2.js";
import type { DigitalNet } from "./contract.js";
import { netSource2 } from "./net2.js";

/**
 * The net of one matrix per coordinate, all with the same number m of columns (1 to 52): 2^m points. Throws RangeError
 * for entries other than 0 and 1, more than 52 rows or another shape.
 */
export function ownNet(id: string, matrices: readonly Matrix[]): DigitalNet {
  const size = matrices[0]?.columns ?? 0;
  const columns = new BigUint64Array(matrices.length * DIGITS);
  for (const [j, matrix] of matrices.entries()) {
    if (matrix.columns !== size || size > DIGITS) {
      throw new RangeError(
        `generating matrix: expected the same number of columns for every coordinate, 1 to ${DIGITS}, found ${matrix.columns} for coordinate ${j + 1}`,
      );
    }
    columns.set(packColumns(matrix), j * DIGITS);
  }
  return netSource2(
    {
      family: "own",
      id,
      title: `Digital net of ${matrices.length} generating matrices in base 2`,
      citation:
        "the user's own; method: H. Niederreiter, Random Number Generation and Quasi-Monte Carlo Methods (1992)",
      largestDimension: matrices.length,
      knownStructure: null,
      nearestSize: (n) => Math.min(n, 2 ** size),
    },
    { order: "natural", columns: () => columns },
  );
}

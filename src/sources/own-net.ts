/** The digital net of generating matrices of one's own, in a prime base and natural order. */
import { Matrix } from "ml-matrix";
import { isPrime } from "../numeric/factor.js";
import { DIGITS, packColumns } from "../numeric/gf2.js";
import type { DigitalNet } from "./contract.js";
import { checkCapacity } from "./capacity.js";
import { netSource2 } from "./net2.js";
import { digitsIn, openNetB } from "./netb.js";

/** Largest base of a net of one's own: a digit takes a byte, and twice a digit does too. */
export const LARGEST_BASE = 127;

/**
 * The net of one matrix per coordinate, all with the same number m of columns: base^m points. Columns and rows: 1 to K, the
 * largest number with base^K at most 2^52. Throws RangeError for a base that is no prime up to 127, entries outside
 * 0 ... base - 1, or another shape.
 */
export function ownNet(id: string, base: number, matrices: readonly Matrix[]): DigitalNet {
  if (!(base <= LARGEST_BASE && Number.isInteger(base) && isPrime(BigInt(base)))) {
    throw new RangeError(
      `source.matrices.base: expected a prime from 2 to ${LARGEST_BASE}, found ${String(base)}`,
    );
  }
  const size = matrices[0]?.columns ?? 0;
  const digits = digitsIn(base);
  for (const [j, matrix] of matrices.entries()) checkShape(matrix, size, digits, j);
  const about = {
    family: "own",
    id,
    title: `Digital net of ${matrices.length} generating matrices in base ${base}`,
    citation:
      "the user's own; method: H. Niederreiter, Random Number Generation and Quasi-Monte Carlo Methods (1992)",
    largestDimension: matrices.length,
    knownStructure: null,
    nearestSize: (n: number) => Math.min(n, base ** size),
  } as const;
  if (base > 2) return netInBase(about, base, matrices);
  const columns = new BigUint64Array(matrices.length * DIGITS);
  for (const [j, matrix] of matrices.entries()) columns.set(packColumns(matrix), j * DIGITS);
  return netSource2(about, { order: "natural", columns: () => columns });
}

function checkShape({ rows, columns }: Matrix, size: number, digits: number, j: number): void {
  if (columns !== size || size > digits) {
    throw new RangeError(
      `generating matrix: expected the same number of columns for every coordinate, 1 to ${digits}, found ${columns} for coordinate ${j + 1}`,
    );
  }
  if (rows > digits) {
    throw new RangeError(
      `generating matrix: expected 1 to ${digits} rows, found ${rows} for coordinate ${j + 1}`,
    );
  }
}

type About = Pick<
  DigitalNet,
  "family" | "id" | "title" | "citation" | "largestDimension" | "knownStructure" | "nearestSize"
>;

function netInBase(about: About, base: number, matrices: readonly Matrix[]): DigitalNet {
  const digits = digitsIn(base);
  const padded = matrices.map((matrix) => {
    const square = Matrix.zeros(digits, digits);
    return square.setSubMatrix(matrix, 0, 0);
  });
  const source: DigitalNet = {
    ...about,
    method: "digital net",
    outputBits: DIGITS,
    period: null,
    nesting: "sequence",
    randomisations: ["digital-shift", "linear", "owen"],
    open: (request, kernels) => openNetB(source, base, padded, request, kernels),
    generatingMatrices(dimension, n) {
      checkCapacity(source, dimension, n);
      let used = 0;
      for (let power = 1; power < n; power *= base) used++;
      const shown = padded.slice(0, dimension).map((matrix) => {
        return used === 0 ? Matrix.zeros(digits, 0) : matrix.subMatrix(0, digits - 1, 0, used - 1);
      });
      return { base, order: "natural", matrices: shown };
    },
  };
  return source;
}

/** The part of a digital net that the first b^m points see: m columns of each generating matrix, in rows. */
import type { Matrix } from "ml-matrix";
import { isPrime } from "../numeric/factor.js";
import { mostColumns } from "../numeric/elimination.js";
import type { DigitalNet, GeneratingMatrices, Source } from "../sources/contract.js";

export interface Net {
  readonly base: number;
  /** m: the figures are those of the first base^m points. */
  readonly digits: number;
  readonly matrices: readonly Matrix[];
}

export function isDigitalNet(source: Source): source is DigitalNet {
  return "generatingMatrices" in source;
}

/**
 * The net of the first base^m points of these matrices, by default of as many points as they have columns for. Gray-code and
 * natural order agree on every first base^m points. Throws RangeError for a base that is no prime, for more digits than
 * there are columns or than can be handled (31 in base 2, else 2^53 points), and for entries out of range.
 */
export function netOf({ base, matrices }: GeneratingMatrices, digits?: number): Net {
  const columns = Math.min(...matrices.map((matrix) => matrix.columns));
  const m = digits ?? columns;
  if (!isPrime(BigInt(base))) throw new RangeError(`base: expected a prime number, found ${base}`);
  const most = Math.min(columns, mostColumns(base));
  if (!(Number.isInteger(m) && m >= 1 && m <= most)) {
    throw new RangeError(
      `digits: expected 1 to ${most} in base ${base} (the first ${base}^digits points), found ${m}`,
    );
  }
  for (const [j, matrix] of matrices.entries()) {
    for (let r = 0; r < matrix.rows; r++) {
      for (let c = 0; c < m; c++) {
        const entry = matrix.get(r, c);
        if (Number.isInteger(entry) && entry >= 0 && entry < base) continue;
        throw new RangeError(
          `generating matrix ${j + 1}: expected digits from 0 to ${base - 1}, found ${entry} in row ${r + 1}, column ${c + 1}`,
        );
      }
    }
  }
  return { base, digits: m, matrices };
}

/** The net of a source's first base^m <= n points. Throws RangeError where n is below the base, or out of the source's range. */
export function netOfSource(source: DigitalNet, dimension: number, n: number): Net {
  const generating = source.generatingMatrices(dimension, n);
  let digits = 0;
  for (let power = generating.base; power <= n; power *= generating.base) digits++;
  if (digits === 0) {
    throw new RangeError(
      `n: expected at least the base, ${generating.base} points, for the quality of source "${source.id}" in ${dimension} dimensions, found ${n}`,
    );
  }
  return netOf(generating, Math.min(digits, mostColumns(generating.base)));
}

/** Only these coordinates of a net (0-based). Throws RangeError for none, for one out of range and for repeats. */
export function coordinatesOf(net: Net, indices: readonly number[]): Net {
  const dimension = net.matrices.length;
  if (indices.length === 0) throw new RangeError("coordinates: expected at least one, found none");
  const matrices = indices.map((index, at) => {
    const matrix = net.matrices[index];
    if (matrix === undefined || indices.indexOf(index) !== at) {
      const problem = matrix === undefined ? "out of range" : "given twice";
      throw new RangeError(
        `coordinates: expected different ones from 1 to ${dimension}, found ${index + 1} (${problem})`,
      );
    }
    return matrix;
  });
  return { ...net, matrices };
}

/**
 * Interlaced digital sequences of order 2 and 3 (J. Dick, "Walsh spaces containing smooth functions and quasi-Monte Carlo
 * rules of arbitrary high order", SIAM Journal on Numerical Analysis 46, 2008, 1519-1553): coordinate j takes its digits in
 * turn from 2 or 3 coordinates of the Sobol' sequence. With 52 digits in all, each of them gives 26 or 17 to 18.
 *
 * Good for: integrands with square-integrable mixed second (third) derivatives, where the error falls as n^-2 (n^-3) up to
 * logarithms. Bad for: rough integrands, many coordinates (each takes up two or three of Sobol's), sizes that are not
 * powers of two. The digital shift keeps the order; scrambling after interlacing would not, so it is not offered.
 */
import { DIGITS } from "../numeric/gf2.js";
import type { DigitalNet } from "./contract.js";
import { netSource2 } from "./net2.js";
import { SOBOL_DIMENSIONS, sobolColumns } from "./sobol.js";

function interlaced(order: 2 | 3): DigitalNet {
  const net = netSource2(
    {
      id: `interlaced-${order}`,
      title: `Interlaced Sobol' sequence of order ${order}`,
      citation:
        "J. Dick, Walsh spaces containing smooth functions and quasi-Monte Carlo rules of arbitrary high order, SIAM Journal on Numerical Analysis 46 (2008) 1519-1553",
      largestDimension: Math.floor(SOBOL_DIMENSIONS / order),
      knownStructure: null,
      randomisations: ["digital-shift"],
    },
    { order: "gray", columns: (dimension) => interlacedColumns(order, dimension) },
  );
  return { ...net, interlacing: order };
}

export const interlaced2 = interlaced(2);
export const interlaced3 = interlaced(3);

const known = new Map<number, BigUint64Array>();

function interlacedColumns(order: number, dimension: number): BigUint64Array {
  const before = known.get(order);
  if (before !== undefined && before.length >= dimension * DIGITS) return before;
  const parts = sobolColumns(order * dimension);
  const columns = new BigUint64Array(dimension * DIGITS);
  for (let j = 0; j < dimension; j++) {
    for (let k = 0; k < DIGITS; k++) {
      const words = Array.from({ length: order }, (_, i) => parts[(order * j + i) * DIGITS + k] ?? 0n);
      columns[j * DIGITS + k] = interlace(words);
    }
  }
  known.set(order, columns);
  return columns;
}

/** The word whose digits are the first ones of all the words, then the second ones, and so on. */
function interlace(words: readonly bigint[]): bigint {
  let out = 0n;
  for (let row = 0; row < DIGITS; row++) {
    const word = words[row % words.length] ?? 0n;
    const from = BigInt(DIGITS - 1 - Math.floor(row / words.length));
    out = (out << 1n) | ((word >> from) & 1n);
  }
  return out;
}

/**
 * Sobol's sequence (I. M. Sobol', "On the distribution of points in a cube and the approximate evaluation of integrals",
 * USSR Computational Mathematics and Mathematical Physics 7(4), 1967, 86-112) with the direction numbers of S. Joe and
 * F. Y. Kuo, "Constructing Sobol sequences with better two-dimensional projections", SIAM Journal on Scientific Computing
 * 30 (2008) 2635-2654, criterion D(6): a digital sequence in base 2, up to 21,201 coordinates.
 *
 * Points of `sobol` come in Gray-code order (Antonov & Saleev 1979), those of `sobol-natural` in natural order, both with the
 * origin kept as point 0: the first 2^m points are the same ones, and dropping the origin would cost accuracy (Owen, arXiv:2008.08051). Column k of a generating
 * matrix is v_k = a_1 v_(k-1) + ... + a_(s-1) v_(k-s+1) + v_(k-s) + (v_(k-s) shifted right by s digits), the first s
 * columns are m_k / 2^k.
 *
 * Good for: smooth integrands, sample sizes 2^m. Bad for: sizes in between (the rate is reached at powers of two), high
 * coordinates with few points (some pairs of coordinates are poorly spread).
 */
import { readFileSync } from "node:fs";
import { DIGITS } from "../numeric/gf2.js";
import { netSource2 } from "./net2.js";

/** Coordinates in the table. */
export const SOBOL_DIMENSIONS = 21_201;

const about = {
  citation:
    "S. Joe and F. Y. Kuo, Constructing Sobol sequences with better two-dimensional projections, SIAM Journal on Scientific Computing 30 (2008) 2635-2654",
  largestDimension: SOBOL_DIMENSIONS,
  knownStructure: null,
};

export const sobol = netSource2(
  { ...about, id: "sobol", title: "Sobol' sequence, direction numbers of Joe and Kuo, Gray-code order" },
  { order: "gray", columns: sobolColumns },
);

export const sobolNatural = netSource2(
  {
    ...about,
    id: "sobol-natural",
    title: "Sobol' sequence, direction numbers of Joe and Kuo, natural order",
  },
  { order: "natural", columns: sobolColumns },
);

let known: BigUint64Array = new BigUint64Array(0);

/** Packed columns of the first `dimension` matrices (at least), kept for the next call. */
export function sobolColumns(dimension: number): BigUint64Array {
  if (known.length < dimension * DIGITS) known = directionNumbers(dimension);
  return known;
}

/** All columns of `dimension` matrices from the packed table; tools/pack-joe-kuo.mjs describes its layout. */
function directionNumbers(dimension: number): BigUint64Array {
  const table = readFileSync(new URL("../../dist/sources/tables/joe-kuo.bin", import.meta.url));
  const rows = table.readUInt32LE(0);
  let at = (4 + rows) * 8;
  const take = (bits: number): number => {
    let value = 0;
    for (let bit = 0; bit < bits; bit++, at++) value |= (((table[at >> 3] ?? 0) >> (at & 7)) & 1) << bit;
    return value;
  };

  // A word as two halves of 32 bits, low half first; arithmetic on halves is some 20 times faster than on BigInt.
  const halves = new Uint32Array(dimension * DIGITS * 2);
  for (let k = 1; k <= DIGITS; k++) setHalves(halves, 2 * (k - 1), 1, DIGITS - k);
  let code = 0;
  for (let j = 1; j < dimension; j++) {
    code += table[3 + j] ?? 0;
    const degree = 32 - Math.clz32(code);
    const first = j * DIGITS * 2;
    for (let k = 1; k <= degree; k++) setHalves(halves, first + 2 * (k - 1), 2 * take(k - 1) + 1, DIGITS - k);
    for (let k = degree; k < DIGITS; k++) {
      const word = first + 2 * k;
      const source = word - 2 * degree;
      let low = halves[source] ?? 0;
      let high = halves[source + 1] ?? 0;
      low ^= (low >>> degree) | (high << (32 - degree));
      high ^= high >>> degree;
      // a_i is bit s - 1 - i of `code`, whose leading bit stands for the leading coefficient of the polynomial
      for (let i = 1; i < degree; i++) {
        if (((code >>> (degree - 1 - i)) & 1) === 1) {
          low ^= halves[word - 2 * i] ?? 0;
          high ^= halves[word - 2 * i + 1] ?? 0;
        }
      }
      halves[word] = low;
      halves[word + 1] = high;
    }
  }
  return new BigUint64Array(halves.buffer);
}

/** Writes value * 2^shift, value below 2^32, as two halves at `at`. */
function setHalves(halves: Uint32Array, at: number, value: number, shift: number): void {
  const product = value * 2 ** shift;
  halves[at] = product % 2 ** 32;
  halves[at + 1] = Math.floor(product / 2 ** 32);
}

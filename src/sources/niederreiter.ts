/**
 * Niederreiter's sequence in base 2 (H. Niederreiter, "Low-discrepancy and low-dispersion sequences", Journal of Number
 * Theory 30, 1988, 51-70), its matrices as in P. Bratley, B. L. Fox and H. Niederreiter, "Implementation and tests of
 * low-discrepancy sequences", ACM Transactions on Modeling and Computer Simulation 2 (1992) 195-213: coordinate j belongs to
 * the j-th irreducible polynomial over GF(2), x, x + 1, x^2 + x + 1, ..., of degree e_j. Points in Gray-code order, the
 * origin kept.
 *
 * Its t is the sum of the e_j - 1. Good for: a few coordinates. Bad for: many, where t is far larger than that of Sobol'
 * points at the sizes in use.
 */
import { DIGITS } from "../numeric/gf2.js";
import { netSource2 } from "./net2.js";

export const niederreiter = netSource2(
  {
    id: "niederreiter",
    title: "Niederreiter sequence in base 2",
    citation:
      "P. Bratley, B. L. Fox and H. Niederreiter, Implementation and tests of low-discrepancy sequences, ACM Transactions on Modeling and Computer Simulation 2 (1992) 195-213",
    largestDimension: 1000,
    knownStructure: null,
  },
  { order: "gray", columns },
);

let known: BigUint64Array = new BigUint64Array(0);

function columns(dimension: number): BigUint64Array {
  if (known.length < dimension * DIGITS) {
    const built = new BigUint64Array(dimension * DIGITS);
    for (const [j, polynomial] of irreduciblePolynomials(dimension).entries()) {
      built.set(columnsFor(polynomial), j * DIGITS);
    }
    known = built;
  }
  return known;
}

/** The first irreducible polynomials over GF(2), bit k the coefficient of x^k, in the order of these numbers. */
function irreduciblePolynomials(count: number): number[] {
  const found: number[] = [];
  for (let candidate = 2; found.length < count; candidate++) {
    const limit = 2 ** Math.floor(degree(candidate) / 2 + 1);
    const divides = (divisor: number): boolean => divisor < limit && remainder(candidate, divisor) === 0;
    if (!found.some(divides)) found.push(candidate);
  }
  return found;
}

function degree(polynomial: number): number {
  return 31 - Math.clz32(polynomial);
}

function remainder(polynomial: number, divisor: number): number {
  const size = degree(divisor);
  let rest = polynomial;
  while (rest !== 0 && degree(rest) >= size) rest ^= divisor << (degree(rest) - size);
  return rest;
}

/** Packed columns of the matrix of an irreducible polynomial p (section 3.3 of the 1992 paper). */
function columnsFor(polynomial: number): BigUint64Array {
  const e = degree(polynomial);
  const words = new BigUint64Array(DIGITS);
  // power = p^q, coefficient of x^k at place k
  let power: number[] = [1];
  for (let row = 0; row < DIGITS; row += e) {
    const first = power.length - 1;
    power = times(power, polynomial, e);
    const m = power.length - 1;
    // v_0 ... v_(m-1) may be chosen freely with v_first = 1 and zeros before it; the paper takes ones behind it
    const v = new Uint8Array(m + DIGITS + e).fill(1, first, m);
    for (let r = m; r < v.length; r++) {
      let sum = 0;
      for (let k = 0; k < m; k++) sum ^= (power[k] ?? 0) & (v[r - m + k] ?? 0);
      v[r] = sum;
    }
    for (let u = 0; u < e && row + u < DIGITS; u++) {
      const bit = 1n << BigInt(DIGITS - 1 - row - u);
      for (let column = 0; column < DIGITS; column++) {
        if (v[column + u] === 1) words[column] = (words[column] ?? 0n) | bit;
      }
    }
  }
  return words;
}

function times(factor: readonly number[], polynomial: number, size: number): number[] {
  const product = new Array<number>(factor.length + size).fill(0);
  for (const [k, coefficient] of factor.entries()) {
    if (coefficient === 0) continue;
    for (let i = 0; i <= size; i++) product[k + i] = (product[k + i] ?? 0) ^ ((polynomial >> i) & 1);
  }
  return product;
}

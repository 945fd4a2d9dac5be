/**
 * Which vectors of a dual net matter to an integral: those whose Walsh coefficients can be large. For integrands of bounded
 * variation coefficients fall with the first digit of each k_j, for smooth ones with the first two (J. Dick, "Walsh spaces
 * containing smooth functions and quasi-Monte Carlo rules of arbitrary high order", SIAM Journal on Numerical Analysis 46
 * (2008) 1519-1553); so vectors are put in order by both weights, whichever ranks one higher. Beside the short vectors there
 * are long ones that weigh little: single digits beyond those that the points have, by which a net knows a coordinate
 * only to b^-m.
 */
import type { SparseVector } from "./alias-set.js";
import { dualVectors } from "./dual-net.js";
import type { Net } from "./net.js";

/** Vectors of up to so many coordinates are looked for, and steps of that search; about half a second. */
const SEARCH = { order: 4, enough: 256, steps: 2 ** 20 };

/** Weight above the number of digits that is searched, if the vectors before are few. */
const WEIGHT_BEYOND = 8;

/** Digits beyond the last of the points that are looked at: their coefficients fall by the base from one to the next. */
const DIGITS_BEYOND = 16;

/** Vectors of the net's dual, in order of importance. */
export function walshVectors(net: Net): SparseVector[] {
  const found = new Map<string, SparseVector>();
  const add = (vector: SparseVector): void => {
    found.set(`${vector.indices.join()}:${vector.entries.join()}`, vector);
  };
  for (const { indices, k } of dualVectors(net, { ...SEARCH, weight: net.digits + WEIGHT_BEYOND }).vectors)
    add({ indices, entries: k });
  for (let j = 0; j < net.matrices.length; j++) {
    for (const entry of unseenDigits(net, j)) add({ indices: [j], entries: [entry] });
  }
  const vectors = [...found.values()];
  const ranks = [1, 2].map((digits) => ranksOf(vectors.map((vector) => weight(vector, net.base, digits))));
  const rank = (i: number): number => Math.min(...ranks.map((of) => of[i] ?? 0));
  return vectors
    .map((vector, i) => ({ vector, rank: rank(i) }))
    .sort((a, b) => a.rank - b.rank)
    .map(({ vector }) => vector);
}

/** Multiples of b^r, one digit, that no point of the net shows in coordinate j: row r of its matrix is 0. */
function unseenDigits({ base, digits, matrices }: Net, j: number): number[] {
  const matrix = matrices[j];
  const all: number[] = [];
  for (let r = 0; r < digits + DIGITS_BEYOND; r++) {
    const row = matrix === undefined || r >= matrix.rows ? [] : matrix.getRow(r).slice(0, digits);
    if (row.some((entry) => entry !== 0) || base ** (r + 1) > Number.MAX_SAFE_INTEGER) continue;
    for (let digit = 1; digit < base; digit++) all.push(digit * base ** r);
  }
  return all;
}

/** The places of the first digits of each k_j, at most `count` of each, added up. */
function weight({ entries }: SparseVector, base: number, count: number): number {
  return entries.reduce(
    (sum, k) =>
      sum +
      places(k, base)
        .slice(0, count)
        .reduce((a, b) => a + b, 0),
    0,
  );
}

/** The places (1 for the last) of the digits of k other than 0, the first digit first. */
function places(k: number, base: number): number[] {
  const found: number[] = [];
  for (let rest = k, place = 1; rest > 0; rest = Math.floor(rest / base), place++) {
    if (rest % base !== 0) found.unshift(place);
  }
  return found;
}

/** For each value how many are smaller. */
function ranksOf(values: readonly number[]): number[] {
  const first = new Map<number, number>();
  [...values].sort((a, b) => a - b).forEach((value, rank) => first.has(value) || first.set(value, rank));
  return values.map((value) => first.get(value) ?? 0);
}

/**
 * Short vectors of the dual of a digital net: the natural numbers (k_1, ..., k_s), not all zero, whose Walsh function is 1 on
 * all of the first b^m points, so that the net mistakes it for a constant. With kappa the digits of k_j, least significant
 * first, these are the solutions of sum over j of C_j^T kappa_j = 0 (H. Niederreiter and G. Pirsic, "Duality for digital nets and
 * its applications", Acta Arithmetica 97 (2001) 173-182). The error of the net is the sum of the integrand's Walsh coefficients
 * at them (J. Dick and F. Pillichshammer, "Digital Nets and Sequences", Cambridge, 2010, chapter 4).
 *
 * The weight is that of Niederreiter, Rosenbloom and Tsfasman: the sum of the numbers of digits of the k_j. The least weight is
 * m - t + 1. Since b^(weight - coordinates) <= product of the k_j < b^weight, short vectors are those of small product too.
 */
import { elimination } from "../numeric/elimination.js";
import type { Net } from "./net.js";

export interface DualVector {
  /** 0-based coordinates with k_j > 0, ascending. */
  readonly indices: readonly number[];
  /** k_j for these. */
  readonly k: readonly number[];
  readonly weight: number;
  /** Product of the k_j > 0. */
  readonly product: number;
}

export interface DualVectors {
  /** By weight, then product, then coordinates. */
  readonly vectors: readonly DualVector[];
  /** All vectors of at most this weight are there; above it none is. */
  readonly completeTo: number;
  /** What ended the search: enough vectors, the largest weight asked for, or the steps. */
  readonly end: "enough" | "weight" | "steps";
}

export interface DualRequest {
  /** Coordinates that a vector may have at most; all if absent. */
  readonly order?: number;
  /** The search ends with the weight at which this many vectors are known. */
  readonly enough: number;
  /** Largest weight; by default m + 2, the least weight of a net with t = 0 being m + 1. */
  readonly weight?: number;
  /** Rows inserted and vectors listed at most. */
  readonly steps?: number;
}

/** About two seconds. */
const STEPS = 2 ** 22;

/** Vectors of the dual of the net's first b^m points, of its matrices in order. */
export function dualVectors(net: Net, request: DualRequest): DualVectors {
  const { base, digits, matrices } = net;
  const size = matrices.length;
  const order = Math.min(size, request.order ?? size);
  // numbers of more digits would not be exact in a double; rows that a matrix does not have are zero
  const deepest = Math.floor(Math.log(Number.MAX_SAFE_INTEGER) / Math.log(base));
  const heaviest = Math.min(deepest, request.weight ?? digits + 2);
  const rows = elimination(base, digits, matrices, Math.max(digits, heaviest));
  rows.frame(0);
  let left = request.steps ?? STEPS;
  let level: DualVector[] = [];
  const lengths: [number, number][] = [];

  /** All vectors of one weight whose coordinates come from `from` on; false where the steps ran out. */
  const visit = (from: number, remaining: number, parts: number, dependent: number): boolean => {
    for (let j = from; j < size; j++) {
      let inserted = 0;
      let lost = dependent;
      let finished = true;
      lengths.push([j, 0]);
      for (let d = 1; d <= remaining && finished; d++) {
        if (--left < 0) finished = false;
        if (rows.insert(j, d - 1) < 0) lost++;
        inserted++;
        lengths[lengths.length - 1] = [j, d];
        if (finished && d === remaining && lost > 0) {
          const found = solutions(net, lengths, left);
          left -= found?.length ?? left + 1;
          finished = found !== null;
          for (const vector of found ?? []) level.push(vector);
        } else if (finished && d < remaining && parts > 1 && j + 1 < size) {
          finished = visit(j + 1, remaining - d, parts - 1, lost);
        }
      }
      lengths.pop();
      while (inserted-- > 0) rows.pop();
      if (!finished) return false;
    }
    return true;
  };

  const vectors: DualVector[] = [];
  for (let weight = 1; weight <= heaviest; weight++) {
    level = [];
    if (!visit(0, weight, order, 0)) return { vectors, completeTo: weight - 1, end: "steps" };
    level.sort((a, b) => a.product - b.product || comesFirst(a.indices, b.indices));
    for (const vector of level) vectors.push(vector);
    if (vectors.length >= request.enough) return { vectors, completeTo: weight, end: "enough" };
  }
  return { vectors, completeTo: heaviest, end: "weight" };
}

function comesFirst(a: readonly number[], b: readonly number[]): number {
  for (let i = 0; i < Math.min(a.length, b.length); i++) {
    const difference = (a[i] ?? 0) - (b[i] ?? 0);
    if (difference !== 0) return difference;
  }
  return a.length - b.length;
}

/** The dual vectors with exactly these numbers of digits, coordinate and digits of each; null where `most` may not do. */
function solutions(
  { base, digits, matrices }: Net,
  lengths: readonly (readonly [number, number])[],
  most: number,
): DualVector[] | null {
  // a row of a matrix, then which rows it is made of
  const stack: number[][] = [];
  const kernel: number[][] = [];
  const total = lengths.reduce((sum, [, d]) => sum + d, 0);
  let at = 0;
  for (const [j, d] of lengths) {
    for (let r = 0; r < d; r++, at++) {
      const matrix = matrices[j];
      const row = Array.from({ length: digits + total }, (_, c) =>
        c < digits
          ? matrix !== undefined && r < matrix.rows
            ? matrix.get(r, c)
            : 0
          : Number(c - digits === at),
      );
      for (const above of stack) {
        const pivot = above.findIndex((entry) => entry !== 0);
        const factor = row[pivot] ?? 0;
        if (factor === 0) continue;
        const times = (base - factor) * inverse(above[pivot] ?? 1, base);
        for (let c = 0; c < row.length; c++) row[c] = ((row[c] ?? 0) + times * (above[c] ?? 0)) % base;
      }
      if (row.slice(0, digits).some((entry) => entry !== 0)) stack.push(row);
      else kernel.push(row.slice(digits));
    }
  }
  if (base ** kernel.length > most) return null;
  const found: DualVector[] = [];
  for (let index = 1; index < base ** kernel.length; index++) {
    const combined = new Array<number>(total).fill(0);
    for (let g = 0, rest = index; g < kernel.length; g++, rest = Math.floor(rest / base)) {
      for (let c = 0; c < total; c++) {
        combined[c] = ((combined[c] ?? 0) + (rest % base) * (kernel[g]?.[c] ?? 0)) % base;
      }
    }
    let start = 0;
    const k = lengths.map(([, d]) => {
      const own = combined.slice(start, (start += d));
      return own.at(-1) === 0 ? 0 : own.reduceRight((number, digit) => number * base + digit, 0);
    });
    if (k.includes(0)) continue;
    found.push({
      indices: lengths.map(([j]) => j),
      k,
      weight: total,
      product: k.reduce((product, component) => product * component, 1),
    });
  }
  return found;
}

/** 1/a modulo a prime: a^(p-2). */
function inverse(a: number, prime: number): number {
  let result = 1;
  for (let exponent = prime - 2, power = a; exponent > 0; exponent = Math.floor(exponent / 2)) {
    if (exponent % 2 === 1) result = (result * power) % prime;
    power = (power * power) % prime;
  }
  return result;
}

/**
 * The quality parameter t of digital nets (H. Niederreiter, "Point sets and sequences with small discrepancy", Monatshefte
 * fuer Mathematik 104 (1987) 273-337; "Random Number Generation and Quasi-Monte Carlo Methods", SIAM, 1992, chapter 4): of b^m
 * points every elementary box of volume b^(t-m) holds exactly b^t, and t is the least number for which that is so. t = m -
 * rho, rho the largest number such that any d_1 + ... + d_s = rho first rows of the generating matrices are linearly
 * independent (theorem 4.28); so rho + 1 is the least weight of a vector in the dual net (Niederreiter and G. Pirsic, "Duality for
 * digital nets and its applications", Acta Arithmetica 97 (2001) 173-182).
 *
 * Exact: with rows written in the frame of the first coordinate's rows, the rows of the others are eliminated one by one,
 * and the smallest last place of the echelon form says how many rows of the first coordinate make them dependent. A pair
 * costs O(m^2) operations on rows that way, s coordinates one row operation for each composition of at most rho into s - 1 parts.
 */
import { elimination } from "../numeric/elimination.js";
import { coordinatesOf, type Net } from "./net.js";

/** t of some coordinates; where the enumeration was cut short, what is known of it. */
export interface TValue {
  /** Null where only the limits are known. */
  readonly t: number | null;
  readonly atLeast: number;
  readonly atMost: number;
}

/** Rows inserted at most: some seconds. */
export const T_STEPS = 2 ** 25;

/** t of the coordinates with these 0-based indices. Throws RangeError for none, for one out of range and for repeats. */
export function tValue(net: Net, indices: readonly number[], steps = T_STEPS): TValue {
  const { base, digits, matrices } = coordinatesOf(net, indices);
  const rows = elimination(base, digits, matrices);
  const size = matrices.length;
  let left = steps;
  // the least weight found so far, from coordinates alone and in pairs
  let weight = digits + 1;
  for (let i = 0; i < size && left > 0; i++) {
    weight = Math.min(weight, rows.frame(i));
    for (let j = i + 1; j < size; j++) weight = Math.min(weight, pairWeight(rows, j, weight));
    left -= digits * (size - i);
  }

  rows.frame(0);
  /** Inserts rows of matrices from j on, `budget` at most; false where the steps ran out. */
  const visit = (j: number, used: number, place: number, budget: number): boolean => {
    for (let next = j; next < size; next++) {
      let lowest = place;
      let inserted = 0;
      let finished = true;
      for (let r = 0; used + r < budget && finished; r++) {
        if (--left < 0) finished = false;
        const at = rows.insert(next, r);
        inserted++;
        if (at < 0) {
          weight = Math.min(weight, used + r + 1);
          break;
        }
        lowest = Math.min(lowest, at);
        weight = Math.min(weight, used + r + 1 + lowest + 1);
        if (finished && used + r + 1 < budget) finished = visit(next + 1, used + r + 1, lowest, budget);
      }
      while (inserted-- > 0) rows.pop();
      if (!finished) return false;
    }
    return true;
  };
  // after all compositions of at most `budget` whatever was not found weighs more than `budget`
  let budget = 0;
  while (weight > budget + 1 && left > 0 && visit(1, 0, digits, budget + 1)) budget++;

  const atLeast = digits + 1 - weight;
  const atMost = digits - Math.min(budget, weight - 1);
  return { t: atLeast === atMost ? atLeast : null, atLeast, atMost };
}

/** The least weight of a dual vector of the framing coordinate and coordinate j, `most` if that is less. */
function pairWeight(rows: ReturnType<typeof elimination>, j: number, most: number): number {
  let weight = most;
  let lowest = rows.columns;
  rows.reset();
  for (let r = 0; r + 1 < weight; r++) {
    const place = rows.insert(j, r);
    if (place < 0) {
      weight = r + 1;
    } else {
      lowest = Math.min(lowest, place);
      weight = Math.min(weight, r + lowest + 2);
    }
  }
  rows.reset();
  return weight;
}

export interface PairTValues {
  readonly dimension: number;
  readonly digits: number;
  /** t of coordinates i < j (0-based) at j (j - 1) / 2 + i. */
  readonly values: Uint8Array;
  /** How many pairs have t = 0, 1, ..., the largest. */
  readonly counts: readonly number[];
}

/** t of all pairs of coordinates of a net. */
export function pairTValues({ base, digits, matrices }: Net): PairTValues {
  const dimension = matrices.length;
  const values = new Uint8Array((dimension * (dimension - 1)) / 2);
  const rows = elimination(base, digits, matrices);
  const counts: number[] = [];
  for (let i = 0; i < dimension; i++) {
    const alone = rows.frame(i);
    for (let j = i + 1; j < dimension; j++) {
      const t = digits + 1 - pairWeight(rows, j, Math.min(alone, digits + 1));
      values[(j * (j - 1)) / 2 + i] = t;
      while (counts.length <= t) counts.push(0);
      counts[t] = (counts[t] ?? 0) + 1;
    }
  }
  return { dimension, digits, values, counts };
}

export interface PairTValue {
  /** 0-based. */
  readonly indices: readonly [number, number];
  readonly t: number;
}

/** The pairs of largest t, the largest first, earlier coordinates first among equals. */
export function worstPairs({ dimension, values, counts }: PairTValues, keep: number): PairTValue[] {
  let threshold = counts.length - 1;
  for (let found = counts[threshold] ?? 0; found < keep && threshold > 0;) found += counts[--threshold] ?? 0;
  const found: PairTValue[] = [];
  for (let j = 1; j < dimension; j++) {
    for (let i = 0; i < j; i++) {
      const t = values[(j * (j - 1)) / 2 + i] ?? 0;
      if (t >= threshold) found.push({ indices: [i, j], t });
    }
  }
  const [first, second] = [0, 1] as const;
  found.sort(
    (a, b) => b.t - a.t || a.indices[second] - b.indices[second] || a.indices[first] - b.indices[first],
  );
  return found.slice(0, keep);
}

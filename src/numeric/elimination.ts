/**
 * Gaussian elimination over a prime field for the rows of several matrices with m columns each, one row in at a time and out
 * again: what the quality of a digital net needs. Rows are expressed in a frame of m independent rows first, of which as many
 * as possible are those of one chosen matrix, so that the last non-zero place of a row says how many rows of that matrix
 * it takes to make them dependent. In base 2 a row is one word.
 */
import type { Matrix } from "ml-matrix";

export interface Elimination {
  readonly base: number;
  /** m. */
  readonly columns: number;
  readonly matrices: number;
  /**
   * Takes the frame from matrix `first` (0-based) and empties the echelon form; rows of that matrix and of later ones can be
   * inserted then. Gives how many of its rows it takes until they are dependent: m + 1 if its first m are independent.
   */
  frame(first: number): number;
  /**
   * Inserts row r (0-based) of matrix j, reduced by those before it. Gives the last place (0-based, in the frame) that is not
   * zero in what is left of it, or -1 if nothing is. A row that the matrix does not have counts as zero.
   */
  insert(j: number, r: number): number;
  /** Takes out what was inserted last. */
  pop(): void;
  reset(): void;
}

/** Columns of a row in one word. */
const WORD = 31;

/** The largest number of columns: 31 in base 2, else what is below 2^53 points. */
export function mostColumns(base: number): number {
  return base === 2 ? WORD : Math.floor(Math.log(2 ** 53) / Math.log(base));
}

/**
 * Over GF(base), base a prime below 2^15, for the first `columns` columns and `depth` rows (at least `columns`) of the
 * matrices, entries 0...base - 1.
 */
export function elimination(
  base: number,
  columns: number,
  matrices: readonly Matrix[],
  depth = columns,
): Elimination {
  return base === 2 ? new Words(columns, matrices, depth) : new Digits(base, columns, matrices, depth);
}

class Words implements Elimination {
  readonly base = 2;
  readonly columns: number;
  readonly matrices: number;
  readonly #rows: Int32Array;
  readonly #framed: Int32Array;
  /** By place. */
  readonly #echelon = new Int32Array(32);
  readonly #places: number[] = [];
  /** Products of four bits at a time with the inverse of the frame. */
  readonly #products = new Int32Array(8 * 16);

  readonly #depth: number;

  constructor(columns: number, matrices: readonly Matrix[], depth: number) {
    this.#depth = depth;
    this.columns = columns;
    this.matrices = matrices.length;
    this.#rows = new Int32Array(matrices.length * depth);
    this.#framed = new Int32Array(matrices.length * depth);
    for (const [j, matrix] of matrices.entries()) {
      for (let r = 0; r < Math.min(depth, matrix.rows); r++) {
        let word = 0;
        for (let c = 0; c < columns; c++) word |= matrix.get(r, c) << c;
        this.#rows[j * depth + r] = word;
      }
    }
  }

  frame(first: number): number {
    const { columns } = this;
    const start = first * this.#depth;
    this.reset();
    // the frame's rows, then unit vectors that fill it up
    const chosen: number[] = [];
    let independent = 0;
    while (independent < columns && this.#reduce(this.#rows[start + independent] ?? 0) >= 0) {
      chosen.push(this.#rows[start + independent++] ?? 0);
    }
    for (let c = 0; c < columns && chosen.length < columns; c++) {
      if (this.#reduce(1 << c) >= 0) chosen.push(1 << c);
    }
    this.reset();
    const inverse = inverseWords(chosen);
    for (let part = 0; part < 8; part++) {
      for (let bits = 1; bits < 16; bits++) {
        const low = 31 - Math.clz32(bits & -bits);
        const rest = this.#products[part * 16 + (bits & (bits - 1))] ?? 0;
        this.#products[part * 16 + bits] = rest ^ (inverse[part * 4 + low] ?? 0);
      }
    }
    for (let at = start; at < this.#rows.length; at++) {
      let word = 0;
      for (let rest = this.#rows[at] ?? 0, part = 0; rest !== 0; rest >>>= 4, part += 16) {
        word ^= this.#products[part + (rest & 15)] ?? 0;
      }
      this.#framed[at] = word;
    }
    return independent + 1;
  }

  insert(j: number, r: number): number {
    return this.#reduce(r < this.#depth ? (this.#framed[j * this.#depth + r] ?? 0) : 0);
  }

  pop(): void {
    const place = this.#places.pop() ?? -1;
    if (place >= 0) this.#echelon[place] = 0;
  }

  reset(): void {
    this.#echelon.fill(0);
    this.#places.length = 0;
  }

  #reduce(row: number): number {
    let rest = row;
    let place = -1;
    while (rest !== 0) {
      place = 31 - Math.clz32(rest);
      const other = this.#echelon[place] ?? 0;
      if (other === 0) {
        this.#echelon[place] = rest;
        break;
      }
      rest ^= other;
      place = -1;
    }
    this.#places.push(place);
    return place;
  }
}

/** The inverse of a matrix over GF(2) whose rows are words, bit c column c. */
function inverseWords(rows: readonly number[]): number[] {
  const left = rows.slice();
  const right = rows.map((_, r) => 1 << r);
  for (let c = 0; c < rows.length; c++) {
    let pivot = c;
    while ((((left[pivot] ?? 0) >>> c) & 1) === 0) pivot++;
    for (const side of [left, right]) [side[c], side[pivot]] = [side[pivot] ?? 0, side[c] ?? 0];
    for (let r = 0; r < rows.length; r++) {
      if (r === c || (((left[r] ?? 0) >>> c) & 1) === 0) continue;
      left[r] = (left[r] ?? 0) ^ (left[c] ?? 0);
      right[r] = (right[r] ?? 0) ^ (right[c] ?? 0);
    }
  }
  return right;
}

class Digits implements Elimination {
  readonly base: number;
  readonly columns: number;
  readonly matrices: number;
  readonly #rows: Int32Array[][];
  #framed: Int32Array[][] = [];
  #first = 0;
  readonly #reciprocals: Int32Array;
  /** By place, the entry there made 1. */
  readonly #echelon: (Int32Array | null)[];
  readonly #places: number[] = [];

  constructor(base: number, columns: number, matrices: readonly Matrix[], depth: number) {
    this.base = base;
    this.columns = columns;
    this.matrices = matrices.length;
    this.#rows = matrices.map((matrix) =>
      Array.from({ length: depth }, (_, r) =>
        Int32Array.from({ length: columns }, (_, c) => (r < matrix.rows ? matrix.get(r, c) : 0)),
      ),
    );
    this.#reciprocals = reciprocals(base);
    this.#echelon = new Array<Int32Array | null>(columns).fill(null);
  }

  frame(first: number): number {
    const { columns } = this;
    this.reset();
    const chosen: Int32Array[] = [];
    const own = this.#rows[first] ?? [];
    for (const row of own.slice(0, columns)) {
      if (this.#reduce(row) < 0) break;
      chosen.push(row);
    }
    const independent = chosen.length;
    for (let c = 0; c < columns && chosen.length < columns; c++) {
      const unit = new Int32Array(columns);
      unit[c] = 1;
      if (this.#reduce(unit) >= 0) chosen.push(unit);
    }
    this.reset();
    const inverse = this.#inverse(chosen);
    this.#first = first;
    this.#framed = this.#rows.slice(first).map((rows) =>
      rows.map((row) => {
        const sum = new Int32Array(columns);
        for (const [c, entry] of row.entries()) this.#add(sum, inverse[c] ?? sum, entry);
        return sum;
      }),
    );
    return independent + 1;
  }

  insert(j: number, r: number): number {
    return this.#reduce(this.#framed[j - this.#first]?.[r] ?? new Int32Array(this.columns));
  }

  pop(): void {
    const place = this.#places.pop() ?? -1;
    if (place >= 0) this.#echelon[place] = null;
  }

  reset(): void {
    this.#echelon.fill(null);
    this.#places.length = 0;
  }

  #reduce(row: Int32Array): number {
    const rest = row.slice();
    let found = -1;
    for (let place = this.columns - 1; place >= 0 && found < 0; place--) {
      const entry = rest[place] ?? 0;
      if (entry === 0) continue;
      const other = this.#echelon[place] ?? null;
      if (other === null) {
        this.#scale(rest, this.#reciprocals[entry] ?? 0);
        this.#echelon[place] = rest;
        found = place;
      } else {
        this.#add(rest, other, this.base - entry);
      }
    }
    this.#places.push(found);
    return found;
  }

  #add(sum: Int32Array, row: Int32Array, times: number): void {
    if (times === 0) return;
    for (let c = 0; c < sum.length; c++) sum[c] = ((sum[c] ?? 0) + times * (row[c] ?? 0)) % this.base;
  }

  #scale(row: Int32Array, times: number): void {
    for (let c = 0; c < row.length; c++) row[c] = ((row[c] ?? 0) * times) % this.base;
  }

  #inverse(rows: readonly Int32Array[]): Int32Array[] {
    const size = rows.length;
    const left = rows.map((row) => row.slice());
    const right = rows.map((_, r) => Int32Array.from({ length: size }, (_, c) => (c === r ? 1 : 0)));
    for (let c = 0; c < size; c++) {
      const pivot = left.findIndex((row, r) => r >= c && row[c] !== 0);
      const factor = this.#reciprocals[left[pivot]?.[c] ?? 0] ?? 0;
      for (const side of [left, right]) {
        const chosen = side[pivot] ?? new Int32Array(size);
        side[pivot] = side[c] ?? chosen;
        side[c] = chosen;
        this.#scale(chosen, factor);
      }
      for (const [r, row] of left.entries()) {
        const entry = row[c] ?? 0;
        if (r === c || entry === 0) continue;
        this.#add(row, left[c] ?? row, this.base - entry);
        this.#add(right[r] ?? row, right[c] ?? row, this.base - entry);
      }
    }
    return right;
  }
}

/** 1/a modulo a prime, at a. */
function reciprocals(prime: number): Int32Array {
  const found = new Int32Array(prime);
  found[1] = 1;
  for (let a = 2; a < prime; a++) {
    found[a] = (prime - ((Math.floor(prime / a) * (found[prime % a] ?? 0)) % prime)) % prime;
  }
  return found;
}

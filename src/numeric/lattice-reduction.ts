/**
 * A lattice basis kept reduced in the sense of A. K. Lenstra, H. W. Lenstra and L. Lovász, "Factoring polynomials with
 * rational coefficients", Mathematische Annalen 261 (1982) 515-534, entirely in integers: instead of the Gram-Schmidt
 * coefficients mu_ij it holds lambda_ij = d_j mu_ij, d_j the Gram determinant of the first j rows (B. de Weger; H. Cohen, A
 * Course in Computational Algebraic Number Theory (1993), algorithm 2.6.7). No rounding anywhere, so what is derived from
 * it (enumeration bounds) rests on exact numbers; good for the few dozen dimensions of a lattice of tuples, and growing
 * by one row at a time, as the dual lattices of 2, 3, 4, ... coordinates do. Bad at: hundreds of dimensions.
 */

export type Row = readonly bigint[];

/** Lovász's condition with delta = 99/100. */
const [DELTA, DELTA_UNIT] = [99n, 100n];

/**
 * From this dimension on rows are inserted deeply too (C. P. Schnorr and M. Euchner, "Lattice basis reduction", Mathematical
 * Programming 66 (1994) 181-199): enumeration in 45 dimensions then takes a fraction of the steps; below 33 it costs more
 * than it saves.
 */
const DEEP_FROM = 33;
const DEEP_DELTA = 0.99;

export class ReducedBasis {
  readonly #rows: bigint[][] = [];
  /** #determinants[i] is the Gram determinant of the first i rows. */
  readonly #determinants: bigint[] = [1n];
  /** #lambda[i][j], j < i. */
  readonly #lambda: bigint[][] = [];

  get size(): number {
    return this.#rows.length;
  }

  get rows(): readonly Row[] {
    return this.#rows;
  }

  /** Adds a row of one more coordinate than the lattice had, independent of the others, and reduces. */
  append(row: Row): void {
    for (const old of this.#rows) old.push(0n);
    this.#rows.push([...row]);
    this.#orthogonalise(this.#rows.length - 1);
    this.#reduce(this.#rows.length - 1);
    if (this.size >= DEEP_FROM) this.#insertDeeply();
  }

  /** Squared length of b*_i and the coefficients mu_ij, as doubles within 2 ulp, row after row. */
  orthogonal(): { lengths: Float64Array; mu: Float64Array } {
    const size = this.size;
    const lengths = new Float64Array(size);
    const mu = new Float64Array(size * size);
    for (let i = 0; i < size; i++) {
      lengths[i] = ratio(this.#d(i + 1), this.#d(i));
      for (let j = 0; j < i; j++) mu[i * size + j] = ratio(this.#l(i, j), this.#d(j + 1));
    }
    return { lengths, mu };
  }

  /** The vector sum x_i b_i. */
  vector(x: ArrayLike<number>): bigint[] {
    const sum = this.#rows.map(() => 0n);
    this.#rows.forEach((row, i) => {
      const weight = BigInt(x[i] ?? 0);
      if (weight !== 0n) row.forEach((entry, j) => (sum[j] = (sum[j] ?? 0n) + weight * entry));
    });
    return sum;
  }

  #d(i: number): bigint {
    return this.#determinants[i] ?? 0n;
  }

  #l(i: number, j: number): bigint {
    return this.#lambda[i]?.[j] ?? 0n;
  }

  /** lambda and d of row k, from the rows before it. */
  #orthogonalise(k: number): void {
    const row = this.#rows[k] ?? [];
    const lambda: bigint[] = [];
    for (let j = 0; j <= k; j++) {
      let u = dot(row, this.#rows[j] ?? []);
      for (let i = 0; i < j; i++) {
        u =
          (this.#d(i + 1) * u - (lambda[i] ?? 0n) * (j === k ? (lambda[i] ?? 0n) : this.#l(j, i))) /
          this.#d(i);
      }
      if (j < k) lambda.push(u);
      else this.#determinants[k + 1] = u;
    }
    this.#lambda[k] = lambda;
  }

  /** Rows before `from` are reduced; makes all of them so. */
  #reduce(from: number): void {
    for (let k = Math.max(1, from); k < this.size;) {
      this.#shorten(k, k - 1);
      if (this.#lovasz(k)) {
        for (let l = k - 2; l >= 0; l--) this.#shorten(k, l);
        k++;
      } else {
        this.#swap(k);
        k = Math.max(1, k - 1);
      }
    }
  }

  /** Moves each row to the first place at which it is shorter than what stands there, orthogonal to the rows before it. */
  #insertDeeply(): void {
    for (let k = 1; k < this.size;) {
      for (let l = k - 1; l >= 0; l--) this.#shorten(k, l);
      const place = this.#placeOf(k);
      for (let j = k; j > place; j--) this.#swap(j);
      k = place === k ? k + 1 : Math.max(1, place);
    }
  }

  /** In doubles: which place is taken decides how good the basis is, never whether it is one. */
  #placeOf(k: number): number {
    const row = this.#rows[k] ?? [];
    let rest = Number(dot(row, row));
    for (let i = 0; i < k; i++) {
      const length = ratio(this.#d(i + 1), this.#d(i));
      if (rest < DEEP_DELTA * length) return i;
      rest -= ratio(this.#l(k, i), this.#d(i + 1)) ** 2 * length;
    }
    return k;
  }

  #lovasz(k: number): boolean {
    const [before, middle, after] = [this.#d(k - 1), this.#d(k), this.#d(k + 1)];
    const lambda = this.#l(k, k - 1);
    return DELTA_UNIT * (after * before + lambda * lambda) >= DELTA * middle * middle;
  }

  /** b_k <- b_k - round(mu_kl) b_l. */
  #shorten(k: number, l: number): void {
    const unit = this.#d(l + 1);
    const [lambda, lower] = [this.#lambda[k] ?? [], this.#lambda[l] ?? []];
    const value = lambda[l] ?? 0n;
    if (2n * (value < 0n ? -value : value) <= unit) return;
    const q = roundedQuotient(value, unit);
    subtract(this.#rows[k] ?? [], q, this.#rows[l] ?? []);
    subtract(lambda, q, lower);
    lambda[l] = value - q * unit;
  }

  /** Exchanges rows k and k - 1. */
  #swap(k: number): void {
    const [upper, lower] = [this.#rows[k - 1] ?? [], this.#rows[k] ?? []];
    [this.#rows[k - 1], this.#rows[k]] = [lower, upper];
    const [before, middle, after] = [this.#d(k - 1), this.#d(k), this.#d(k + 1)];
    const [lambdaUpper, lambdaLower] = [this.#lambda[k - 1] ?? [], this.#lambda[k] ?? []];
    const lambda = lambdaLower[k - 1] ?? 0n;
    this.#lambda[k - 1] = lambdaLower.slice(0, k - 1);
    this.#lambda[k] = [...lambdaUpper, lambda];
    const exchanged = (before * after + lambda * lambda) / middle;
    for (let i = k + 1; i < this.size; i++) {
      const row = this.#lambda[i] ?? [];
      const [p, q] = [row[k - 1] ?? 0n, row[k] ?? 0n];
      const lowerOne = (after * p - lambda * q) / middle;
      row[k] = lowerOne;
      row[k - 1] = (exchanged * q + lambda * lowerOne) / after;
    }
    this.#determinants[k] = exchanged;
  }
}

export function dot(a: Row, b: Row): bigint {
  let sum = 0n;
  for (let j = 0; j < a.length; j++) sum += (a[j] ?? 0n) * (b[j] ?? 0n);
  return sum;
}

/** row <- row - q other, as far as `other` reaches. */
function subtract(row: bigint[], q: bigint, other: Row): void {
  for (let j = 0; j < other.length; j++) row[j] = (row[j] ?? 0n) - q * (other[j] ?? 0n);
}

/** The whole number nearest to a / b, b above 0. */
function roundedQuotient(a: bigint, b: bigint): bigint {
  const twice = 2n * a + b;
  const quotient = twice / (2n * b);
  return twice < 0n && quotient * 2n * b !== twice ? quotient - 1n : quotient;
}

/** Largest power of two that a double may hold without becoming infinite on the way. */
const LARGEST_BITS = 1000;

/** a / b as a double, b above 0, however long they are. */
function ratio(a: bigint, b: bigint): number {
  const [x, y] = [Number(a), Number(b)];
  if (Number.isFinite(x) && Number.isFinite(y)) return x / y;
  // 64 bits of the quotient, and the power of two beside it
  const size = (value: bigint): number => (value < 0n ? -value : value).toString(2).length;
  const shift = size(a) - size(b) - 64;
  const quotient = shift >= 0 ? a / (b << BigInt(shift)) : (a << BigInt(-shift)) / b;
  const scale = Math.min(Math.max(shift, -LARGEST_BITS), LARGEST_BITS);
  return Number(quotient) * 2 ** scale;
}

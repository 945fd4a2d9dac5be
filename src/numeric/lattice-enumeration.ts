/**
 * All shortest vectors of a lattice, in the Euclidean norm or in the sum of absolute values, by enumeration: U. Fincke
 * and M. Pohst, "Improved methods for calculating vectors of short length in a lattice", Mathematics of Computation 44
 * (1985) 463-471, candidates of a coordinate from the centre outwards as C. P. Schnorr and M. Euchner, "Lattice basis
 * reduction", Mathematical Programming 66 (1994) 181-199, partial sums kept as N. Gama, P. Q. Nguyen and O. Regev, "Lattice
 * enumeration using extreme pruning", EUROCRYPT (2010), do. Nothing is cut that a proof does not allow:
 *
 * - Let y be the part of v orthogonal to the first k rows. |v|_2 >= |y|_2, and with w = y / |y|_inf by Hölder
 *   |v|_1 >= w.v = |y|_2^2 / |y|_inf (M. Kaib and H. Ritter, "Block reduction for arbitrary norms" (1994)). Going on in the
 *   same direction from the centre only raises w.v, so what cuts one candidate cuts those behind it.
 * - Gram-Schmidt numbers come from exact integers; centres of coordinates are off by less than `SLACK` as long as
 *   coordinates stay below 2^15 (48 terms of relative error 2^-51), and distances are taken as that much shorter. Every
 *   vector that is reported has been computed, and its length compared, in integers.
 */
import { dot, type ReducedBasis, type Row } from "./lattice-reduction.js";

export type Norm = "squared-length" | "absolute-sum";

export interface ShortVectors {
  /** Squared Euclidean length, or sum of absolute values. */
  readonly norm: bigint;
  /**
   * Vectors of this norm up to their sign (the first non-zero entry is positive), in lexicographic order from above. In the
   * Euclidean norm all of them; in the sum of absolute values one, of both signs if there is such a one.
   */
  readonly vectors: readonly Row[];
  /** False where the bound on steps was reached: there may be shorter ones, or others of this norm. */
  readonly complete: boolean;
  readonly steps: number;
}

const SLACK = 1e-9;
const LARGEST_COORDINATE = 2 ** 15;
/** Rounding of sums of squares; far above 48 additions of doubles. */
const RELATIVE_SLACK = 1 + 1e-6;
/** Vectors of the least norm that are kept: more than any lattice of tuples was seen to have. */
const MOST_VECTORS = 4096;

export function absoluteSum(v: Row): bigint {
  return v.reduce((sum, entry) => sum + (entry < 0n ? -entry : entry), 0n);
}

/** Whether there are entries of both signs. */
export function isMixed(v: Row): boolean {
  return v.some((entry) => entry > 0n) && v.some((entry) => entry < 0n);
}

/**
 * The shortest vectors of a reduced basis. Candidates of coordinates are counted as steps, at most `limit` of them. `known`
 * are vectors of the lattice that may be short: the search begins with the best of them and of the basis.
 */
export function shortestVectors(
  basis: ReducedBasis,
  norm: Norm,
  limit: number,
  known: readonly Row[] = [],
): ShortVectors {
  const shortest = norm === "squared-length" ? new AllShortest() : new OneShortest(basis);
  for (const row of [...basis.rows, ...known]) shortest.offer(row);
  const search = new Search(basis, norm, shortest);
  const complete = search.run(limit) && shortest.all;
  return { norm: shortest.norm ?? 0n, vectors: shortest.sorted(), complete, steps: search.steps };
}

/** What the search has found so far. */
interface Found {
  readonly norm: bigint | null;
  /** The largest norm that is still of interest. */
  readonly wanted: bigint;
  /** False where vectors were left out. */
  readonly all: boolean;
  /** Takes a vector other than 0; whether that lowers `wanted`. */
  offer(vector: Row): boolean;
  sorted(): Row[];
}

/** All vectors of the least squared length. */
class AllShortest implements Found {
  #found = new Map<string, Row>();
  norm: bigint | null = null;
  all = true;

  get wanted(): bigint {
    return this.norm ?? 0n;
  }

  offer(vector: Row): boolean {
    const norm = dot(vector, vector);
    if (this.norm !== null && norm > this.norm) return false;
    const shorter = norm !== this.norm;
    if (shorter) {
      this.norm = norm;
      this.#found = new Map();
      this.all = true;
    }
    const v = normalised(vector);
    if (this.#found.size < MOST_VECTORS) this.#found.set(v.join(), v);
    else this.all = false;
    return shorter;
  }

  sorted(): Row[] {
    return [...this.#found.values()].sort((a, b) => {
      const j = a.findIndex((entry, i) => entry !== b[i]);
      return (a[j] ?? 0n) > (b[j] ?? 0n) ? -1 : 1;
    });
  }
}

/** One vector of the least sum of absolute values; among equals one of both signs, which meets one plane fewer. */
class OneShortest implements Found {
  /** The step between sums that occur: 2 where all are even, since parity is additive. */
  readonly #step: bigint;
  #found: Row | null = null;
  norm: bigint | null = null;
  readonly all = true;

  constructor({ rows }: ReducedBasis) {
    this.#step = rows.every((row) => absoluteSum(row) % 2n === 0n) ? 2n : 1n;
  }

  get wanted(): bigint {
    const norm = this.norm ?? 0n;
    return this.#found !== null && isMixed(this.#found) ? norm - this.#step : norm;
  }

  offer(vector: Row): boolean {
    const norm = absoluteSum(vector);
    const better =
      this.#found === null ||
      this.norm === null ||
      norm < this.norm ||
      (norm === this.norm && isMixed(vector) && !isMixed(this.#found));
    if (!better) return false;
    this.norm = norm;
    this.#found = normalised(vector);
    return true;
  }

  sorted(): Row[] {
    return this.#found === null ? [] : [this.#found];
  }
}

function normalised(v: Row): Row {
  const first = v.find((entry) => entry !== 0n) ?? 0n;
  return first < 0n ? v.map((entry) => -entry) : [...v];
}

class Search {
  readonly #basis: ReducedBasis;
  readonly #shortest: Found;
  readonly #size: number;
  readonly #lengths: Float64Array;
  /** mu_jk at k * size + j. */
  readonly #mu: Float64Array;
  /** What offsets below `SLACK` can add to a sum of absolute values: sqrt(t) SLACK (|b*_1| + ... + |b*_t|). */
  readonly #leftOut: number;
  /** Rows b*_k; null for the Euclidean norm, which needs only their lengths. */
  readonly #star: Float64Array | null;
  readonly #x: Float64Array;
  readonly #centre: Float64Array;
  /** Next candidates on both sides of the centre; not finite where a side is done. */
  readonly #low: Float64Array;
  readonly #high: Float64Array;
  /** Squared length (in the Euclidean norm a lower bound of it) of the part orthogonal to the first k rows. */
  readonly #rho: Float64Array;
  /** That part itself, at k * size. */
  readonly #part: Float64Array;
  /** Partial sums of x_j mu_jk over j' >= j, at k * (size + 1) + j; those up to #stale[k] are out of date. */
  readonly #sums: Float64Array;
  readonly #stale: Int32Array;
  /** Largest norm that is still of interest: squared length, or sum of absolute values. */
  #bound = 0;
  steps = 0;

  constructor(basis: ReducedBasis, norm: Norm, shortest: Found) {
    const { lengths, mu } = basis.orthogonal();
    const size = basis.size;
    this.#basis = basis;
    this.#shortest = shortest;
    this.#size = size;
    this.#lengths = lengths;
    this.#mu = Float64Array.from(mu, (_, at) => mu[(at % size) * size + Math.floor(at / size)] ?? 0);
    this.#star = norm === "absolute-sum" ? orthogonalRows(basis, mu) : null;
    this.#leftOut = SLACK * Math.sqrt(size) * lengths.reduce((sum, length) => sum + Math.sqrt(length), 0);
    this.#x = new Float64Array(size);
    this.#centre = new Float64Array(size);
    this.#low = new Float64Array(size);
    this.#high = new Float64Array(size);
    this.#rho = new Float64Array(size + 1);
    this.#part = new Float64Array((size + 1) * size);
    this.#sums = new Float64Array(size * (size + 1));
    this.#stale = new Int32Array(size + 1);
    this.#tighten();
  }

  /** Looks at everything within the bound; false where it stopped before. */
  run(limit: number): boolean {
    const [x, low, high, centre] = [this.#x, this.#low, this.#high, this.#centre];
    let k = this.#size - 1;
    /** Coordinates from here on are all 0: of v and -v only one is looked at. */
    let zerosFrom = this.#size;
    this.#open(k, true);
    while (k < this.#size) {
      const [below, above, c] = [low[k] as number, high[k] as number, centre[k] as number];
      const up = above - c <= c - below;
      const value = up ? above : below;
      if (!Number.isFinite(value)) {
        k++;
        continue;
      }
      if (++this.steps > limit || Math.abs(value) > LARGEST_COORDINATE) return false;
      x[k] = value;
      if (up) high[k] = value + 1;
      else low[k] = value - 1;
      if (!this.#within(k)) {
        if (up) high[k] = Infinity;
        else low[k] = -Infinity;
        continue;
      }
      if (zerosFrom === k + 1 && value === 0) zerosFrom = k;
      else if (zerosFrom <= k) zerosFrom = value === 0 ? zerosFrom : k + 1;
      if (k > 0) {
        k--;
        this.#open(k, zerosFrom === k + 1);
      } else if (zerosFrom > 0 && this.#shortest.offer(this.#basis.vector(x))) this.#tighten();
    }
    return true;
  }

  #tighten(): void {
    this.#bound = Number(this.#shortest.wanted) * RELATIVE_SLACK;
  }

  /** Sets coordinate k to its centre; `half` where only values from 0 on are wanted. */
  #open(k: number, half: boolean): void {
    const [sums, mu, x, stale, size] = [this.#sums, this.#mu, this.#x, this.#stale, this.#size];
    const base = k * (size + 1);
    const from = Math.max(stale[k] as number, Math.min(k + 1, size - 1));
    for (let j = from; j > k; j--) {
      sums[base + j] = (sums[base + j + 1] as number) + (x[j] as number) * (mu[k * size + j] as number);
    }
    if (k > 0) stale[k - 1] = Math.max(stale[k - 1] as number, from);
    stale[k] = 0;
    const centre = k + 1 < size ? -(sums[base + k + 1] as number) : 0;
    // upwards from the centre and downwards from below it: a cut of one candidate holds for those that lie behind it
    const above = half ? 0 : Math.ceil(centre);
    this.#centre[k] = half ? 0 : centre;
    this.#high[k] = above;
    this.#low[k] = half ? -Infinity : above - 1;
  }

  /** Whether the coordinates from k on leave hope. */
  #within(k: number): boolean {
    const offset = (this.#x[k] as number) - (this.#centre[k] as number);
    const distance = Math.max(0, Math.abs(offset) - SLACK);
    const [rho, length] = [this.#rho, this.#lengths[k] as number];
    const star = this.#star;
    if (star === null) {
      const sum = (rho[k + 1] as number) + distance * distance * length;
      rho[k] = sum;
      return sum <= this.#bound;
    }
    const sum = (rho[k + 1] as number) + distance * Math.abs(offset) * length;
    rho[k] = sum;
    const [part, size] = [this.#part, this.#size];
    // an offset that may be all rounding stays out of y, so that it cannot mislead w
    const weight = distance > 0 ? offset : 0;
    let [largest, total] = [0, 0];
    for (let j = 0; j < size; j++) {
      const entry = (part[(k + 1) * size + j] as number) + weight * (star[k * size + j] as number);
      part[k * size + j] = entry;
      largest = Math.max(largest, Math.abs(entry));
      total += Math.abs(entry);
    }
    // with no row left, y is v but for offsets that were left out
    if (k === 0 && total > this.#bound + this.#leftOut) return false;
    return sum <= this.#bound * largest || sum === 0;
  }
}

/** Rows b*_k as doubles. */
function orthogonalRows({ rows, size }: ReducedBasis, mu: Float64Array): Float64Array {
  const star = new Float64Array(size * size);
  rows.forEach((row, i) => {
    for (let c = 0; c < size; c++) {
      let entry = Number(row[c] ?? 0n);
      for (let j = 0; j < i; j++) entry -= (mu[i * size + j] as number) * (star[j * size + c] as number);
      star[i * size + c] = entry;
    }
  });
  return star;
}

/**
 * Equidistribution of generators that are linear over GF(2): the largest t for which the top v bits of t outputs take
 * all values equally often over all states, k(v), for every v. It is at most k*(v) = floor(k / v) for k bits
 * of state; their difference is the dimension gap, and a generator without gaps is maximally equidistributed (P. L'Ecuyer,
 * "Maximally equidistributed combined Tausworthe generators", Mathematics of Computation 65 (1996) 203-213).
 *
 * Outputs as power series over GF(2) generate, with the unit vectors, a lattice of v-tuples of series over the polynomials,
 * and k(v) is what its last successive minimum says (R. Couture and P. L'Ecuyer, "Lattice computations for random numbers",
 * Mathematics of Computation 69 (2000) 757-765). A reduced basis for v bits, cut to v - 1, generates the lattice for
 * v - 1, so one goes from all bits downwards (S. Harase, M. Matsumoto and M. Saito, "Fast lattice reduction for
 * F2-linear pseudorandom number generators", ibid. 80 (2011) 395-407). A basis vector is held as the power of z where it
 * begins, its first coefficients, and the state behind them; a state is f(T) x, f a polynomial modulo the characteristic one
 * and x any state that all others come from. So nothing is needed of a generator but 2 k of its outputs.
 *
 * Good for: states of up to some 20,000 bits, in seconds. Not for: generators whose outputs are not linear (a sum or a
 * product of words), or whose bits are registers of their own.
 */
import { berlekampMassey } from "../numeric/gf2-polynomial.js";

export interface Equidistribution {
  /** k(v), v = 1, 2, ...: dimension of equidistribution of the top v bits. */
  readonly dimensions: readonly number[];
  /** k*(v) - k(v). */
  readonly gaps: readonly number[];
}

/** A basis vector: z^-at (first + z^-1 out(rest) + z^-2 out(z rest) + ...). */
interface Vector {
  at: number;
  /** First coefficients as bits, the top output bit first; two halves of 32. */
  high: number;
  low: number;
  /** The state behind them, as a polynomial. */
  readonly rest: Uint32Array;
}

/**
 * `outputs` are 2 `stateBits` or more successive outputs of `width` bits (at most 64). Null where the generator does not run
 * through its whole state space by one recurrence of `stateBits` terms, as far as single bits show.
 */
export function equidistribution(
  outputs: readonly bigint[],
  width: number,
  stateBits: number,
): Equidistribution | null {
  const polynomial = characteristic(outputs, width, stateBits);
  if (polynomial === null) return null;
  const lattice = new SeriesLattice(outputs, width, stateBits, polynomial);
  const dimensions: number[] = [];
  for (let v = width; v >= 1; v--) {
    dimensions.unshift(lattice.least());
    lattice.drop();
  }
  const gaps = dimensions.map((t, k) => Math.floor(stateBits / (k + 1)) - t);
  return { dimensions, gaps };
}

/** The characteristic polynomial, from the first bit that has all of it. */
function characteristic(outputs: readonly bigint[], width: number, stateBits: number): bigint | null {
  for (let bit = width - 1; bit >= 0; bit--) {
    const shift = BigInt(bit);
    const bits = outputs.slice(0, 2 * stateBits).map((word) => ((word >> shift) & 1n ? 1 : 0));
    const polynomial = berlekampMassey(bits);
    if (polynomial >> BigInt(stateBits) === 1n) return polynomial;
  }
  return null;
}

class SeriesLattice {
  readonly #stateBits: number;
  readonly #words: number;
  /** The characteristic polynomial without its leading term. */
  readonly #polynomial: Uint32Array;
  /** Bit j of #sequences[i] is bit i (top first) of output j. */
  readonly #sequences: readonly Uint32Array[];
  #width: number;
  /** Reduced basis: the vector whose first coefficients begin with bit i stands at i. */
  readonly #basis: (Vector | null)[];

  constructor(outputs: readonly bigint[], width: number, stateBits: number, polynomial: bigint) {
    this.#stateBits = stateBits;
    this.#words = (stateBits + 31) >>> 5;
    this.#polynomial = packed(polynomial, this.#words);
    this.#sequences = Array.from({ length: width }, (_, i) => this.#sequence(outputs, width - 1 - i));
    this.#width = width;
    this.#basis = Array.from({ length: width }, (_, i) => ({
      at: 0,
      ...unit(i),
      rest: new Uint32Array(this.#words),
    }));
    const rest = new Uint32Array(this.#words);
    rest[0] = 1;
    this.#insert({ at: 0, high: 0, low: 0, rest });
  }

  /** The least power among the basis, which is k(v) for the v bits that are left. */
  least(): number {
    return this.#basis.reduce((least, vector) => Math.min(least, vector?.at ?? Infinity), Infinity);
  }

  /** Leaves out the lowest of the bits. */
  drop(): void {
    const last = --this.#width;
    const vector = this.#basis.pop() ?? null;
    const { high, low } = unit(last);
    for (const other of this.#basis) {
      if (other === null) continue;
      other.high &= ~high;
      other.low &= ~low;
    }
    if (vector === null || last === 0) return;
    vector.high = 0;
    vector.low = 0;
    this.#insert(vector);
  }

  /** Reduces a vector of the lattice against the basis; it ends as 0, and another may stand in its place. */
  #insert(start: Vector): void {
    let vector = start;
    let zeros = 0;
    for (;;) {
      const bit = topBit(vector);
      if (bit < 0) {
        // a state that shows in none of the bits has as many zeros as the recurrence has terms
        if (zeros++ > this.#stateBits || vector.rest.every((word) => word === 0)) return;
        this.#advance(vector);
        continue;
      }
      zeros = 0;
      const other = this.#basis[bit];
      if (other === undefined || other === null) {
        this.#basis[bit] = vector;
        return;
      }
      // a vector is reduced by one that begins at the same power or later, times a power of z
      if (other.at < vector.at) {
        this.#basis[bit] = vector;
        add(other, vector);
        vector = other;
      } else add(vector, other);
    }
  }

  /** Takes the next coefficients in place of the first ones, which are 0. */
  #advance(vector: Vector): void {
    const { rest } = vector;
    let [high, low] = [0, 0];
    for (let i = 0; i < this.#width; i++) {
      const sequence = this.#sequences[i] as Uint32Array;
      let sum = 0;
      for (let w = 0; w < rest.length; w++) sum ^= (rest[w] as number) & (sequence[w] as number);
      if (!oddBits(sum)) continue;
      const one = unit(i);
      high |= one.high;
      low |= one.low;
    }
    vector.at++;
    vector.high = high;
    vector.low = low;
    this.#timesZ(rest);
  }

  #timesZ(f: Uint32Array): void {
    const top = (this.#stateBits - 1) & 31;
    const carry = ((f[this.#words - 1] as number) >>> top) & 1;
    for (let w = this.#words - 1; w > 0; w--) {
      f[w] = ((f[w] as number) << 1) | ((f[w - 1] as number) >>> 31);
    }
    f[0] = (f[0] as number) << 1;
    // the bit at z^k goes out with the characteristic polynomial
    if (top < 31) f[this.#words - 1] = (f[this.#words - 1] as number) & (2 ** (top + 1) - 1);
    if (carry === 0) return;
    for (let w = 0; w < this.#words; w++) f[w] = (f[w] as number) ^ (this.#polynomial[w] as number);
  }

  #sequence(outputs: readonly bigint[], bit: number): Uint32Array {
    const words = new Uint32Array(this.#words);
    const shift = BigInt(bit);
    for (let j = 0; j < this.#stateBits; j++) {
      if (((outputs[j] ?? 0n) >> shift) & 1n) words[j >>> 5] = (words[j >>> 5] as number) | (1 << (j & 31));
    }
    return words;
  }
}

function add(vector: Vector, other: Vector): void {
  vector.high ^= other.high;
  vector.low ^= other.low;
  const [to, from] = [vector.rest, other.rest];
  for (let w = 0; w < to.length; w++) to[w] = (to[w] as number) ^ (from[w] as number);
}

/** Bit i of the coefficients alone. */
function unit(i: number): { high: number; low: number } {
  return i < 32 ? { high: 1 << (31 - i), low: 0 } : { high: 0, low: 1 << (63 - i) };
}

/** Index of the first set bit; -1 for none. */
function topBit({ high, low }: Vector): number {
  if (high !== 0) return Math.clz32(high);
  return low === 0 ? -1 : 32 + Math.clz32(low);
}

function oddBits(word: number): boolean {
  let x = word;
  x ^= x >>> 16;
  x ^= x >>> 8;
  x ^= x >>> 4;
  return ((0x6996 >>> (x & 15)) & 1) === 1;
}

/** The lowest words of a number. */
function packed(value: bigint, words: number): Uint32Array {
  return Uint32Array.from({ length: words }, (_, w) => Number((value >> BigInt(32 * w)) & 0xffffffffn));
}

/**
 * The quality of a rank-1 lattice {k z / n} with dual {h : h.z = 0 mod n} (I. H. Sloan and S. Joe, "Lattice Methods for Multiple
 * Integration", Oxford, 1994):
 *
 * - P_alpha, the sum over the dual without 0 of the product of max(1, |h_j|)^-alpha: the error for the worst periodic function
 *   whose Fourier coefficients are bounded by these. alpha = 2, 4, 6 from Bernoulli polynomials, O(n d), in arithmetic of some
 *   31 digits, since the sum over points is a small difference of numbers near 1.
 * - Zaremba's index rho, the least product of max(1, |h_j|) over the dual without 0 (S. K. Zaremba, Annali di Matematica Pura
 *   ed Applicata 73 (1966) 293-317): from continued fractions in two dimensions, else by bounded enumeration.
 */
import { add, divide, fromNumber, multiply, PI, type DoubleDouble } from "../numeric/double-double.js";

export interface RankOne {
  readonly n: number;
  /** Each from 0 to n - 1. */
  readonly z: readonly number[];
}

/** Products of two residues stay exact below this. */
export const LARGEST_LATTICE = 2 ** 26;

/** Points times coordinates for P_alpha: about a second. */
const LARGEST_WORK = 2 ** 25;

/** Throws RangeError for n out of range or a component that is none of 0...n - 1. */
export function rankOne(n: number, z: readonly number[]): RankOne {
  if (!(Number.isInteger(n) && n >= 1 && n <= LARGEST_LATTICE)) {
    throw new RangeError(
      `n: expected a whole number from 1 to 2^26 for the quality of a lattice, found ${n}`,
    );
  }
  for (const [j, component] of z.entries()) {
    if (Number.isInteger(component) && component >= 0 && component < n) continue;
    throw new RangeError(`vector[${j + 1}]: expected a whole number from 0 to ${n - 1}, found ${component}`);
  }
  return { n, z };
}

/** Up to this dimension P_2, at most (1 + pi^2 / 3)^d, is a double with room for the splitting of products. */
const LARGEST_DIMENSION = 470;

/** In how many dimensions P_alpha of n points takes a second or so at most, and stays a double. */
export function pAlphaDimensions(n: number): number {
  return Math.min(LARGEST_DIMENSION, Math.floor(LARGEST_WORK / n));
}

/**
 * P_2, P_4 and P_6 for the first 1, 2, ... coordinates: three values for each number of coordinates. `only: true` counts only
 * the vectors of the dual without a zero component, the share of that projection itself.
 */
export function pAlpha({ n, z }: RankOne, only = false): { P2: number; P4: number; P6: number }[] {
  const [P2, P4, P6] = ([2, 4, 6] as const).map((alpha) => {
    const kernel = bernoulliKernel(alpha, n);
    const high = new Float64Array(n).fill(1);
    const low = new Float64Array(n);
    return z.map((step) => {
      let total = fromNumber(0);
      for (let k = 0, r = 0; k < n; k++) {
        const term = kernel[r] ?? fromNumber(NaN);
        const factor = only ? term : add(term, fromNumber(1));
        const product = multiply({ high: high[k] ?? NaN, low: low[k] ?? NaN }, factor);
        high[k] = product.high;
        low[k] = product.low;
        total = add(total, product);
        r += step;
        if (r >= n) r -= n;
      }
      const mean = divide(total, fromNumber(n));
      return only ? mean.high : add(mean, fromNumber(-1)).high;
    });
  });
  return z.map((_, j) => ({ P2: P2?.[j] ?? NaN, P4: P4?.[j] ?? NaN, P6: P6?.[j] ?? NaN }));
}

/** c_alpha B_alpha(r / n) for r = 0...n - 1: c_2 = 2 pi^2, c_4 = -(2 pi)^4 / 24, c_6 = (2 pi)^6 / 720. */
function bernoulliKernel(alpha: 2 | 4 | 6, n: number): DoubleDouble[] {
  const twoPi = multiply(PI, fromNumber(2));
  const square = multiply(twoPi, twoPi);
  const half = divide(square, fromNumber(2));
  const fourth = divide(multiply(square, square), fromNumber(-24));
  const sixth = divide(multiply(multiply(square, square), square), fromNumber(720));
  const fraction = (a: number, b: number): DoubleDouble => divide(fromNumber(a), fromNumber(b));
  return Array.from({ length: n }, (_, r) => {
    // B_2 = 1/6 - y, B_4 = y^2 - 1/30, B_6 = 1/42 - y^2 / 2 - y^3 with y = x (1 - x)
    const y = multiply(fraction(r, n), fraction(n - r, n));
    const ySquare = multiply(y, y);
    if (alpha === 2) return multiply(half, add(fraction(1, 6), multiply(y, fromNumber(-1))));
    if (alpha === 4) return multiply(fourth, add(ySquare, fraction(-1, 30)));
    const cube = multiply(ySquare, y);
    const rest = add(multiply(ySquare, fromNumber(-0.5)), multiply(cube, fromNumber(-1)));
    return multiply(sixth, add(fraction(1, 42), rest));
  });
}

export interface Zaremba {
  readonly rho: number;
  /** A vector that has it. */
  readonly vector: readonly number[];
  /** False where the enumeration was cut short: rho is then at most this. */
  readonly complete: boolean;
}

/** Vectors tried at most: about a second. */
export const ZAREMBA_STEPS = 2 ** 24;

/** Zaremba's index of a lattice. */
export function zarembaIndex({ n, z }: RankOne, steps = ZAREMBA_STEPS): Zaremba {
  const d = z.length;
  // the component that the others determine: the one with the fewest common factors with n
  const solved = z.reduce((best, component, j) => (gcd(component, n) < gcd(z[best] ?? 0, n) ? j : best), 0);
  const divisor = gcd(z[solved] ?? 0, n);
  const modulus = n / divisor;
  const inverse = inverseModulo((z[solved] ?? 0) / divisor, modulus);
  const others = z.flatMap((_, j) => (j === solved ? [] : [j]));

  let rho = modulus;
  let vector = z.map((_, j) => (j === solved ? modulus : 0));
  // pairs first: they bound the rest
  for (let i = 0; i < d; i++) {
    for (let j = i + 1; j < d; j++) {
      const pair = zarembaPair(n, z[i] ?? 0, z[j] ?? 0);
      if (pair.rho >= rho) continue;
      rho = pair.rho;
      vector = z.map((_, at) => (at === i ? pair.vector[0] : at === j ? pair.vector[1] : 0));
    }
  }

  let left = steps;
  const h = new Array<number>(d).fill(0);
  /** Vectors whose further non-zero components come from others[from], ...; false where the steps ran out. */
  const visit = (from: number, product: number, sum: number): boolean => {
    for (let at = from; at < others.length; at++) {
      const j = others[at] ?? 0;
      const component = z[j] ?? 0;
      for (let size = 1; product * size < rho; size++) {
        // a vector and its negative are the same: the first component is positive
        for (const sign of product === 1 && sum === 0 && isZero(h) ? [1] : [1, -1]) {
          if (--left < 0) return false;
          h[j] = sign * size;
          const next = (((sum + sign * size * component) % n) + n) % n;
          if (next % divisor === 0) {
            const residue = (modulus - ((((next / divisor) % modulus) * inverse) % modulus)) % modulus;
            const last = 2 * residue > modulus ? residue - modulus : residue;
            const value = product * size * Math.max(1, Math.abs(last));
            if (value < rho) {
              rho = value;
              vector = h.map((entry, i) => (i === solved ? last : entry));
            }
          }
          if (!visit(at + 1, product * size, next)) return false;
        }
      }
      h[j] = 0;
    }
    return true;
  };
  return { complete: visit(0, 1, 0), rho, vector };
}

function isZero(h: readonly number[]): boolean {
  return h.every((entry) => entry === 0);
}

/**
 * Zaremba's index of two coordinates: with h_2 = step t the least |h_1| is the distance of t c / m to the nearest whole number,
 * times m, and the smallest products stand at the convergents of c / m (Zaremba 1966).
 */
export function zarembaPair(
  n: number,
  first: number,
  second: number,
): { rho: number; vector: [number, number] } {
  const divisor = gcd(first, n);
  const modulus = n / divisor;
  const step = divisor / gcd(divisor, second);
  const c = (((step * second) / divisor) % modulus) * inverseModulo(first / divisor, modulus);
  let best: { rho: number; vector: [number, number] } = { rho: modulus, vector: [modulus, 0] };
  // denominators q of the convergents of (c mod m) / m, q = m with distance 0 the last
  let [numerator, denominator] = [c % modulus, modulus];
  let [before, q] = [0, 1];
  for (;;) {
    let h1 = modulus - ((q * (c % modulus)) % modulus);
    if (2 * h1 > modulus) h1 -= modulus;
    if (q % modulus === 0) h1 = 0;
    const h2 = q * step;
    const rho = Math.max(1, Math.abs(h1)) * h2;
    if (rho < best.rho) best = { rho, vector: [h1, h2] };
    if (numerator === 0) return best;
    const quotient = Math.floor(denominator / numerator);
    [numerator, denominator] = [denominator % numerator, numerator];
    [before, q] = [q, quotient * q + before];
  }
}

export interface LatticePair {
  /** 0-based. */
  readonly indices: readonly [number, number];
  readonly rho: number;
  readonly vector: readonly [number, number];
}

/** The pairs of coordinates of least index, the least first, earlier coordinates first among equals. */
export function worstLatticePairs({ n, z }: RankOne, keep: number): LatticePair[] {
  let worst: LatticePair[] = [];
  for (let j = 1; j < z.length; j++) {
    for (let i = 0; i < j; i++) {
      const { rho, vector } = zarembaPair(n, z[i] ?? 0, z[j] ?? 0);
      const last = worst[keep - 1];
      if (last !== undefined && rho >= last.rho) continue;
      worst.push({ indices: [i, j], rho, vector });
      worst.sort((a, b) => a.rho - b.rho);
      worst = worst.slice(0, keep);
    }
  }
  return worst;
}

function gcd(a: number, b: number): number {
  while (b !== 0) [a, b] = [b, a % b];
  return a;
}

/** 1/a modulo m, a and m without common factors, by Euclid. */
function inverseModulo(a: number, m: number): number {
  let [r, rest, x, next] = [m, a % m, 0, 1];
  while (rest !== 0) {
    const quotient = Math.floor(r / rest);
    [r, rest] = [rest, r - quotient * rest];
    [x, next] = [next, x - quotient * next];
  }
  return ((x % m) + m) % m;
}

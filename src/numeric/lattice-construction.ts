/**
 * Generating vectors of rank-1 lattices, component by component and fast: D. Nuyens and R. Cools, "Fast
 * component-by-component construction of rank-1 lattice rules with a non-prime number of points", Journal of Complexity 22
 * (2006) 4-28, and "Fast algorithms for component-by-component construction of rank-1 lattice rules in shift-invariant
 * reproducing kernel Hilbert spaces", Mathematics of Computation 75 (2006) 903-920.
 *
 * The criterion is the weighted P_2 of I. H. Sloan and S. Joe, "Lattice Methods for Multiple Integration", Oxford (1994):
 * P_2 = -1 + (1/n) sum over k of the product over j of 1 + w_j 2 pi^2 B_2({k z_j / n}), B_2(x) = x^2 - x + 1/6, with
 * product weights w_j. Each z_j is the smallest number that minimises it (ties and differences below 1e-10 of the value,
 * as z and n - z, count as equal), prime to n, the earlier ones kept.
 *
 * Up to their sign the numbers prime to n = 2^m are the powers of 5, those prime to a prime n the powers of a primitive
 * root. In that order the sum for all candidates is a cyclic correlation: O(d n log n) in all, O(n) memory.
 */
import { CyclicCorrelation } from "./fft.js";
import { primeFactors } from "./primes.js";

/** Sizes are below this, so that products of two residues stay exact in doubles. */
const LARGEST_SIZE = 2 ** 26;

/** w_j = 1/j^2, the weights of the built-in vectors. */
export function inverseSquareWeights(dimension: number): Float64Array {
  return Float64Array.from({ length: dimension }, (_, j) => 1 / (j + 1) ** 2);
}

/** 2 pi^2 B_2(r / n), the kernel of P_2. */
function kernel(r: number, n: number): number {
  const x = r / n;
  return 2 * Math.PI ** 2 * (x * x - x + 1 / 6);
}

/** The multiples k of one divisor n / modulus of n, k = generator^i n / modulus up to sign. */
interface Orbit {
  /** How many k stand behind one entry: 2 for k and n - k, 1 where they are the same. */
  readonly count: number;
  readonly values: Float64Array;
  readonly correlation: CyclicCorrelation;
  /** Product over the components so far. */
  readonly products: Float64Array;
  readonly sums: Float64Array;
}

function orbit(modulus: number, generator: number, length: number): Orbit {
  const values = new Float64Array(length);
  for (let i = 0, residue = 1 % modulus; i < length; i++) {
    values[i] = kernel(residue, modulus);
    residue = (residue * generator) % modulus;
  }
  return {
    count: modulus <= 2 ? 1 : 2,
    values,
    correlation: new CyclicCorrelation(values),
    products: new Float64Array(length).fill(1),
    sums: new Float64Array(length),
  };
}

/** The orbits of n, the longest last. */
function orbitsOf(n: number): { generator: number; orbits: Orbit[] } {
  if (Number.isInteger(Math.log2(n))) {
    const moduli = Array.from({ length: Math.log2(n) + 1 }, (_, m) => 2 ** m);
    return { generator: 5, orbits: moduli.map((modulus) => orbit(modulus, 5, Math.max(1, modulus / 4))) };
  }
  const generator = primitiveRoot(n);
  return { generator, orbits: [orbit(1, 1, 1), orbit(n, generator, (n - 1) / 2)] };
}

/**
 * The vector of `weights.length` components for n points; n a power of two or a prime below 2^26. Throws RangeError for
 * another n.
 */
export function constructVector(n: number, weights: Float64Array): Uint32Array {
  const prime = n > 1 && Number.isInteger(n) && n < LARGEST_SIZE && primeFactors(n)[0] === n;
  if (!prime && !(n >= 1 && n < LARGEST_SIZE && Number.isInteger(Math.log2(n)))) {
    throw new RangeError(`lattice: expected a power of two or a prime below 2^26 points, found ${n}`);
  }
  const { generator, orbits } = orbitsOf(n);
  const longest = orbits.at(-1)?.values.length ?? 1;
  const candidates = new Uint32Array(longest);
  for (let t = 0, z = 1 % n; t < longest; t++) {
    candidates[t] = Math.min(z, n - z);
    z = (z * generator) % n;
  }
  const vector = new Uint32Array(weights.length);
  let value = 0;
  for (const [j, weight] of weights.entries()) {
    const chosen = smallestMinimiser(candidateSums(orbits), candidates, weight, n, value);
    vector[j] = candidates[chosen] ?? 0;
    value = -1;
    for (const { products, values, count } of orbits) {
      let sum = 0;
      for (let i = 0, at = chosen % values.length; i < values.length; i++) {
        const product = (products[i] ?? 0) * (1 + weight * (values[at] ?? 0));
        products[i] = product;
        sum += product;
        at = at + 1 === values.length ? 0 : at + 1;
      }
      value += (count * sum) / n;
    }
  }
  return vector;
}

/** For every candidate generator^t, the sum over k of the product so far times the kernel. */
function candidateSums(orbits: readonly Orbit[]): Float64Array {
  let totals: Float64Array = new Float64Array(1);
  for (const { products, correlation, sums, count } of orbits) {
    correlation.correlate(products, sums);
    // the sums of shorter orbits repeat; each length divides the next
    for (let first = 0; first < sums.length; first += totals.length) {
      for (let t = 0; t < totals.length; t++) {
        sums[first + t] = count * (sums[first + t] ?? 0) + (totals[t] ?? 0);
      }
    }
    totals = sums;
  }
  return totals;
}

/** The place of the smallest candidate whose value is the least up to 1e-10 of it and up to rounding. */
function smallestMinimiser(
  totals: Float64Array,
  candidates: Uint32Array,
  weight: number,
  n: number,
  base: number,
): number {
  const scale = weight / n;
  let least = Infinity;
  for (const total of totals) if (total < least) least = total;
  const limit = base + scale * least;
  // rounding of the transforms: some 1e-16 of a mean product of 1 + base times the kernel
  const accepted = limit + 1e-10 * Math.abs(limit) + 1e-15 * weight * (1 + base);
  let chosen = -1;
  for (let t = 0; t < totals.length; t++) {
    if (base + scale * (totals[t] ?? 0) > accepted) continue;
    if (chosen < 0 || (candidates[t] ?? 0) < (candidates[chosen] ?? 0)) chosen = t;
  }
  return chosen;
}

/** Weighted P_2 of the lattice {k z / n}, directly from its definition: O(n d). */
export function latticeP2(n: number, vector: ArrayLike<number>, weights: ArrayLike<number>): number {
  let sum = 0;
  for (let k = 0; k < n; k++) {
    let product = 1;
    for (let j = 0; j < vector.length; j++) {
      product *= 1 + (weights[j] ?? 0) * kernel((k * (vector[j] ?? 0)) % n, n);
    }
    sum += product;
  }
  return sum / n - 1;
}

/** The least primitive root of an odd prime below 2^26 (C. F. Gauss, Disquisitiones arithmeticae, art. 73). */
function primitiveRoot(prime: number): number {
  const factors = primeFactors(prime - 1);
  for (let root = 2; ; root++) {
    if (factors.every((factor) => power(root, (prime - 1) / factor, prime) !== 1)) return root;
  }
}

function power(base: number, exponent: number, modulus: number): number {
  let result = 1;
  for (let square = base, rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = (result * square) % modulus;
    square = (square * square) % modulus;
  }
  return result;
}

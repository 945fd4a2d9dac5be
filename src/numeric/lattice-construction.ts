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
import { factorise, isPrime, powerMod } from "./factor.js";

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

/** The orbits of n points and the candidates of each component. */
function searchSpace(n: number): { readonly candidates: Uint32Array; readonly orbits: readonly Orbit[] } {
  const prime = Number.isInteger(n) && n < LARGEST_SIZE && isPrime(BigInt(n));
  if (!prime && !(n >= 1 && n < LARGEST_SIZE && Number.isInteger(Math.log2(n)))) {
    throw new RangeError(`lattice: expected a power of two or a prime below 2^26 points, found ${n}`);
  }
  const { generator, orbits } = orbitsOf(n);
  return { candidates: candidatesOf(n, generator, orbits.at(-1)?.values.length ?? 1), orbits };
}

/**
 * The vector of `dimension` components for n points and order-dependent weights: each set of l components has the weight
 * `order[l - 1]`, sets larger than `order` has entries have none. R. Cools, F. Y. Kuo and D. Nuyens, "Constructing
 * embedded lattice rules for multivariate integration", SIAM Journal on Scientific Computing 28 (2006) 2162-2188, section
 * 5.3: with p_l(k) the sum over sets of l components of the products of kernels, a new component adds its kernel times
 * sum of order[l] p_l, so that each step is one cyclic correlation. O(d n log n + d L n) in all, O(L n) memory.
 */
export function constructOrderVector(n: number, dimension: number, order: Float64Array): Uint32Array {
  const { candidates, orbits } = searchSpace(n);
  // sets[orbit][l][i]: p_l at entry i of the orbit; p_0 = 1.
  const sets = orbits.map(({ values }) =>
    Array.from({ length: order.length + 1 }, (_, l) => new Float64Array(values.length).fill(l === 0 ? 1 : 0)),
  );
  const vector = new Uint32Array(dimension);
  let value = 0;
  for (let j = 0; j < dimension; j++) {
    for (const [m, { products }] of orbits.entries()) weighSets(sets[m] ?? [], order, products);
    const chosen = smallestMinimiser(candidateSums(orbits), candidates, 1, n, value);
    vector[j] = candidates[chosen] ?? 0;
    value = 0;
    for (const [m, { values, count }] of orbits.entries()) {
      value += (count * joinSets(sets[m] ?? [], order, values, chosen)) / n;
    }
  }
  return vector;
}

/** The sum of order[l] p_l over l, into `out`. */
function weighSets(sets: readonly Float64Array[], order: Float64Array, out: Float64Array): void {
  out.fill(0);
  for (const [l, weight] of order.entries()) {
    const set = sets[l] ?? out;
    for (let i = 0; i < out.length; i++) out[i] = (out[i] ?? 0) + weight * (set[i] ?? 0);
  }
}

/** Takes candidate t in: p_l grows by its kernel times p_(l-1). Returns the sum of order[l - 1] p_l over the orbit. */
function joinSets(
  sets: readonly Float64Array[],
  order: Float64Array,
  values: Float64Array,
  t: number,
): number {
  let total = 0;
  for (let l = order.length; l >= 1; l--) {
    const set = sets[l] ?? values;
    const below = sets[l - 1] ?? values;
    let sum = 0;
    for (let i = 0, at = t % values.length; i < values.length; i++) {
      set[i] = (set[i] ?? 0) + (values[at] ?? 0) * (below[i] ?? 0);
      sum += set[i] ?? 0;
      at = at + 1 === values.length ? 0 : at + 1;
    }
    total += (order[l - 1] ?? 0) * sum;
  }
  return total;
}

/**
 * The vector of `weights.length` components for n points; n a power of two or a prime below 2^26. Throws RangeError for
 * another n.
 */
export function constructVector(n: number, weights: Float64Array): Uint32Array {
  const { candidates, orbits } = searchSpace(n);
  const vector = new Uint32Array(weights.length);
  let value = 0;
  for (const [j, weight] of weights.entries()) {
    const chosen = smallestMinimiser(candidateSums(orbits), candidates, weight, n, value);
    vector[j] = candidates[chosen] ?? 0;
    value = -1;
    for (const { products, values, count } of orbits) {
      value += (count * multiply(products, values, chosen, weight)) / n;
    }
  }
  return vector;
}

/**
 * A vector for the lattices of all sizes 2^m, m = `least`...`most`, at once: component by component as R. Cools, F. Y. Kuo
 * and D. Nuyens, "Constructing embedded lattice rules for multivariate integration", SIAM Journal on Scientific Computing
 * 28 (2006) 2162-2188. Each component is the smallest for which the largest of the ratios P_2 / (least P_2 that any
 * component gives at that m) is the least up to 1e-10.
 */
export function constructEmbeddedVector(least: number, most: number, weights: Float64Array): Uint32Array {
  const n = 2 ** most;
  const { generator, orbits } = orbitsOf(n);
  const candidates = candidatesOf(n, generator, orbits.at(-1)?.values.length ?? 1);
  const vector = new Uint32Array(weights.length);
  for (const [j, weight] of weights.entries()) {
    let totals: Float64Array = new Float64Array(1);
    let worst: Float64Array = new Float64Array(1);
    let sum = 0;
    for (const [m, { products, correlation, sums, count }] of orbits.entries()) {
      correlation.correlate(products, sums);
      totals = extended(totals, sums, count);
      for (const product of products) sum += count * product;
      const base = sum / 2 ** m - 1;
      const values = totals.map((total) => base + (weight / 2 ** m) * total);
      const lowest = values.reduce((low, value) => Math.min(low, value), Infinity);
      const before = worst;
      worst = values.map((value, t) =>
        Math.max(before[t % before.length] ?? 0, m < least ? 0 : value / lowest),
      );
    }
    const limit = worst.reduce((low, value) => Math.min(low, value), Infinity) * (1 + 1e-10);
    let chosen = -1;
    for (let t = 0; t < worst.length; t++) {
      if ((worst[t] ?? Infinity) > limit) continue;
      if (chosen < 0 || (candidates[t] ?? 0) < (candidates[chosen] ?? 0)) chosen = t;
    }
    vector[j] = candidates[chosen] ?? 0;
    for (const { products, values } of orbits) multiply(products, values, chosen, weight);
  }
  return vector;
}

/** Residues generator^t or their negatives, whichever is smaller. */
function candidatesOf(n: number, generator: number, length: number): Uint32Array {
  const candidates = new Uint32Array(length);
  for (let t = 0, z = 1 % n; t < length; t++) {
    candidates[t] = Math.min(z, n - z);
    z = (z * generator) % n;
  }
  return candidates;
}

/** Multiplies the products of an orbit by the factors of candidate t; returns their sum. */
function multiply(products: Float64Array, values: Float64Array, t: number, weight: number): number {
  let sum = 0;
  for (let i = 0, at = t % values.length; i < values.length; i++) {
    const product = (products[i] ?? 0) * (1 + weight * (values[at] ?? 0));
    products[i] = product;
    sum += product;
    at = at + 1 === values.length ? 0 : at + 1;
  }
  return sum;
}

/** count * sums plus the shorter totals, which repeat; their length divides that of the sums, which are overwritten. */
function extended(totals: Float64Array, sums: Float64Array, count: number): Float64Array {
  for (let first = 0; first < sums.length; first += totals.length) {
    for (let t = 0; t < totals.length; t++) {
      sums[first + t] = count * (sums[first + t] ?? 0) + (totals[t] ?? 0);
    }
  }
  return sums;
}

/** For every candidate generator^t, the sum over k of the product so far times the kernel. */
function candidateSums(orbits: readonly Orbit[]): Float64Array {
  let totals: Float64Array = new Float64Array(1);
  for (const { products, correlation, sums, count } of orbits) {
    correlation.correlate(products, sums);
    totals = extended(totals, sums, count);
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
  const steps = Float64Array.from(vector, (component) => component % n);
  const residues = new Float64Array(steps.length);
  let sum = 0;
  for (let k = 0; k < n; k++) {
    let product = 1;
    for (let j = 0; j < steps.length; j++) {
      const residue = residues[j] ?? 0;
      product *= 1 + (weights[j] ?? 0) * kernel(residue, n);
      const next = residue + (steps[j] ?? 0);
      residues[j] = next >= n ? next - n : next;
    }
    sum += product;
  }
  return sum / n - 1;
}

/** P_2 for order-dependent weights of the lattice {k z / n}, directly from its definition: O(n d L). */
export function latticeOrderP2(n: number, vector: ArrayLike<number>, order: ArrayLike<number>): number {
  let total = 0;
  for (let k = 0; k < n; k++) {
    const sets = new Float64Array(order.length + 1);
    sets[0] = 1;
    for (let j = 0; j < vector.length; j++) {
      const factor = kernel((k * (vector[j] ?? 0)) % n, n);
      for (let l = order.length; l >= 1; l--) sets[l] = (sets[l] ?? 0) + factor * (sets[l - 1] ?? 0);
    }
    for (let l = 1; l <= order.length; l++) total += (order[l - 1] ?? 0) * (sets[l] ?? 0);
  }
  return total / n;
}

/** The least primitive root of an odd prime below 2^26 (C. F. Gauss, Disquisitiones arithmeticae, art. 73). */
function primitiveRoot(prime: number): number {
  const p = BigInt(prime);
  const factors = [...factorise(p - 1n).keys()];
  for (let root = 2n; ; root++) {
    if (factors.every((factor) => powerMod(root, (p - 1n) / factor, p) !== 1n)) return Number(root);
  }
}

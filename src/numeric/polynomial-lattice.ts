/**
 * Generating vectors of polynomial lattices over GF(2), component by component by FFT: J. Dick, F. Y. Kuo, F.
 * Pillichshammer and I. H. Sloan, "Construction algorithms for polynomial lattice rules for multivariate integration",
 * Mathematics of Computation 74 (2005) 1895-1921; the fast form as in D. Nuyens and R. Cools, "Fast component-by-component
 * construction, a reprise for different kernels", in Monte Carlo and Quasi-Monte Carlo Methods 2004, Springer (2006),
 * 373-387.
 *
 * Polynomials are numbers, bit k the coefficient of x^k. The modulus p is the least primitive polynomial of degree m, so
 * that the non-zero residues are the powers of x and the sum for all candidates is a cyclic correlation. The criterion is
 * -1 + 2^-m times the sum over k of the product over j of 1 + w_j omega(x_kj), omega(x) = 2 - 6 (2^floor(log2 x)), omega(0) = 2,
 * with product weights w_j: the mean square error over digital shifts for integrands of smoothness 1, up to a scale.
 */
import { CyclicCorrelation } from "./fft.js";
import { powerOfX } from "./gf2-polynomial.js";
import { factorise } from "./factor.js";

/** A polynomial lattice: its modulus of degree m and its vector. */
export interface PolynomialLattice {
  readonly modulus: number;
  readonly vector: Uint32Array;
}

/** The kernel at x / 2^m, x a whole number below 2^m. */
export function walshKernel(x: number, m: number): number {
  return x === 0 ? 2 : 2 - 6 * 2 ** (31 - Math.clz32(x) - m);
}

/** The first m digits of the Laurent series of a / p as a whole number, a of degree below m. */
export function seriesDigits(a: number, modulus: number, m: number): number {
  let rest = a;
  let digits = 0;
  for (let r = 0; r < m; r++) {
    rest *= 2;
    const digit = rest >= 2 ** m ? 1 : 0;
    if (digit === 1) rest ^= modulus;
    digits = 2 * digits + digit;
  }
  return digits;
}

/** The lattice of 2^m points, m = 1...20, with `weights.length` components. */
export function constructPolynomialLattice(m: number, weights: Float64Array): PolynomialLattice {
  const modulus = primitivePolynomial(m);
  const n = 2 ** m;
  const length = n - 1;
  const powers = new Uint32Array(length);
  for (let i = 0, power = 1; i < length; i++) {
    powers[i] = power;
    power = 2 * power >= n ? (2 * power) ^ modulus : 2 * power;
  }
  const values = Float64Array.from(powers, (power) => walshKernel(seriesDigits(power, modulus, m), m));
  const correlation = new CyclicCorrelation(values);
  const products = new Float64Array(length).fill(1);
  const sums = new Float64Array(length);
  const vector = new Uint32Array(weights.length);
  for (const [j, weight] of weights.entries()) {
    correlation.correlate(products, sums);
    const chosen = smallest(sums, powers);
    vector[j] = powers[chosen] ?? 0;
    for (let i = 0; i < length; i++) {
      products[i] = (products[i] ?? 0) * (1 + weight * (values[(i + chosen) % length] ?? 0));
    }
  }
  return { modulus, vector };
}

/** The place of the smallest polynomial whose sum is the least up to rounding. */
function smallest(sums: Float64Array, powers: Uint32Array): number {
  let least = Infinity;
  for (const sum of sums) least = Math.min(least, sum);
  // the kernel is at most 4 in size and the mean product 1: rounding of the transforms stays below 1e-13 a point
  const limit = least + 1e-13 * sums.length;
  let chosen = -1;
  for (let t = 0; t < sums.length; t++) {
    if ((sums[t] ?? Infinity) > limit) continue;
    if (chosen < 0 || (powers[t] ?? 0) < (powers[chosen] ?? 0)) chosen = t;
  }
  return chosen;
}

/** The least polynomial of degree m modulo which x has order 2^m - 1. */
function primitivePolynomial(m: number): number {
  const order = 2n ** BigInt(m) - 1n;
  const factors = [...factorise(order).keys()];
  for (let candidate = 2 ** m + 1; ; candidate += 2) {
    const isOne = (exponent: bigint): boolean => powerOfX(exponent, BigInt(candidate)) === 1n;
    if (isOne(order) && factors.every((factor) => !isOne(order / factor))) return candidate;
  }
}

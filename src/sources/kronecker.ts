/**
 * Kronecker's sequence frac(i sqrt(p_j)), p_j the j-th prime (L. Kronecker 1884; R. D. Richtmyer, "The evaluation of
 * definite integrals, and a quasi-Monte Carlo method based on the properties of algebraic numbers", Los Alamos report
 * LA-1342, 1951), with the origin kept as point 0. The square roots have 128 bits, so any of the first 2^52 points is as
 * exact as the first.
 *
 * Good for: any number of points, smooth periodic integrands (or `shift+tent`). Bad for: some pairs of coordinates, whose
 * square roots happen to have a small integer relation; no theorem on its rate covers this choice in many coordinates.
 */
import { firstPrimes } from "../numeric/primes.js";
import type { Source } from "./contract.js";
import { openRotation, ROTATION_RANDOMISATIONS } from "./rotation.js";

export const kronecker: Source = {
  id: "kronecker",
  title: "Kronecker sequence, square roots of primes",
  citation:
    "R. D. Richtmyer, The evaluation of definite integrals, and a quasi-Monte Carlo method based on the properties of algebraic numbers, Los Alamos report LA-1342 (1951)",
  family: "quasi-random",
  method: "Kronecker sequence",
  outputBits: 52,
  period: null,
  largestDimension: 10_000,
  nesting: "sequence",
  randomisations: ROTATION_RANDOMISATIONS,
  knownStructure: "some pairs of coordinates nearly line up: 6 sqrt(2) - 19 sqrt(5) is -34 to within 1.1e-5",
  nearestSize: (n) => n,
  open: (request, kernels) => openRotation(kronecker, alphas, request, kernels),
};

let known: readonly bigint[] = [];

/** frac(sqrt(p)) 2^128 of the first primes, kept for the next call. */
function alphas(dimension: number): readonly bigint[] {
  if (known.length < dimension) {
    known = Array.from(firstPrimes(dimension), (p) => squareRoot(BigInt(p) << 256n) & ((1n << 128n) - 1n));
  }
  return known.slice(0, dimension);
}

/**
 * frac(i / phi^j), j = 1...d, with phi the root above 1 of x^(d+1) = x + 1, the golden ratio for d = 1 (M. Roberts, "The
 * unreasonable effectiveness of quasirandom sequences", 2018, a web page, from memory). The vector depends on d.
 */
export const kroneckerGolden: Source = {
  ...kronecker,
  id: "kronecker-golden",
  title: "Kronecker sequence, generalised golden ratio",
  citation: "M. Roberts, The unreasonable effectiveness of quasirandom sequences (2018)",
  largestDimension: 1000,
  open: (request, kernels) => openRotation(kroneckerGolden, goldenAlphas, request, kernels),
};

function goldenAlphas(dimension: number): readonly bigint[] {
  const bits = 256n;
  const one = 1n << bits;
  // y = 1 / phi solves y^(d+1) + y^d = 1: bisection on 256 bits
  let low = one >> 1n;
  let high = one;
  while (high - low > 1n) {
    const middle = (low + high) >> 1n;
    const power = fixedPower(middle, dimension, bits);
    if (power + ((power * middle) >> bits) < one) low = middle;
    else high = middle;
  }
  const alphas: bigint[] = [];
  for (let j = 0, y = low; j < dimension; j++, y = (y * low) >> bits) alphas.push(y >> (bits - 128n));
  return alphas;
}

/** base^exponent of a fraction with `bits` bits. */
function fixedPower(base: bigint, exponent: number, bits: bigint): bigint {
  let result = 1n << bits;
  for (let square = base, rest = exponent; rest > 0; rest >>= 1) {
    if (rest % 2 === 1) result = (result * square) >> bits;
    square = (square * square) >> bits;
  }
  return result;
}

/** The whole part of the square root, by Newton's iteration from above. */
function squareRoot(square: bigint): bigint {
  let root = 1n << BigInt(Math.ceil(square.toString(2).length / 2));
  for (;;) {
    const next = (root + square / root) >> 1n;
    if (next >= root) return root;
    root = next;
  }
}

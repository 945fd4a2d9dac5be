/**
 * Polynomial lattices in base 2 (H. Niederreiter, "Low-discrepancy point sets obtained by digital constructions over finite
 * fields", Czechoslovak Mathematical Journal 42, 1992, 143-166), built for one n = 2^m: digital nets whose matrices hold the
 * Laurent series of q_j / p. The vector q is constructed component by component for the weights 1/j^2
 * (numeric/polynomial-lattice). Natural order, the origin first.
 *
 * Good for: smooth integrands in many coordinates, with nets tuned to the size. Bad for: a sequence of sizes, each of which
 * has another vector.
 */
import { DIGITS } from "../numeric/gf2.js";
import { inverseSquareWeights } from "../numeric/lattice-construction.js";
import {
  constructPolynomialLattice,
  seriesDigits,
  type PolynomialLattice,
} from "../numeric/polynomial-lattice.js";
import { netSource2 } from "./net2.js";
import { nearestPowerOfTwo } from "./quasi-random.js";

const LARGEST_SIZE = 2 ** 16;

export const polynomialLattice = netSource2(
  {
    id: "polynomial-lattice",
    title: "Polynomial lattice in base 2, vector component by component with weights 1/j^2",
    citation:
      "J. Dick, F. Y. Kuo, F. Pillichshammer and I. H. Sloan, Construction algorithms for polynomial lattice rules for multivariate integration, Mathematics of Computation 74 (2005) 1895-1921",
    largestDimension: 250,
    nesting: "per-size",
    knownStructure: null,
    nearestSize: (n) => nearestPowerOfTwo(n, LARGEST_SIZE),
  },
  { order: "natural", columns },
);

/** Lattices built so far in this process: the longest one of each m. */
const built = new Map<number, PolynomialLattice>();

function latticeOf(m: number, dimension: number): PolynomialLattice {
  const known = built.get(m);
  if (known !== undefined && known.vector.length >= dimension) return known;
  const lattice = constructPolynomialLattice(m, inverseSquareWeights(dimension));
  built.set(m, lattice);
  return lattice;
}

function columns(dimension: number, n: number): BigUint64Array {
  const words = new BigUint64Array(dimension * DIGITS);
  const m = Math.log2(n);
  if (m === 0) return words;
  const { modulus, vector } = latticeOf(m, dimension);
  for (let j = 0; j < dimension; j++) {
    // column k: the digits of x^k q / p
    for (let k = 0, residue = vector[j] ?? 0; k < m; k++) {
      words[j * DIGITS + k] = BigInt(seriesDigits(residue, modulus, m)) << BigInt(DIGITS - m);
      residue = 2 * residue >= n ? (2 * residue) ^ modulus : 2 * residue;
    }
  }
  return words;
}

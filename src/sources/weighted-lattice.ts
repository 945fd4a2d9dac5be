/**
 * Rank-1 lattices for weights of the user's own, product or order-dependent: the vector is constructed component by
 * component for each number of points asked for (numeric/lattice-construction), and kept for the next stream.
 *
 * Product weights say how much each coordinate matters; order-dependent ones how much interactions of two, three, ...
 * coordinates do (J. Dick, I. H. Sloan, X. Wang and H. Wozniakowski, "Good lattice rules in weighted Korobov spaces with
 * general weights", Numerische Mathematik 103 (2006) 63-97).
 */
import { constructOrderVector, constructVector } from "../numeric/lattice-construction.js";
import { isPrime } from "../numeric/factor.js";
import type { RankOneLattice } from "./contract.js";
import { openLattice, rankOneLattice } from "./lattice.js";
import { nearestPowerOfTwo } from "./quasi-random.js";

export interface LatticeWeights {
  readonly kind: "product" | "order";
  /** Product: one for each coordinate; order: for 1, 2, ... coordinates together. All above 0. */
  readonly weights: readonly number[];
  readonly dimension: number;
}

/** Most coordinates that act together in order-dependent weights: memory is that many times n doubles. */
export const LARGEST_ORDER = 16;

/** Most coordinates of a lattice that is constructed when it is needed. */
export const LARGEST_WEIGHTED = 1000;

/** Largest n: a vector of 250 components is then found within some ten seconds. */
const LARGEST_SIZE = 2 ** 20;

/** The lattice of these weights, for n a power of two or a prime up to 2^20. Throws RangeError for more than 1,000 product weights. */
export function weightedLattice(id: string, { kind, weights, dimension }: LatticeWeights): RankOneLattice {
  if (dimension > LARGEST_WEIGHTED) {
    throw new RangeError(
      `source.lattice.weights.product: expected at most ${LARGEST_WEIGHTED} weights, found ${dimension}`,
    );
  }
  const known = new Map<number, Uint32Array>();
  const vectorOf = (n: number): Uint32Array => {
    let vector = known.get(n);
    if (vector === undefined) {
      const values = Float64Array.from(weights);
      vector = kind === "product" ? constructVector(n, values) : constructOrderVector(n, dimension, values);
      known.set(n, vector);
    }
    return vector;
  };
  const source: RankOneLattice = {
    ...rankOneLattice,
    family: "own",
    id,
    title: `Rank-1 lattice, vector component by component with ${kind === "product" ? "product" : "order-dependent"} weights`,
    citation:
      "the user's own weights; method: R. Cools, F. Y. Kuo and D. Nuyens, Constructing embedded lattice rules for multivariate integration, SIAM Journal on Scientific Computing 28 (2006) 2162-2188",
    largestDimension: dimension,
    nearestSize: (n) =>
      n > 2 && n <= LARGEST_SIZE && isPrime(BigInt(n)) ? n : nearestPowerOfTwo(n, LARGEST_SIZE),
    generatingVector: (n, coordinates) => Array.from(vectorOf(n).subarray(0, coordinates), BigInt),
    open: (request, kernels) => openLattice(source, request, kernels),
  };
  return source;
}

/**
 * Rank-1 lattices {k z / n}, k = 0...n - 1 (N. M. Korobov, "The approximate computation of multiple integrals", Doklady
 * Akademii Nauk SSSR 124, 1959, 1207-1210; I. H. Sloan and S. Joe, "Lattice Methods for Multiple Integration", Oxford,
 * 1994), built for one n. The vector z is constructed component by component for the weights w_j = 1/j^2 and n a power of
 * two (numeric/lattice-construction), once and for all; components do not depend on how many follow.
 *
 * Good for: smooth periodic integrands (orders of 2 and more), smooth ones after `shift+tent`. Bad for: integrands with
 * jumps; the vector favours the first coordinates.
 */
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, RankOneLattice, Seekable } from "./contract.js";
import { TABLE_DIMENSIONS, TABLE_LOG_SIZE, tableVector } from "./lattice-table.js";
import { nearestPowerOfTwo } from "./quasi-random.js";
import { openRotation, ROTATION_RANDOMISATIONS } from "./rotation.js";

/** What all rank-1 lattices built for one size say of themselves. */
export const rankOneLattice = {
  family: "quasi-random",
  method: "rank-1 lattice",
  outputBits: 52,
  period: null,
  nesting: "per-size",
  randomisations: ROTATION_RANDOMISATIONS,
  knownStructure: null,
} as const;

export const lattice: RankOneLattice = {
  ...rankOneLattice,
  id: "lattice",
  title: "Rank-1 lattice, vector component by component with weights 1/j^2",
  citation:
    "D. Nuyens and R. Cools, Fast component-by-component construction of rank-1 lattice rules with a non-prime number of points, Journal of Complexity 22 (2006) 4-28",
  largestDimension: TABLE_DIMENSIONS,
  nearestSize: (n) => nearestPowerOfTwo(n, 2 ** TABLE_LOG_SIZE),
  // one point needs no vector
  generatingVector: (n, dimension) =>
    Array.from(n === 1 ? new Uint32Array(dimension) : tableVector(Math.log2(n), dimension), BigInt),
  open: (request, kernels) => openLattice(lattice, request, kernels),
};

/**
 * The lattice of a vector of one's own, for any n. Throws RangeError for a component below 0; larger ones than n are
 * taken modulo n.
 */
export function ownLattice(id: string, vector: readonly bigint[]): RankOneLattice {
  for (const [j, component] of vector.entries()) {
    if (component >= 0n) continue;
    throw new RangeError(
      `source.lattice.vector[${j + 1}]: expected a whole number from 0, found ${component}`,
    );
  }
  const source: RankOneLattice = {
    ...rankOneLattice,
    family: "own",
    id,
    title: `Rank-1 lattice with the vector (${vector.slice(0, 6).join(", ")}${vector.length > 6 ? ", ..." : ""})`,
    citation:
      "the user's own; method: I. H. Sloan and S. Joe, Lattice Methods for Multiple Integration (1994)",
    largestDimension: vector.length,
    nearestSize: (n) => n,
    generatingVector: (n, dimension) => vector.slice(0, dimension).map((component) => component % BigInt(n)),
    open: (request, kernels) => openLattice(source, request, kernels),
  };
  return source;
}

/** Opens a stream of the lattice. */
export function openLattice(
  source: RankOneLattice,
  request: OpenRequest,
  kernels: Kernels,
): PointStream & Seekable {
  const alphas = (dimension: number): bigint[] => {
    const n = BigInt(request.n);
    return source
      .generatingVector(request.n, dimension)
      .map((component) => ((component << 128n) + n - 1n) / n);
  };
  return openRotation(source, alphas, request, kernels);
}

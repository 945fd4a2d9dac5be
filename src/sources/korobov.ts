/**
 * Korobov lattices: rank-1 lattices with the vector (1, a, a^2, ...) mod n (N. M. Korobov, "The approximate computation of
 * multiple integrals", Doklady Akademii Nauk SSSR 124, 1959, 1207-1210), for n a power of two up to 2^17. The multiplier a
 * has the least weighted P_2 (weights 1/j^2, the first 8 coordinates at most) of 64 odd candidates near n {i (sqrt(5) - 1)/2}, of
 * all odd ones below n/2 where there are fewer.
 *
 * Good for: a vector that one number describes. Bad for: what `lattice` is bad for; its P_2 is larger.
 */
import { inverseSquareWeights, latticeP2 } from "../numeric/lattice-construction.js";
import type { RankOneLattice } from "./contract.js";
import { openLattice, rankOneLattice } from "./lattice.js";
import { nearestPowerOfTwo } from "./quasi-random.js";

const LARGEST_SIZE = 2 ** 17;
const CANDIDATES = 64;
const SEARCHED_DIMENSIONS = 8;

export const korobov: RankOneLattice = {
  ...rankOneLattice,
  id: "korobov",
  title: "Korobov lattice, multiplier searched for weights 1/j^2",
  citation:
    "N. M. Korobov, The approximate computation of multiple integrals, Doklady Akademii Nauk SSSR 124 (1959) 1207-1210",
  largestDimension: 1000,
  nearestSize: (n) => nearestPowerOfTwo(n, LARGEST_SIZE),
  generatingVector: (n, dimension) => vectorOf(n, dimension).map(BigInt),
  open: (request, kernels) => openLattice(korobov, request, kernels),
};

/** Multipliers found so far in this process, by n and the number of coordinates that the search looked at. */
const found = new Map<string, number>();

function vectorOf(n: number, dimension: number): number[] {
  const searched = Math.min(dimension, SEARCHED_DIMENSIONS);
  const key = `${n} ${searched}`;
  const multiplier = found.get(key) ?? bestMultiplier(n, searched);
  found.set(key, multiplier);
  return powers(n, multiplier, dimension);
}

function powers(n: number, multiplier: number, dimension: number): number[] {
  const vector = [1 % n];
  while (vector.length < dimension) vector.push(((vector.at(-1) ?? 0) * multiplier) % n);
  return vector;
}

function bestMultiplier(n: number, dimension: number): number {
  const weights = inverseSquareWeights(dimension);
  let best = 1;
  let least = Infinity;
  for (const candidate of candidatesBelow(n)) {
    const value = latticeP2(n, powers(n, candidate, dimension), weights);
    if (value >= least) continue;
    least = value;
    best = candidate;
  }
  return best;
}

function candidatesBelow(n: number): number[] {
  if (n <= 4 * CANDIDATES) return Array.from({ length: Math.max(1, n / 4) }, (_, i) => 2 * i + 1);
  const golden = (Math.sqrt(5) - 1) / 2;
  return Array.from({ length: CANDIDATES }, (_, i) => 2 * Math.floor((n / 2) * (((i + 1) * golden) % 1)) + 1);
}

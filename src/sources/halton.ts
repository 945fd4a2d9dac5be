/**
 * Halton's sequence (J. H. Halton, "On the efficiency of certain quasi-random sequences of points in evaluating
 * multi-dimensional integrals", Numerische Mathematik 2, 1960, 84-90): coordinate j of point i is the radical inverse of i
 * in the j-th prime, here for all 1,229 primes below 10,000, with the origin kept as point 0. Randomised by `permuted`:
 * independent random permutations of the digits for every base and place (A. B. Owen, "A randomized Halton algorithm in
 * R", arXiv:1706.02808, 2017).
 *
 * A point has K digits in base p, the most with p^K <= 2^52, and stands at the midpoint (N + 1/2) / p^K of its cell; its
 * resolution is between 2^-52 and p 2^-52. Coordinate j repeats after p^K points, at the earliest after 2^38.
 *
 * Good for: few coordinates, any number of points. Bad for: high coordinates, of which two (bases p and q) repeat their
 * joint pattern only after p q points, so that fewer points leave the square badly covered.
 */
import { firstPrimes } from "../numeric/primes.js";
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, RadicalInverse, Seekable, Source } from "./contract.js";
import { checkIndex, checkOpening } from "./quasi-random.js";

const RECORD = 768;
/** Entries in a table of the lowest digits: short runs cost time, long tables memory. */
const LARGEST_TABLE = 4096;

export const halton: RadicalInverse = {
  id: "halton",
  title: "Halton sequence",
  citation:
    "J. H. Halton, On the efficiency of certain quasi-random sequences of points in evaluating multi-dimensional integrals, Numerische Mathematik 2 (1960) 84-90",
  family: "quasi-random",
  method: "radical inverse",
  outputBits: 52,
  period: null,
  largestDimension: 1229,
  nesting: "sequence",
  randomisations: ["permuted"],
  knownStructure: "coordinates i and j repeat their joint pattern every p_i p_j points",
  nearestSize: (n) => n,
  leap: 1,
  bases: (dimension) => [...firstPrimes(dimension)],
  open: (request, kernels) => openHalton(halton, 1, request, kernels),
};

const LEAP = 409;

/**
 * Every 409th point (L. Kocis and W. J. Whiten, "Computational investigations of low-discrepancy sequences", ACM
 * Transactions on Mathematical Software 23, 1997, 266-294): high coordinates no longer rise in step. 409 is the 80th prime,
 * so there are 79 coordinates.
 */
export const haltonLeaped: RadicalInverse = {
  ...halton,
  id: "halton-leaped",
  title: "Halton sequence, every 409th point",
  citation:
    "L. Kocis and W. J. Whiten, Computational investigations of low-discrepancy sequences, ACM Transactions on Mathematical Software 23 (1997) 266-294",
  largestDimension: 79,
  leap: LEAP,
  open: (request, kernels) => openHalton(haltonLeaped, LEAP, request, kernels),
};

function openHalton(
  source: Source,
  leap: number,
  request: OpenRequest,
  kernels: Kernels,
): PointStream & Seekable {
  const randomisation = checkOpening(source, request);
  const { dimension } = request;
  const { arena, exports } = kernels;
  const records = arena.allocate(dimension * RECORD);
  for (const [j, p] of firstPrimes(dimension).entries()) {
    // K places in all, of which the lowest a are looked up together
    const places = largestExponent(p, 2 ** 52);
    const together = Math.max(1, largestExponent(p, LARGEST_TABLE));
    const size = p ** together;
    const table = arena.allocate(size * 8);
    const permutations = randomisation === null ? 0 : arena.allocate(places * p * 2);
    const record = records + j * RECORD;
    kernels.f64(record, 1)[0] = p ** places;
    kernels.u32(record + 8, 6).set([p, size, table, permutations, together, places - together]);
  }
  const mark = arena.mark();
  let seeds = 0;
  if (randomisation !== null) {
    seeds = arena.allocate(dimension * 32);
    kernels.u64(seeds, dimension * 4).set(randomisation.key.derive("permuted").words64(dimension * 4));
  }
  exports.haltonPrepare(records, dimension, seeds);
  arena.release(mark);

  let index = 0;
  return {
    dimension,
    seek(to) {
      checkIndex(source, to);
      index = to;
    },
    fill(pointer, stride, count) {
      checkIndex(source, index, count);
      if (leap === 1) exports.haltonFill(records, dimension, index, pointer, stride, count);
      else exports.haltonFillLeaped(records, dimension, index, leap, pointer, stride, count);
      index += count;
    },
  };
}

/** The largest e with base^e <= limit (limit at most 2^53). */
function largestExponent(base: number, limit: number): number {
  let exponent = 0;
  for (let power = base; power <= limit; power *= base) exponent++;
  return exponent;
}

/**
 * An extensible lattice sequence (F. J. Hickernell, H. S. Hong, P. L'Ecuyer and C. Lemieux, "Extensible lattice sequences
 * for quasi-Monte Carlo quadrature", SIAM Journal on Scientific Computing 22, 2000, 1117-1138): frac(phi(i) z), phi the
 * radical inverse in base 2, whose first 2^m points are a rank-1 lattice for every m, the origin first. One vector for all
 * sizes 2^6 to 2^20, constructed with weights 1/j^2 as R. Cools, F. Y. Kuo and D. Nuyens, SIAM Journal on Scientific
 * Computing 28 (2006) 2162-2188 (numeric/lattice-construction).
 *
 * Good for: what `lattice` is good for, when n is not fixed beforehand; P_2 is some 1.1 to 1.5 times that of `lattice`. Bad
 * for: sizes that are not powers of two, and more than 2^20 points, for which the vector was not chosen.
 */
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, RankOneLattice, Seekable } from "./contract.js";
import { embeddedTableVector, TABLE_DIMENSIONS } from "./lattice-table.js";
import { checkIndex, checkOpening } from "./quasi-random.js";
import { ROTATION_RANDOMISATIONS } from "./rotation.js";

const RECORD_WORDS = 54;
const SHIFT = 1;
const BITS = 2;

export const latticeSequence: RankOneLattice = {
  id: "lattice-sequence",
  title: "Extensible rank-1 lattice sequence, radical-inverse order",
  citation:
    "R. Cools, F. Y. Kuo and D. Nuyens, Constructing embedded lattice rules for multivariate integration, SIAM Journal on Scientific Computing 28 (2006) 2162-2188",
  family: "quasi-random",
  method: "rank-1 lattice",
  outputBits: 52,
  period: null,
  largestDimension: TABLE_DIMENSIONS,
  nesting: "sequence",
  randomisations: ROTATION_RANDOMISATIONS,
  knownStructure: null,
  nearestSize: (n) => n,
  generatingVector: (n, dimension) =>
    Array.from(embeddedTableVector(dimension), (component) => BigInt(component) % BigInt(n)),
  open: openLatticeSequence,
};

function openLatticeSequence(request: OpenRequest, kernels: Kernels): PointStream & Seekable {
  const randomisation = checkOpening(latticeSequence, request);
  const tent = randomisation?.name === "shift+tent";
  const { dimension } = request;
  const { exports } = kernels;
  const shifts = randomisation?.key.derive("shift").words64(dimension);
  const records = kernels.arena.allocate(dimension * RECORD_WORDS * 8);
  const words = kernels.u64(records, dimension * RECORD_WORDS).fill(0n);
  for (const [j, component] of embeddedTableVector(dimension).entries()) {
    const at = j * RECORD_WORDS;
    words[at + SHIFT] = shifts?.[j] ?? 0n;
    for (let bit = 0; bit < 52; bit++) {
      words[at + BITS + bit] = BigInt.asUintN(64, BigInt(component) << BigInt(63 - bit));
    }
  }

  let index = 0;
  const seek = (to: number): void => {
    checkIndex(latticeSequence, to);
    exports.radicalSeek(records, dimension, to);
    index = to;
  };
  seek(0);
  return {
    dimension,
    seek,
    fill(pointer, stride, count) {
      checkIndex(latticeSequence, index, count);
      exports.radicalFill(records, dimension, index, pointer, stride, count, tent);
      index += count;
    },
  };
}

/**
 * The wave that resonates with a source: cos 2 pi (h.u - phase), h the shortest vector of the dual of the lattice that its
 * tuples fill over all starts (R. R. Coveyou and R. D. MacPherson, "Fourier analysis of uniform random number generators",
 * Journal of the ACM 14 (1967) 100-119). Its integral is 0, and it is 1 at every tuple from every start, so that
 * 1 + cos is estimated as 2 whatever the number of points.
 *
 * A wave is seen only where coordinates hold enough bits of the lattice. With b bits cut out of more, h.u is off by up to
 * |h|_1 2^-b / 2; probes are refused where |h|_1 2^-b exceeds 0.01, at which the wave has lost 0.05 % at most.
 */
import type { SourceChoice } from "../sources/choice.js";
import { bitsOf } from "../sources/conversion.js";
import { aliasSetOf, type AliasSet, type SparseVector } from "./alias-set.js";
import { dualFigure, LARGEST_DUAL_DIMENSION } from "./dual-lattice.js";

/** Largest |h|_1 2^-b of a probe. */
const MOST_BLUR = 0.01;

export interface Probe {
  readonly source: string;
  readonly dimension: number;
  /** One entry for each coordinate, exact. */
  readonly vector: readonly number[];
  /** h.u modulo 1 at every tuple, from 0 to below 1. */
  readonly phase: number;
  readonly squaredLength: number;
  /** Distance of neighbouring planes, 1 / |h|. */
  readonly gap: number;
  readonly set: AliasSet;
  /** Points of the lattice for which h is the shortest; null where the set of tuples does not depend on n. */
  readonly points: number | null;
}

/**
 * The probe of a source in `dimension` coordinates; `n` matters for rank-1 lattices alone. Throws a RangeError with the
 * reason where the source has no lattice, or its outputs too few bits to see the wave.
 */
export function probeOf(choice: SourceChoice, dimension: number, n: number): Probe {
  const { id } = choice;
  if (!(dimension >= 2 && dimension <= LARGEST_DUAL_DIMENSION)) {
    throw new RangeError(
      `dimension: expected a whole number from 2 to ${LARGEST_DUAL_DIMENSION} for a probe, found ${dimension}`,
    );
  }
  const size = choice.source.nearestSize(n);
  const set = aliasSetOf(choice, dimension, size);
  if ("reason" in set) throw new RangeError(`source "${id}": no probe resonates with it: ${set.reason}`);
  const indices = Array.from({ length: dimension }, (_, j) => j);
  const { vector: shortest, complete } = dualFigure(set.tuples, indices);
  if (!complete) {
    throw new RangeError(
      `source "${id}": the search for its shortest dual vector in ${dimension} dimensions reached its bound; ask for fewer dimensions`,
    );
  }
  checkVisible(choice, set, shortest);
  const { vector, phase } = inPhase(set, shortest.map(Number));
  const squaredLength = vector.reduce((sum, entry) => sum + entry * entry, 0);
  return {
    source: id,
    dimension,
    vector,
    phase,
    squaredLength,
    gap: 1 / Math.sqrt(squaredLength),
    set,
    points: set.kind === "rank-1" ? size : null,
  };
}

/** Throws where coordinates are cut to fewer bits than the lattice has, and too few for the wave. */
function checkVisible({ id, source }: SourceChoice, set: AliasSet, vector: readonly bigint[]): void {
  const bits = Math.min(set.bits, source.outputBits);
  const reach = vector.reduce((sum, entry) => sum + (entry < 0n ? -entry : entry), 0n);
  if (bits >= bitsOf(set.modulus) || Number(reach) * 2 ** -bits <= MOST_BLUR) return;
  throw new RangeError(
    `source "${id}": its ${bits} output bits are too few to see its shortest dual vector in ${vector.length} dimensions: ` +
      `its entries add up to ${reach}, expected at most ${Math.floor(MOST_BLUR * 2 ** bits)}; in more dimensions it is shorter`,
  );
}

/**
 * The vector, or the smallest multiple of it for which h.u is the same at every tuple: modulo numbers with odd prime
 * factors the units of the modulus stand on several planes of the shortest one.
 */
function inPhase(set: AliasSet, shortest: readonly number[]): { vector: number[]; phase: number } {
  for (let k = 1; ; k++) {
    const vector = shortest.map((entry) => k * entry);
    const { size, phase } = set.weight(sparse(vector));
    if (size === 1) return { vector, phase };
  }
}

export function sparse(vector: readonly number[]): SparseVector {
  const indices = vector.flatMap((entry, j) => (entry === 0 ? [] : [j]));
  return { indices, entries: indices.map((j) => vector[j] ?? 0) };
}

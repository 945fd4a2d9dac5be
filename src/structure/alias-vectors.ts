/**
 * Which dual vectors matter to an integral: those whose Fourier coefficients can be large. Coefficients of smooth
 * integrands fall with the length of h, those of merely bounded variation with the product of max(1, |h_j|); so short
 * vectors are looked for in projections on few coordinates (pairs at any distance, triples within a span, runs of
 * successive coordinates), and put in order by both, whichever ranks a vector higher. Projections, since the dual lattice
 * of all of 64 coordinates holds far more short vectors than it has dimensions, most of them sums of those found here.
 */
import { KernelLattice } from "../numeric/kernel-lattice.js";
import { ReducedBasis } from "../numeric/lattice-reduction.js";
import { vectorsWithin } from "../numeric/vectors-within.js";
import type { AliasSet, SparseVector } from "./alias-set.js";
import { indexSets } from "./projections.js";

export interface AliasVectors {
  /** In order; of h and -h one, the first entry positive. */
  readonly vectors: readonly SparseVector[];
  /** The shortest one found, however long. */
  readonly shortest: SparseVector | null;
}

/** Pairs reach this far; triples and runs are within these numbers of coordinates. */
const PAIR_SPAN = 64;
const TRIPLE_SPAN = 12;
const LONGEST_RUN = 6;

/** Lengths that are searched are doubled until there are enough; beyond the last a wave is too fine to matter. */
const LARGEST_RADIUS = 2 ** 16;

/** Enough vectors of one projection: of few coordinates, of many. */
const ENOUGH = { few: 32, many: 256 };

/** Multiples of a vector belong to the same planes, and a sharp integrand sees many of them. */
const MULTIPLES = 16;

/** Vectors in one projection at most. */
const MOST_IN_ONE = 4096;

/** The vectors of `set` in `dimension` coordinates, the first `wanted` of them. */
export function aliasVectors(set: AliasSet, dimension: number, wanted: number): AliasVectors {
  const found = new Map<string, SparseVector>();
  let shortest: SparseVector | null = null;
  for (const indices of projectionsOf(set, dimension)) {
    const basis = basisOf(set, indices);
    for (const v of shortVectors(basis, indices.length > 3 ? ENOUGH.many : ENOUGH.few)) {
      const h = sparse(indices, v);
      const first = set.stationary ? (h.indices[0] ?? 0) : 0;
      const at = { indices: h.indices.map((index) => index - first), entries: h.entries };
      found.set(keyOf(at), at);
    }
    for (const row of basis.rows) {
      const h = sparse(indices, row.map(Number));
      if (shortest === null || squaredLength(h) < squaredLength(shortest)) shortest = h;
    }
  }
  const nearest = inOrder([...found.values()]).slice(0, wanted);
  const all = new Map(nearest.map((h) => [keyOf(h), h]));
  for (const h of nearest) {
    for (let k = 2; k <= MULTIPLES; k++) {
      const multiple = { indices: h.indices, entries: h.entries.map((entry) => k * entry) };
      all.set(keyOf(multiple), multiple);
    }
  }
  const shapes = inOrder([...all.values()]);
  for (const h of shapes) if (shortest === null || squaredLength(h) < squaredLength(shortest)) shortest = h;
  const vectors: SparseVector[] = [];
  for (const h of shapes) {
    if (vectors.length >= wanted) break;
    vectors.push(...(set.stationary ? moved(h, dimension) : [h]));
  }
  return { vectors: vectors.slice(0, wanted), shortest };
}

function keyOf({ indices, entries }: SparseVector): string {
  return `${indices.join()}:${entries.join()}`;
}

/** The vectors up to the first length at which there are `enough`. */
function shortVectors(basis: ReducedBasis, enough: number): number[][] {
  let found: number[][] = [];
  for (let radius = 2; radius <= LARGEST_RADIUS && found.length < enough; radius *= 2) {
    const here = vectorsWithin(basis, radius ** 2, MOST_IN_ONE);
    if (here === null) break;
    found = here;
  }
  return found;
}

/** A vector that begins at coordinate 0, at every place that it has room in. */
function moved({ indices, entries }: SparseVector, dimension: number): SparseVector[] {
  return Array.from({ length: dimension - (indices.at(-1) ?? 0) }, (_, by) => ({
    indices: indices.map((index) => index + by),
    entries,
  }));
}

function projectionsOf({ stationary, lags, tuples }: AliasSet, dimension: number): number[][] {
  const width = (span: number): number => Math.min(span, dimension);
  const sets: number[][] = [];
  const low = tuples.residues;
  const starts = (set: readonly number[]): boolean => !stationary || set[0] === 0;
  if (low < 2) sets.push(...[...indexSets(2, width(PAIR_SPAN))].filter(starts));
  if (low < 3) sets.push(...[...indexSets(3, width(TRIPLE_SPAN))].filter(starts));
  for (let length = 4; length <= width(LONGEST_RUN + low - 1) && low <= LONGEST_RUN; length++) {
    if (length > low) sets.push(Array.from({ length }, (_, j) => j));
  }
  if (lags !== null && (lags.at(-1) ?? 0) < dimension) sets.push([...lags]);
  return sets;
}

function basisOf({ modulus, tuples }: AliasSet, indices: readonly number[]): ReducedBasis {
  const lattice = new KernelLattice(modulus, tuples.residues);
  const basis = new ReducedBasis();
  for (const index of indices) basis.append(lattice.append(tuples.vector(index)));
  return basis;
}

function sparse(indices: readonly number[], v: readonly number[]): SparseVector {
  const sign = Math.sign(v.find((entry) => entry !== 0) ?? 1);
  const kept = indices.flatMap((index, k) =>
    (v[k] ?? 0) === 0 ? [] : [{ index, entry: sign * (v[k] ?? 0) }],
  );
  return { indices: kept.map(({ index }) => index), entries: kept.map(({ entry }) => entry) };
}

export function squaredLength({ entries }: SparseVector): number {
  return entries.reduce((sum, entry) => sum + entry * entry, 0);
}

/** The product of max(1, |h_j|). */
export function productWeight({ entries }: SparseVector): number {
  return entries.reduce((product, entry) => product * Math.abs(entry), 1);
}

/** By the better of two ranks, by product weight and by length; what is equal keeps the order of coordinates. */
function inOrder(vectors: readonly SparseVector[]): SparseVector[] {
  const ranks = [productWeight, squaredLength].map((size) => {
    const sizes = vectors.map(size);
    const ascending = [...sizes].sort((a, b) => a - b);
    const first = new Map<number, number>();
    ascending.forEach((value, rank) => first.has(value) || first.set(value, rank));
    return sizes.map((value) => first.get(value) ?? 0);
  });
  const rank = (i: number): number => Math.min(ranks[0]?.[i] ?? 0, ranks[1]?.[i] ?? 0);
  return vectors
    .map((h, i) => ({ h, rank: rank(i) }))
    .sort((a, b) => a.rank - b.rank || compare(a.h, b.h))
    .map(({ h }) => h);
}

function compare(a: SparseVector, b: SparseVector): number {
  const [left, right] = [
    [...a.entries, ...a.indices],
    [...b.entries, ...b.indices],
  ];
  const at = left.findIndex((value, k) => value !== right[k]);
  return at < 0 ? left.length - right.length : (left[at] ?? 0) - (right[at] ?? 0);
}

/** The lattice that a source's points lie on, if they lie on one: from what its file says and how it is used. */
import type { SourceChoice } from "../sources/choice.js";
import type { RankOneLattice, Source } from "../sources/contract.js";
import { bitsOf } from "../sources/conversion.js";
import type { LinearRecurrence } from "../sources/linear.js";
import { isPseudoRandom, type PseudoRandomSource } from "../sources/pseudo-random.js";
import { congruentialLattices, type TupleLattice } from "./congruential-lattices.js";
import { rankOneTuples, recurrenceTuples, type Tuples } from "./tuples.js";

export interface LatticeStructure {
  /** Of the full modulus. */
  readonly tuples: Tuples;
  /** The lattices of the tuples, the full modulus first. */
  readonly lattices: readonly TupleLattice[];
  /** Null for a rank-1 lattice. */
  readonly recurrence: LinearRecurrence | null;
  /** Of every how many outputs one is taken. */
  readonly stride: number;
  /** Points of a rank-1 lattice; null where points have no end. */
  readonly points: number | null;
  readonly notes: readonly string[];
}

/** Points of a rank-1 lattice where none are asked for. */
const USUAL_POINTS = 4096;

export function isRankOne(source: Source): source is RankOneLattice {
  return "generatingVector" in source;
}

/** Whether a source's points lie on a lattice. */
export function hasLattice({ source }: SourceChoice): boolean {
  return isRankOne(source) || (isPseudoRandom(source) && linearOf(source) !== null);
}

/** Why there is no lattice, in a sentence. */
export function whyNoLattice({ id, source }: SourceChoice): string {
  if (!isPseudoRandom(source))
    return `${id}: no lattice of points, as its method (${source.method}) is another`;
  if (source.usage.tuples.kind === "per-coordinate") {
    return `${id}: no joint lattice, as every coordinate is a stream of its own that starts from a state of its own`;
  }
  if (source.recurrence.linear !== undefined) {
    return `${id}: no lattice, as low bits modulo ${source.recurrence.linear.modulus} do not follow a recurrence of their own`;
  }
  return `${id}: no lattice, as its outputs are not linear modulo a whole number`;
}

/** The structure of a source for which `hasLattice` holds; `points` and `dimension` matter to rank-1 lattices. */
export function latticeStructure(
  choice: SourceChoice,
  points: number | null,
  dimension: number,
): LatticeStructure {
  const { source } = choice;
  if (isRankOne(source)) return rankOne(source, points, dimension);
  const linear = isPseudoRandom(source) ? linearOf(source) : null;
  if (linear === null) throw new RangeError(`source: expected one with a lattice, found "${choice.id}"`);
  return linear;
}

/** The size nearest to `points` at which a source's points are a lattice: of a sequence, a power of two. */
export function latticeSize(source: RankOneLattice, points: number | null): number {
  const asked = points ?? USUAL_POINTS;
  return source.nesting === "sequence" ? 2 ** Math.round(Math.log2(asked)) : source.nearestSize(asked);
}

function rankOne(source: RankOneLattice, points: number | null, dimension: number): LatticeStructure {
  const asked = points ?? USUAL_POINTS;
  const n = latticeSize(source, points);
  const z = source.generatingVector(n, Math.min(dimension, source.largestDimension));
  const modulus = BigInt(n);
  return {
    tuples: rankOneTuples(modulus, z),
    lattices: [{ kind: "full", modulus, copies: 1, what: `all ${n} points` }],
    recurrence: null,
    stride: 1,
    points: n,
    notes: n === asked ? [] : [`Built for ${n} points: the nearest size to ${asked} that is a lattice.`],
  };
}

function linearOf(source: PseudoRandomSource): LatticeStructure | null {
  const { usage } = source;
  const { tuples, bits, float32 } = usage;
  const linear = recurrenceInUse(source);
  if (linear === null || tuples.kind === "per-coordinate") return null;
  const stride = tuples.step;
  const notes: string[] = [];
  if (linear.note !== null) notes.push(linear.note);
  if (bits?.end === "top" && bits.count < bitsOf(linear.modulus)) {
    notes.push(
      `Outputs are cut to their top ${bits.count} of ${bitsOf(linear.modulus)} bits: a plane h is blurred by up to |h|₁ / 2^${bits.count} of the distance to the next.`,
    );
  }
  const { luxury } = linear;
  if (luxury !== undefined) {
    notes.push(
      `Of every ${luxury.block} terms ${luxury.kept} are outputs; tuples here begin such a block, as points do where ${luxury.kept} divides their coordinates.`,
    );
  }
  if (float32)
    notes.push("Coordinates are rounded to single precision, which blurs planes by up to |h|₁ / 2^24.");
  return {
    tuples: recurrenceTuples(linear, stride),
    lattices: congruentialLattices(linear, stride),
    recurrence: linear,
    stride,
    points: null,
    notes,
  };
}

/** The recurrence of the outputs as they are used; null where they follow none. */
export function recurrenceInUse({
  recurrence: { linear },
  usage: { bits },
}: PseudoRandomSource): LinearRecurrence | null {
  if (linear === undefined) return null;
  return bits === null ? linear : cut(linear, bits);
}

/** The recurrence of some bits of the outputs: low ones of a power of two follow one, top ones are cut off the full one. */
function cut(
  linear: LinearRecurrence,
  bits: { readonly end: "top" | "low"; readonly count: number },
): LinearRecurrence | null {
  if (bits.end === "top") return linear;
  const modulus = 1n << BigInt(bits.count);
  if (linear.modulus % modulus !== 0n) return null;
  return {
    multipliers: linear.multipliers.map((a) => a % modulus),
    increment: linear.increment % modulus,
    modulus,
    note: `Low ${bits.count} bits of the outputs modulo ${linear.modulus}.`,
  };
}

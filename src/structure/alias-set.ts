/**
 * The point set over which the estimate of a lattice-structured source is averaged when its start is drawn at random, and
 * what plane waves average to over it. An estimate of any number of points then has the expectation
 * sum over h of f^(h) w(h), w(h) the mean of e^(2 pi i h.u) over the set; its bias is that sum without h = 0.
 *
 * - Congruential with increment (x <- a x + c, a coprime to m): all residues, u_j = (a^j x + c_j + offset) / m. w is
 *   e^(2 pi i h.shift) on the dual lattice of modulus m and 0 off it.
 * - Multiplicative: the residues coprime to m. With s = h.(1, a, a^2, ...) mod m and r = m / gcd(s, m), w = mu(r) / phi(r)
 *   (Ramanujan's sum; G. H. Hardy and E. M. Wright, An Introduction to the Theory of Numbers, 16.6). For m = 2^e that is 1
 *   at r = 1, -1 at r = 2 and 0 elsewhere: the shifted lattice of modulus 2^(e-1). For a prime m it is 1 on the dual and
 *   -1/(m - 1) off it, which is the missing origin: `states` says how many states there would be with it.
 * - Multiple recursive: all states but the one of zeros; again `states` counts them with it.
 * - Rank-1 lattice without randomisation: {k z / n}, w = 1 on its dual.
 */
import { coprime, factorise, gcd, isPrime } from "../numeric/factor.js";
import type { SourceChoice } from "../sources/choice.js";
import type { RankOneLattice, Source } from "../sources/contract.js";
import { bitsOf } from "../sources/conversion.js";
import type { LinearRecurrence } from "../sources/linear.js";
import { isPseudoRandom, type PseudoRandomSource } from "../sources/pseudo-random.js";
import type { LatticeKind } from "./congruential-lattices.js";
import { rankOneTuples, recurrenceTuples, type Tuples } from "./tuples.js";

/** A vector by its entries that are not 0. */
export interface SparseVector {
  /** Coordinates, 0-based, ascending. */
  readonly indices: readonly number[];
  /** Whole numbers, exact. */
  readonly entries: readonly number[];
}

/** The mean of e^(2 pi i h.u) over the set: size e^(2 pi i phase). */
export interface Weight {
  readonly size: number;
  /** In turns, from 0 to below 1. */
  readonly phase: number;
}

export interface AliasSet {
  readonly kind: Extract<LatticeKind, "full" | "seed-averaged"> | "rank-1";
  /** The dual lattice of this modulus holds every h with w(h) other than 0, the missing origin apart. */
  readonly modulus: bigint;
  /** Outputs modulo `modulus`. */
  readonly tuples: Tuples;
  readonly what: string;
  /** Whether dual vectors may be moved along the coordinates. */
  readonly stationary: boolean;
  /** An index set that the recurrence itself singles out; null where successive outputs say it all. */
  readonly lags: readonly number[] | null;
  weight(h: SparseVector): Weight;
  /** States with the origin, which the source never takes; null where none is missing. */
  readonly states: number | null;
  /** Bits of a coordinate: waves finer than these are not seen as they are. */
  readonly bits: number;
}

/** Why a pair has no prediction from a lattice, in one clause. */
export interface NoAliasSet {
  readonly reason: string;
}

/** Primes up to here that divide a modulus are taken into its weights; larger ones leave out 1 in p states. */
const LARGEST_SMALL_PRIME = 97;

function isRankOne(source: Source): source is RankOneLattice {
  return "generatingVector" in source;
}

/** The set of `choice` in `dimension` coordinates; n matters where points are built for one size. */
export function aliasSetOf(choice: SourceChoice, dimension: number, n: number): AliasSet | NoAliasSet {
  const { source, randomisations } = choice;
  if (isRankOne(source)) {
    if (randomisations.length > 0)
      return {
        reason: `its bias is 0 by theorem: the randomisation ${randomisations.join("+")} makes every point uniform`,
      };
    return rankOneSet(source, dimension, n);
  }
  if (!isPseudoRandom(source) && source.family === "own")
    return { reason: "nothing is known of the structure of its points" };
  if (!isPseudoRandom(source) || source.recurrence.linear === undefined)
    return {
      reason: "it has no lattice structure: its outputs are no linear recurrence modulo a whole number",
    };
  return recurrenceSet(source, source.recurrence.linear);
}

function rankOneSet(source: RankOneLattice, dimension: number, n: number): AliasSet {
  const modulus = BigInt(n);
  return {
    kind: "rank-1",
    modulus,
    tuples: rankOneTuples(modulus, source.generatingVector(n, dimension)),
    what: `the ${n} points themselves, one lattice`,
    stationary: false,
    lags: null,
    weight: () => ({ size: 1, phase: 0 }),
    states: null,
    bits: source.outputBits,
  };
}

function recurrenceSet(source: PseudoRandomSource, given: LinearRecurrence): AliasSet | NoAliasSet {
  const { usage } = source;
  if (usage.tuples.kind === "per-coordinate")
    return { reason: "each coordinate has a stream of its own, so tuples fill no lattice" };
  if (usage.seeding.kind === "state")
    return { reason: "it starts from one given state, so there is no average over starts to predict" };
  const linear = taken(source, given);
  if ("reason" in linear) return linear;
  const { multipliers, increment, modulus } = linear;
  const last = multipliers.at(-1) ?? 0n;
  if (!coprime(last, modulus))
    return { reason: `its multiplier ${last} shares a factor with the modulus, so it forgets its start` };
  const stride = usage.tuples.step;
  const multiplicative = increment === 0n && multipliers.length === 1;
  const units = multiplicative ? smallRadical(modulus) : 1n;
  const dual = modulus / units;
  const shift = shifts(linear, stride);
  const offset = offsetOf(source, linear);
  const full = recurrenceTuples(linear, stride);
  const weight = (h: SparseVector): Weight => {
    let turns = offset * h.entries.reduce((sum, entry) => sum + entry, 0);
    if (increment !== 0n) {
      let moved = 0n;
      h.indices.forEach((index, k) => (moved += BigInt(h.entries[k] ?? 0) * shift(index)));
      turns += Number(((moved % modulus) + modulus) % modulus) / Number(modulus);
    }
    const size = multiplicative ? unitMean(h, full) : 1;
    if (size < 0) turns += 0.5;
    return { size: Math.abs(size), phase: turns - Math.floor(turns) };
  };
  const averaged = units === 1n ? "full" : "seed-averaged";
  return {
    kind: averaged,
    modulus: dual,
    tuples: recurrenceTuples({ multipliers, modulus: dual }, stride),
    what: `${wordsOf(linear, units)}${usage.seeding.kind === "published" ? PUBLISHED_SEEDS : ""}`,
    stationary: true,
    lags: lagsOf(linear, stride),
    weight,
    states: missingOrigin(linear) ? Number(modulus) ** multipliers.length : null,
    bits: usage.float32 ? 24 : Math.min(52, usage.bits?.count ?? bitsOf(modulus)),
  };
}

/** The recurrence of the bits that are used. */
function taken(
  { usage: { bits }, recurrence }: PseudoRandomSource,
  linear: LinearRecurrence,
): LinearRecurrence | NoAliasSet {
  if (recurrence.output.integers !== 1)
    return { reason: "a coordinate is made of two outputs, so tuples fill no lattice" };
  if (bits === null) return linear;
  const length = bitsOf(linear.modulus);
  if (linear.modulus !== 1n << BigInt(length))
    return {
      reason:
        "bits are cut out of outputs modulo a number that is no power of two, so tuples fill no lattice",
    };
  if (bits.end === "top") return linear;
  const modulus = 1n << BigInt(bits.count);
  return {
    ...linear,
    multipliers: linear.multipliers.map((multiplier) => multiplier % modulus),
    increment: linear.increment % modulus,
    modulus,
  };
}

/** What is added to x / m in a coordinate, as a share of 1. */
function offsetOf(
  { usage: { bits, endpoint }, recurrence: { output } }: PseudoRandomSource,
  { modulus }: LinearRecurrence,
): number {
  if (endpoint === "left") return 0;
  if (bits?.end === "low") return 0.5 / Number(modulus);
  return bits === null && output.zeroless ? 0 : 0.5 / Number(modulus);
}

function missingOrigin({ multipliers, increment, modulus }: LinearRecurrence): boolean {
  return increment === 0n && (multipliers.length > 1 || isPrime(modulus));
}

const PUBLISHED_SEEDS =
  "; the replicates start at published seeds, which are few of them and need not average to the same";

function wordsOf({ multipliers, increment, modulus }: LinearRecurrence, units: bigint): string {
  if (units > 1n)
    return units === 2n ? "all odd states, one shifted lattice" : `all states coprime to ${units}`;
  if (increment !== 0n) return "all states, one shifted lattice";
  if (multipliers.length > 1) return `all states of ${multipliers.length} words but zeros`;
  return isPrime(modulus) ? "all states from 1 to m \u2212 1" : "all states coprime to m";
}

/** The product of the small primes that divide m. */
function smallRadical(modulus: bigint): bigint {
  let product = 1n;
  if (isPrime(modulus)) return product;
  for (let p = 2n; p <= LARGEST_SMALL_PRIME; p++) {
    if (modulus % p === 0n && isPrime(p)) product *= p;
  }
  return product;
}

/** The mean of e^(2 pi i s x / m) over x coprime to m: mu(r) / phi(r). */
function unitMean(h: SparseVector, tuples: Tuples): number {
  const { modulus } = tuples;
  let s = 0n;
  h.indices.forEach((index, k) => (s += BigInt(h.entries[k] ?? 0) * (tuples.vector(index)[0] ?? 0n)));
  const r = modulus / gcd(((s % modulus) + modulus) % modulus, modulus);
  let mean = 1;
  for (const [p, exponent] of factorise(r)) {
    if (exponent > 1) return 0;
    mean /= 1 - Number(p);
  }
  return mean;
}

/** c_j of output j * stride = (linear part) + c_j mod m. */
function shifts(
  { multipliers, increment, modulus }: LinearRecurrence,
  stride: number,
): (index: number) => bigint {
  const order = multipliers.length;
  const known: bigint[] = Array.from({ length: order }, () => 0n);
  return (index) => {
    const wanted = index * stride;
    while (known.length <= wanted) {
      const sum = multipliers.reduce((total, a, k) => total + a * (known.at(-1 - k) ?? 0n), increment);
      known.push(sum % modulus);
    }
    return known[wanted] ?? 0n;
  };
}

/** The outputs that one step of a recurrence of higher order joins, where they are few. */
function lagsOf({ multipliers }: LinearRecurrence, stride: number): number[] | null {
  const order = multipliers.length;
  if (order === 1 || stride !== 1) return null;
  const lags = multipliers.flatMap((a, k) => (a === 0n ? [] : [order - 1 - k])).reverse();
  return lags.length > 6 ? null : [...lags, order];
}

/**
 * What is known of the points of a source before anything is evaluated: which waves they mistake for constants. Plane waves of
 * the dual lattice for generators and rank-1 lattices, Walsh functions of the dual net for unrandomised digital nets.
 */
import type { ExplainedStructure } from "../record/explanation.js";
import type { SourceChoice } from "../sources/choice.js";
import type { DigitalNet } from "../sources/contract.js";
import { bitsOf } from "../sources/conversion.js";
import { aliasSetOf, type AliasSet, type NoAliasSet, type SparseVector } from "../structure/alias-set.js";
import { aliasVectors } from "../structure/alias-vectors.js";
import { walshVectors } from "../structure/walsh-vectors.js";
import { isDigitalNet, netOfSource } from "../structure/net.js";
import type { Wave } from "./waves.js";

export interface KnownStructure {
  readonly structure: ExplainedStructure;
  /** In order of importance. */
  readonly waves: readonly Wave[];
  /** To be shown where there are no waves to speak of: the shortest one known. */
  readonly shortest: Wave | null;
  /** Why there are none; null where there are. */
  readonly reason: string | null;
  /** Whether dual vectors may be moved along the coordinates. */
  readonly stationary: boolean;
  /** See `AliasSet`. */
  readonly states: number | null;
}

/** Vectors that are looked at, at most. */
const MOST_VECTORS = 512;

/** Walsh functions, which cost more to evaluate. */
const MOST_FUNCTIONS = 256;

/** The structure of `choice` in `dimension` coordinates, its first n points where n matters. */
export function knownStructure(
  choice: SourceChoice,
  dimension: number,
  n: number,
): KnownStructure | NoAliasSet {
  const { source, randomisations } = choice;
  if (isDigitalNet(source) && randomisations.length === 0) return netStructure(source, dimension, n);
  if (source.nesting === "sequence" && source.family === "quasi-random" && randomisations.length > 0)
    return unbiased(randomisations);
  const set = aliasSetOf(choice, dimension, n);
  return "reason" in set ? set : latticeStructure(set, dimension);
}

function unbiased(randomisations: readonly string[]): NoAliasSet {
  const names = randomisations.join("+");
  return { reason: `its bias is 0 by theorem: the randomisation ${names} makes every point uniform` };
}

function latticeStructure(set: AliasSet, dimension: number): KnownStructure {
  const { vectors: found, shortest } = aliasVectors(set, dimension, MOST_VECTORS);
  const wave = (vector: SparseVector): Wave => ({ vector, ...set.weight(vector), walsh: null });
  const seen = found.filter((vector) => isSeen(vector, set));
  return {
    structure: { kind: set.kind, modulus: set.modulus.toString(), what: set.what },
    waves: seen.map(wave),
    shortest: shortest === null ? null : wave(shortest),
    reason: seen.length > 0 ? null : found.length > 0 ? TOO_FEW_BITS : TOO_FINE,
    stationary: set.stationary,
    states: set.states,
  };
}

const TOO_FINE = "its lattice is too fine to matter: no dual vector is shorter than 65,536";

const TOO_FEW_BITS = "its coordinates have too few bits for any of its dual vectors to be seen as a wave";

/** A wave is seen as it is where rounding moves h.u by less than this share of a turn. */
const LARGEST_MOVE = 0.01;

function isSeen({ entries }: SparseVector, { bits, modulus }: AliasSet): boolean {
  if (bits >= bitsOf(modulus)) return true;
  return entries.reduce((sum, entry) => sum + Math.abs(entry), 0) * 2 ** -(bits + 1) < LARGEST_MOVE;
}

function netStructure(source: DigitalNet, dimension: number, n: number): KnownStructure | NoAliasSet {
  const { base } = source.generatingMatrices(dimension, Math.max(n, 2));
  const points = base ** Math.max(1, Math.round(Math.log(n) / Math.log(base)));
  if (points !== n) {
    return {
      reason: `its first ${n} points are no net; take a power of ${base} (--points ${points})`,
    };
  }
  const net = netOfSource(source, dimension, n);
  const waves = walshVectors(net)
    .slice(0, MOST_FUNCTIONS)
    .map((vector): Wave => ({ vector, size: 1, phase: 0, walsh: base }));
  return {
    structure: {
      kind: "net",
      modulus: String(n),
      what: `the first ${base}^${net.digits} points, a digital net`,
    },
    waves,
    shortest: null,
    reason: waves.length > 0 ? null : "no short Walsh function of its dual net was found",
    stationary: false,
    states: null,
  };
}

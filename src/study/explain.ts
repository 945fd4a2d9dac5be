/**
 * From a problem and a lattice-structured source to what its dual vectors do to the integral: the truncated sum S_K of Fourier
 * coefficients (structure/alias-set.ts, prediction.ts) beside the bias that was measured. "Explained" needs the measured
 * bias less S_K to hold 0 in its interval, S_K to be other than 0, and the step from K to 2K to add nothing that matters.
 */
import type {
  Alias,
  Estimated,
  Explanation,
  MeasuredBias,
  PlaneComb,
  PredictedBias,
} from "../record/explanation.js";
import type { SourceChoice } from "../sources/choice.js";
import { bitsOf } from "../sources/conversion.js";
import { aliasSetOf, type AliasSet, type SparseVector } from "../structure/alias-set.js";
import { aliasVectors } from "../structure/alias-vectors.js";
import { AliasEstimator, type Wave } from "./alias-estimate.js";
import { aliasGroups, planesOf, type Group } from "./alias-groups.js";
import { unboundedAlong } from "./growth.js";
import { planeComb } from "./plane-comb.js";
import { aroundOf, FIRST, PILOT, predictBias, type PredictionRequest } from "./prediction.js";

export interface ExplainRequest extends PredictionRequest {
  readonly choice: SourceChoice;
  readonly output: string;
  /** Points of one estimate; a rank-1 lattice is that of n points. */
  readonly n: number;
}

/** Vectors that are looked at, at most. */
const MOST_VECTORS = 512;

/** Points that the mean of the integrand over planes is drawn from. */
const PROFILE = { replicates: 16, points: 16_384 };

/** What a source's structure predicts for an integrand, or why nothing can be predicted. */
export function explain(request: ExplainRequest): Explanation {
  const known = structureOf(request);
  if (!("set" in known)) return known;
  const { set, vectors, explanation } = known;
  if (vectors.length === 0) return explanation;
  const waves = vectors.map((vector): Wave => ({ vector, ...set.weight(vector) }));
  return { ...explanation, ...predict(request, set, waves, explanation.aliases) };
}

/** The structure alone, for a pair whose bias was not asked about; null where there is none. */
export function structureOnly(request: ExplainRequest, reason: string): Explanation | null {
  const known = structureOf(request);
  if (!("set" in known)) return null;
  return { ...known.explanation, reason: known.explanation.reason ?? reason };
}

interface Known {
  readonly set: AliasSet;
  readonly vectors: readonly SparseVector[];
  readonly explanation: Explanation;
}

function structureOf({ problem, choice, n, measured, output }: ExplainRequest): Known | Explanation {
  const { dimension } = problem.formula;
  const set = aliasSetOf(choice, dimension, n);
  const none: Explanation = {
    ...{ problem: problem.id, source: choice.id, estimator: "crude", output },
    structure: null,
    reason: null,
    predicted: null,
    measured,
    difference: null,
    explained: false,
    aliases: [],
    comb: null,
    fullCycle: null,
    resolution: null,
  };
  if ("reason" in set) return { ...none, reason: set.reason };
  const { vectors: found, shortest } = aliasVectors(set, dimension, MOST_VECTORS);
  const vectors = found.filter((vector) => isSeen(vector, set));
  const explanation = {
    ...none,
    structure: { kind: set.kind, modulus: set.modulus.toString(), what: set.what },
    reason: vectors.length > 0 ? null : found.length > 0 ? TOO_FEW_BITS : TOO_FINE,
    aliases: shortestAliases(vectors, shortest, set),
  };
  return { set, vectors, explanation };
}

/** A wave is seen as it is where rounding moves h.u by less than this share of a turn. */
const LARGEST_MOVE = 0.01;

function isSeen({ entries }: SparseVector, { bits, modulus }: AliasSet): boolean {
  if (bits >= bitsOf(modulus)) return true;
  return entries.reduce((sum, entry) => sum + Math.abs(entry), 0) * 2 ** -(bits + 1) < LARGEST_MOVE;
}

const TOO_FINE = "its lattice is too fine to matter: no dual vector is shorter than 65,536";

const TOO_FEW_BITS = "its coordinates have too few bits for any of its dual vectors to be seen as a wave";

type Findings = Pick<Explanation, "reason" | "predicted" | "difference" | "explained" | "aliases" | "comb">;

function predict(
  request: ExplainRequest,
  set: AliasSet,
  waves: readonly Wave[],
  shortest: readonly Alias[],
): Findings {
  const { problem, seed, centre, measured, confidence } = request;
  const nothing = { predicted: null, difference: null, explained: false, aliases: shortest, comb: null };
  const estimator = new AliasEstimator(problem);
  const pilot = estimator.estimate(waves, { seed, first: FIRST.pilot, ...PILOT, centre });
  if (!pilot.means.every(Number.isFinite)) return { ...nothing, reason: NON_FINITE };
  const edge = unboundedAlong(problem, centre, pilot.reach);
  if (edge !== null) return { ...nothing, reason: unbounded(edge) };

  const { predicted, waves: taken, contributions } = predictBias(estimator, waves, set.states, request);
  const difference = differenceOf(measured, predicted, confidence);
  const zero = (interval: readonly [number, number]): boolean => interval[0] <= 0 && interval[1] >= 0;
  const explained =
    difference !== null && zero(difference.interval) && !zero(predicted.interval) && predicted.stable;
  const aliases = aliasGroups(taken, contributions, set.stationary).map(toAlias);
  const comb = combOf(request, estimator, aliases[0]);
  return { reason: null, predicted, difference, explained, aliases, comb };
}

function combOf(
  { choice, problem, n, seed, centre }: ExplainRequest,
  estimator: AliasEstimator,
  alias: Alias | undefined,
): PlaneComb | null {
  if (alias === undefined) return null;
  const { dimension } = problem.formula;
  const sample = { seed, first: FIRST.profile, ...PROFILE, centre };
  return planeComb({
    ...{ choice, problem: problem.id, dimension, n, seed, alias },
    profile: (bins, binOf) => estimator.profile(bins, binOf, sample),
  });
}

const NON_FINITE = "the integrand takes values that are not finite";

function unbounded(edge: number): string {
  return (
    `the integrand grows without bound towards an edge of coordinate ${edge + 1}, so its Fourier series says little; ` +
    "only the average over the full cycle can be computed (--full-cycle)"
  );
}

function differenceOf(
  measured: MeasuredBias | null,
  predicted: PredictedBias,
  confidence: number,
): Estimated | null {
  if (measured === null) return null;
  const error = Math.hypot(measured.standardError ?? 0, predicted.standardError);
  const fewest = Math.min(
    predicted.replicates,
    measured.standardError === null ? Infinity : measured.replicates,
  );
  return aroundOf({ mean: measured.value - predicted.value, error }, confidence, fewest - 1);
}

/** Vectors that are shown where nothing was estimated. */
const SHOWN = 3;

function shortestAliases(
  vectors: readonly SparseVector[],
  shortest: SparseVector | null,
  set: AliasSet,
): Alias[] {
  const shown = vectors.length > 0 ? vectors : shortest === null ? [] : [shortest];
  const waves = shown.map((vector): Wave => ({ vector, ...set.weight(vector) }));
  const primitive = waves.filter(({ vector: { entries } }) => entries.reduce(gcd, 0) === 1);
  return aliasGroups(primitive.length > 0 ? primitive : waves, null, set.stationary)
    .slice(0, SHOWN)
    .map(toAlias);
}

function gcd(a: number, b: number): number {
  return b === 0 ? Math.abs(a) : gcd(b, a % b);
}

function toAlias({ wave, copies, contribution, standardError }: Group): Alias {
  const { vector, size, phase } = wave;
  return {
    indices: vector.indices,
    entries: vector.entries,
    copies,
    size,
    phase,
    planes: planesOf(vector, phase),
    gap: 1 / Math.hypot(...vector.entries),
    contribution,
    standardError,
  };
}

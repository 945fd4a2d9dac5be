/**
 * From a problem and a lattice-structured source to what its dual vectors do to the integral: the truncated sum S_K of Fourier
 * coefficients (structure/alias-set.ts, prediction.ts) beside the bias that was measured. "Explained" needs a bias
 * that was measured and S_K both to be other than 0, their difference to hold 0 in its interval, and the step from K to 2K to
 * add nothing that matters.
 */
import type {
  Alias,
  Estimated,
  ExplainedStructure,
  Explanation,
  MeasuredBias,
  PlaneComb,
  PredictedBias,
} from "../record/explanation.js";
import type { SourceChoice } from "../sources/choice.js";
import type { NoAliasSet } from "../structure/alias-set.js";
import { AliasEstimator } from "./alias-estimate.js";
import { aliasGroups, planesOf, type Group } from "./alias-groups.js";
import { unboundedAlong } from "./growth.js";
import { knownStructure, type KnownStructure } from "./known-structure.js";
import { planeComb } from "./plane-comb.js";
import { aroundOf, FIRST, PILOT, predictBias, type PredictionRequest } from "./prediction.js";

export interface ExplainRequest extends PredictionRequest {
  readonly choice: SourceChoice;
  readonly output: string;
  /** Points of one estimate; a rank-1 lattice is that of n points. */
  readonly n: number;
}

/** Points that the mean of the integrand over planes is drawn from. */
const PROFILE = { replicates: 16, points: 16_384 };

/** What a source's structure predicts for an integrand, or why nothing can be predicted. */
export function explain(request: ExplainRequest): Explanation {
  const known = knownStructure(request.choice, request.problem.formula.dimension, request.n);
  const explanation = withStructure(request, known);
  if ("structure" in known && known.reason === null)
    return { ...explanation, ...predict(request, known, explanation.aliases) };
  return explanation;
}

/** The structure alone, for a pair whose bias was not asked about; null where there is none. */
export function structureOnly(request: ExplainRequest, reason: string): Explanation | null {
  const known = knownStructure(request.choice, request.problem.formula.dimension, request.n);
  if (!("structure" in known)) return null;
  return { ...withStructure(request, known), reason: known.reason ?? reason };
}

function withStructure(
  { problem, choice, measured, output }: ExplainRequest,
  known: KnownStructure | NoAliasSet,
): Explanation {
  const has = "structure" in known;
  return {
    ...{ problem: problem.id, source: choice.id, estimator: "crude", output },
    structure: has ? known.structure : null,
    reason: known.reason,
    predicted: null,
    measured,
    difference: null,
    explained: false,
    aliases: has ? shortestAliases(known) : [],
    comb: null,
    fullCycle: null,
    resolution: null,
  };
}

type Findings = Pick<Explanation, "reason" | "predicted" | "difference" | "explained" | "aliases" | "comb">;

function predict(request: ExplainRequest, known: KnownStructure, shortest: readonly Alias[]): Findings {
  const { waves, states, stationary, structure } = known;
  const { problem, seed, centre, measured, confidence } = request;
  const nothing = { predicted: null, difference: null, explained: false, aliases: shortest, comb: null };
  const estimator = new AliasEstimator(problem);
  const pilot = estimator.estimate(waves, { seed, first: FIRST.pilot, ...PILOT, centre });
  if (!pilot.means.every(Number.isFinite)) return { ...nothing, reason: NON_FINITE };
  const edge = unboundedAlong(problem, centre, pilot.reach);
  if (edge !== null) return { ...nothing, reason: unbounded(edge, structure.kind) };

  const { predicted, waves: taken, contributions } = predictBias(estimator, waves, states, request);
  const difference = differenceOf(measured, predicted, confidence);
  const zero = (interval: readonly [number, number]): boolean => interval[0] <= 0 && interval[1] >= 0;
  const explained =
    measured !== null &&
    difference !== null &&
    !zero(measured.interval) &&
    !zero(predicted.interval) &&
    zero(difference.interval) &&
    predicted.stable;
  const aliases = aliasGroups(taken, contributions, stationary).map(toAlias);
  const comb = combOf(request, estimator, aliases[0]);
  return { reason: null, predicted, difference, explained, aliases, comb };
}

function combOf(
  { choice, problem, n, seed, centre }: ExplainRequest,
  estimator: AliasEstimator,
  alias: Alias | undefined,
): PlaneComb | null {
  if (alias === undefined || alias.walsh !== null) return null;
  const { dimension } = problem.formula;
  const sample = { seed, first: FIRST.profile, ...PROFILE, centre };
  return planeComb({
    ...{ choice, problem: problem.id, dimension, n, seed, alias },
    profile: (bins, binOf) => estimator.profile(bins, binOf, sample),
  });
}

const NON_FINITE = "the integrand takes values that are not finite";

function unbounded(edge: number, kind: ExplainedStructure["kind"]): string {
  const cycle = kind === "full" || kind === "seed-averaged";
  return (
    `the integrand grows without bound towards an edge of coordinate ${edge + 1}, so its ` +
    (cycle
      ? "Fourier series says little; only the average over the full cycle can be computed (--full-cycle)"
      : "series says little; its error can only be measured")
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

function shortestAliases({ waves, shortest, stationary }: KnownStructure): Alias[] {
  const shown = waves.length > 0 ? waves : shortest === null ? [] : [shortest];
  const primitive = shown.filter(
    ({ walsh, vector: { entries } }) => walsh !== null || entries.reduce(gcd, 0) === 1,
  );
  return aliasGroups(primitive.length > 0 ? primitive : shown, null, stationary)
    .slice(0, SHOWN)
    .map(toAlias);
}

function gcd(a: number, b: number): number {
  return b === 0 ? Math.abs(a) : gcd(b, a % b);
}

function toAlias({ wave, copies, contribution, standardError }: Group): Alias {
  const { vector, size, phase, walsh } = wave;
  return {
    walsh,
    indices: vector.indices,
    entries: vector.entries,
    copies,
    size,
    phase,
    planes: walsh === null ? planesOf(vector, phase) : null,
    gap: walsh === null ? 1 / Math.hypot(...vector.entries) : null,
    contribution,
    standardError,
  };
}

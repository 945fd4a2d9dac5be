/**
 * The stage of a study that asks which inputs matter, once per problem: a small part of the study's own evaluations, a
 * function of the spec alone, so that a run that is taken up again gives the same.
 */
import { setImmediate } from "node:timers/promises";
import { isMean, quantityName } from "../problem/quantity.js";
import type { Sensitivity } from "../record/sensitivity.js";
import type { StudySpec } from "../record/types.js";
import type { RunnableProblem } from "./runnable.js";
import { parseSource } from "../sources/choice.js";
import { netPairs } from "./net-pairs.js";
import { measureSensitivity } from "./sensitivity.js";

/** Points in all replicates together. */
const POINTS = 2 ** 12;
/** Coordinates of evaluated points at most: some tenths of a second. */
const COORDINATES = 2 ** 26;
/** Part of the study's coordinates on that problem. */
const PART = 0.1;

export interface SensitivitiesRequest {
  readonly spec: StudySpec;
  readonly problems: readonly RunnableProblem[];
  readonly signal: AbortSignal;
  /** Called behind each problem. */
  readonly done: () => void;
}

/** In the order of problems; none after an abort. */
export async function measureSensitivities(request: SensitivitiesRequest): Promise<Sensitivity[]> {
  const { spec, problems, signal, done } = request;
  const found: Sensitivity[] = [];
  for (const described of spec.problems) {
    const problem = problems.find(({ id }) => id === described.id);
    if (signal.aborted) return [];
    if (problem === undefined || !isMean(described.quantity)) continue;
    const largest = Math.max(0, ...(spec.sizes[described.id] ?? []));
    const estimates = (spec.replicates[described.id] ?? 1) * (spec.sources[described.id] ?? []).length;
    const coordinates = Math.min(COORDINATES, PART * largest * estimates * described.dimension);
    const request = { seed: spec.seed, points: POINTS, coordinates };
    const figures = measureSensitivity(problem, described, request);
    const sources = (spec.sources[described.id] ?? []).map(parseSource);
    found.push({
      ...figures,
      output: quantityName(described.quantity),
      nets: netPairs(figures, sources, largest),
    });
    done();
    await setImmediate();
  }
  return found;
}

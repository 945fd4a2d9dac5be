/**
 * The stage of a study that measures what the lines of its budgets need beside the estimates: once per problem, in bounded
 * time (some tenths of a second each), a function of the seed and the problem alone, so that a run that is taken up again
 * gives the same.
 */
import { setImmediate } from "node:timers/promises";
import { isMean } from "../../problem/quantity.js";
import type { ProblemMeasurements } from "../../record/measurements.js";
import type { StudySpec } from "../../record/types.js";
import { parseSource } from "../../sources/choice.js";
import { COORDINATE_BITS } from "../../sources/conversion.js";
import { cellsOf, resolutionCost } from "../resolution.js";
import type { RunnableProblem } from "../runnable.js";
import { measureArithmetic } from "./arithmetic.js";
import { measureTail } from "./tail.js";
import { measureTransform } from "./transform.js";

const RESOLUTION = { replicates: 16, points: 512, coordinates: 2 ** 14 };

export interface MeasureRequest {
  readonly spec: StudySpec;
  readonly problems: readonly RunnableProblem[];
  readonly signal: AbortSignal;
  /** Called behind each problem. */
  readonly done: () => void;
}

/** In the order of problems; none after an abort. */
export async function measureProblems(request: MeasureRequest): Promise<ProblemMeasurements[]> {
  const { spec, problems, signal, done } = request;
  const found: ProblemMeasurements[] = [];
  for (const described of spec.problems) {
    const problem = problems.find(({ id }) => id === described.id);
    if (signal.aborted) return [];
    // What is measured here is measured for means; the lines of other quantities say so.
    if (problem === undefined || !isMean(described.quantity)) continue;
    found.push({
      problem: described.id,
      resolution: measureResolution(spec, problem, described.tolerance.confidence),
      transform: measureTransform(problem, spec.seed),
      arithmetic: await measureArithmetic(problem, described, spec.seed),
      tail: measureTail(problem, spec.seed),
    });
    done();
    await setImmediate();
  }
  return found;
}

function measureResolution(
  spec: StudySpec,
  problem: RunnableProblem,
  confidence: number,
): ProblemMeasurements["resolution"] {
  const choices = (spec.sources[problem.id] ?? []).map(parseSource).filter((choice) => !choice.deterministic);
  const groups = new Map<string, { sources: string[]; cells: ReturnType<typeof cellsOf> }>();
  for (const { id, source } of choices) {
    const cells = cellsOf(source);
    if (cells.bits >= COORDINATE_BITS && cells.endpoint === "middle") continue;
    const key = `${cells.bits} ${cells.endpoint}`;
    const group = groups.get(key) ?? { sources: [], cells };
    groups.set(key, group);
    if (!group.sources.includes(id)) group.sources.push(id);
  }
  const { replicates, points, coordinates } = RESOLUTION;
  const size = Math.min(points, Math.max(64, Math.floor(coordinates / problem.formula.dimension)));
  return [...groups.values()].map(({ sources, cells }) => ({
    sources,
    cost: resolutionCost(problem, cells.bits, {
      seed: spec.seed,
      points: size,
      replicates,
      confidence,
      endpoint: cells.endpoint,
    }),
  }));
}

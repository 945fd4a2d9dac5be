/** The look-up tables that findings share: problems, sources, references, measurements and explanations by name. */
import type { Problem } from "../problem/contract.js";
import type { Explanation } from "../record/explanation.js";
import type { ProblemMeasurements } from "../record/measurements.js";
import type { Consensus, RawCell, RecordSource, StudyRecord } from "../record/types.js";
import { seriesKey } from "./series.js";
import type { Context } from "./cells.js";
import { divergentProblems } from "./divergence.js";
import { referencesOf } from "./reference.js";

export function makeContext(
  problems: readonly Problem[],
  sources: readonly RecordSource[],
  consensus: readonly Consensus[],
  explanations: readonly Explanation[] = [],
  measurements: readonly ProblemMeasurements[] = [],
  rawCells: readonly RawCell[] = [],
): Context {
  const byId = new Map(sources.map((source) => [source.id, source]));
  return {
    problems: new Map(problems.map((problem) => [problem.id, problem])),
    sources: byId,
    references: referencesOf(problems, consensus),
    explanations: new Map(explanations.map((explanation) => [seriesKey(explanation), explanation])),
    measurements: new Map(measurements.map((one) => [one.problem, one])),
    divergent: divergentProblems(measurements, rawCells, byId),
  };
}

/** The look-up tables of a record as it stands, for what is read off it later. */
export function recordContext(record: StudyRecord): Context {
  const { problems, sources, consensus, explanations, measurements, cells } = record;
  return makeContext(problems, sources, consensus, explanations, measurements, cells);
}

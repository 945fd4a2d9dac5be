/** The look-up tables that findings share: problems, sources and references by name. */
import type { Problem } from "../problem/contract.js";
import type { Explanation } from "../record/explanation.js";
import type { Consensus, RecordSource } from "../record/types.js";
import { seriesKey } from "./series.js";
import type { Context } from "./cells.js";
import { referencesOf } from "./reference.js";

export function makeContext(
  problems: readonly Problem[],
  sources: readonly RecordSource[],
  consensus: readonly Consensus[],
  explanations: readonly Explanation[] = [],
): Context {
  return {
    problems: new Map(problems.map((problem) => [problem.id, problem])),
    sources: new Map(sources.map((source) => [source.id, source])),
    references: referencesOf(problems, consensus),
    explanations: new Map(explanations.map((explanation) => [seriesKey(explanation), explanation])),
  };
}

/** The library's face: what the command line does, as functions. Types are exported with what uses them. */
export { loadPaths, type LoadedProblem, type LoadedProblems } from "./problem/load.js";
export type { Problem, SourceSpec, StudySettings } from "./problem/contract.js";
export { buildSpec, type SpecResult } from "./study/settings.js";
export { prepareProblems, type RunnableProblem } from "./study/runnable.js";
export { inProcess, threads, type Executor } from "./study/executor.js";
export { cycleExecutor, fullCycle, type CycleRun } from "./study/full-cycle.js";
export { resolutionCost, type ResolutionRequest } from "./study/resolution.js";
export { runStudy, type Stage, type StudyRun } from "./recipe.js";
export type * from "./record/types.js";
export type * from "./record/resolution.js";
export { parseSource, type SourceChoice } from "./sources/choice.js";
export { listSources } from "./sources/registry.js";
export { compileFormula, interpretFormula } from "./formula/index.js";
export { headlinesOf, exitCodeOf, type Headline } from "./findings/headline.js";
export { writeReport, type ReportFiles, type ReportOptions } from "./report/index.js";

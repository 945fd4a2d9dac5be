/** From what was run to the record: cells, tests, convergence, budgets, warnings. Pure; touches no file. */
import type { Problem } from "../problem/contract.js";
import type { Explanation } from "../record/explanation.js";
import { digestOf } from "../record/json.js";
import type { ProblemMeasurements } from "../record/measurements.js";
import type { Sensitivity } from "../record/sensitivity.js";
import {
  RECORD_SCHEMA,
  type BiasTest,
  type Budget,
  type Cell,
  type Consensus,
  type Environment,
  type RawCell,
  type RecordSource,
  type SpreadTest,
  type Stop,
  type StudyRecord,
  type StudySpec,
} from "../record/types.js";
import type { Confirmation } from "./bias.js";
import { budgetOf } from "./budget/total.js";
import { toCells, type Context } from "./cells.js";
import { makeContext } from "./context.js";
import { convergenceOf } from "./convergence.js";
import { confirmFamily, screenFamily, type Family } from "./family.js";
import { seriesKey, seriesOf, type Series } from "./series.js";
import { withdrawn } from "./sensitivity.js";
import { judgedProblems } from "./until.js";
import { warningsOf } from "./warnings.js";

export interface Measured {
  readonly spec: StudySpec;
  readonly problems: readonly Problem[];
  readonly sources: readonly RecordSource[];
  readonly rawCells: readonly RawCell[];
  readonly consensus: readonly Consensus[];
  readonly measurements: readonly ProblemMeasurements[];
}

export interface Assembly extends Measured {
  readonly environment: Environment;
  /** Estimates on fresh keys for the candidates of `candidatesOf`. */
  readonly confirmations: readonly Confirmation[];
  /** What the structure of sources does to integrands. */
  readonly explanations: readonly Explanation[];
  /** Which inputs matter, by the figures alone. */
  readonly sensitivity: readonly Sensitivity[];
  /** Where each source stopped; only of a study that stops at the tolerance. */
  readonly stops?: readonly Stop[];
  /** Warnings from before the run, shown first. */
  readonly warnings: readonly string[];
}

/** Stage 1 alone: the tests to be repeated on fresh keys, at the test's n with R = 256. */
export function candidatesOf(measured: Measured): (BiasTest | SpreadTest)[] {
  const context = contextOf(measured);
  const series = seriesOf(toCells(measured.rawCells, context, false));
  const { tests, spreadTests } = screenFamily(series, context, measured.spec.falseAlarms);
  return [...tests, ...spreadTests].filter((test) => test.candidate);
}

/** Stage 2: cells (without the one costly interval) and completed tests, which tell what there is to explain. */
export function confirmedTests(
  measured: Measured,
  confirmations: readonly Confirmation[],
): { readonly cells: readonly Cell[]; readonly tests: readonly BiasTest[] } {
  const context = contextOf(measured);
  const cells = toCells(measured.rawCells, context, false);
  return { cells, tests: familyOf(cells, measured, confirmations, context).tests };
}

function familyOf(
  cells: readonly Cell[],
  { spec }: Measured,
  confirmations: readonly Confirmation[],
  context: Context,
): Family {
  const series = seriesOf(cells);
  const screened = screenFamily(series, context, spec.falseAlarms);
  return confirmFamily(screened, confirmations, series, context, spec.falseAlarms);
}

function contextOf(
  { spec, problems, sources, consensus, measurements, rawCells }: Measured,
  explanations: readonly Explanation[] = [],
): Context {
  return makeContext(
    judgedProblems(spec, problems),
    sources,
    consensus,
    explanations,
    measurements,
    rawCells,
  );
}

export function assembleRecord(assembly: Assembly): StudyRecord {
  const { spec, environment, problems, sources, rawCells, consensus, confirmations } = assembly;
  const context = contextOf(assembly, assembly.explanations);
  const cells = toCells(rawCells, context);
  const series = seriesOf(cells);
  const { tests, spreadTests, size } = familyOf(cells, assembly, confirmations, context);
  const testOf = new Map(tests.map((test) => [seriesKey(test), test]));
  const budgets = series.flatMap((one) => {
    const budget = budgetOf(one, testOf.get(seriesKey(one)), context);
    return budget === null ? [] : [budget];
  });
  return {
    schema: RECORD_SCHEMA,
    spec,
    specDigest: digestOf(spec),
    digest: digestOf(cells.map((cell) => cell.digest)),
    environment,
    problems,
    sources,
    consensus,
    cells,
    tests,
    spreadTests,
    family: { tests: size, level: spec.falseAlarms },
    convergence: series.map((one) => convergenceOf(one, testOf.get(seriesKey(one)), context)),
    budgets: [...budgets, ...inUseBudgets(problems, series, testOf, context)],
    explanations: assembly.explanations,
    ...(assembly.stops === undefined ? {} : { stops: assembly.stops }),
    measurements: assembly.measurements,
    sensitivity: withdrawn(assembly.sensitivity, context.divergent),
    warnings: [...new Set([...assembly.warnings, ...warningsOf(series, consensus, context)])],
  };
}

/** The budget of what is in use, one per problem and output that states it. */
function inUseBudgets(
  problems: readonly Problem[],
  series: readonly Series[],
  testOf: ReadonlyMap<string, BiasTest>,
  context: Context,
): Budget[] {
  return problems.flatMap((problem) => {
    const { inUse } = problem;
    if (inUse === null) return [];
    const used = series.filter((one) => one.problem === problem.id && one.source === inUse.source);
    const first = used.find((one) => one.estimator === "crude") ?? used[0];
    return used
      .filter((one) => one.estimator === first?.estimator)
      .flatMap((one) => budgetOf(one, testOf.get(seriesKey(one)), context, inUse.points, true) ?? []);
  });
}

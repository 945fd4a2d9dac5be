/** From problems and their resolved settings to the spec of a study, and from the spec to its tasks. */
import type { Problem, SourceSpec } from "../problem/contract.js";
import type { RecordSource, StudySpec } from "../record/types.js";
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { planTasks, type Task } from "./tasks.js";

/** Most points per replicate at which what is in use is run itself; above, the fitted curve speaks for it. */
export const LARGEST_IN_USE = 2 ** 22;

/** The sources that a missing reference is formed from: three families, each sound and randomised. */
export function referenceSources(dimension: number): readonly string[] {
  const candidates = ["sobol+owen", "lattice+shift", "philox4x32", "pcg64", "xoshiro256++"];
  return candidates.filter((id) => parseSource(id).source.largestDimension >= dimension).slice(0, 3);
}

/** A consensus is formed at this multiple of the study's largest size. */
export const REFERENCE_FACTOR = 4;

/** Distinct valid sizes of a source for the sizes asked for, ascending. */
export function validSizes(choice: SourceChoice, sizes: readonly number[]): number[] {
  return [...new Set(sizes.map((n) => choice.source.nearestSize(n)))].sort((a, b) => a - b);
}

/** Sizes of `choice` on `problem`: the study's, and the number of points in use where this source is the one in use. */
function sizesFor(spec: StudySpec, problem: Problem, choice: SourceChoice): number[] {
  const sizes = spec.sizes[problem.id] ?? [];
  const { inUse } = problem;
  const own =
    spec.purpose === undefined &&
    inUse !== null &&
    choice.id === parseSource(inUse.source).id &&
    inUse.points <= LARGEST_IN_USE;
  return validSizes(choice, own ? [...sizes, inUse.points] : sizes);
}

interface Row {
  readonly problem: Problem;
  readonly choice: SourceChoice;
  readonly spec: SourceSpec;
}

function rows(spec: StudySpec): Row[] {
  return spec.problems.flatMap((problem) =>
    (spec.sources[problem.id] ?? []).map((source) => ({
      problem,
      choice: parseSource(source),
      spec: source,
    })),
  );
}

function request(spec: StudySpec, { problem, choice, spec: source }: Row) {
  return {
    problem: problem.id,
    dimension: problem.dimension,
    source,
    sourceId: choice.id,
    perSize: choice.source.nesting === "per-size",
    estimators: spec.estimators[problem.id] ?? [],
    seed: spec.seed,
    singlePass: choice.source.singlePass === true,
  };
}

/** The first stage: every problem x source, all sizes. A deterministic source has one replicate. */
export function studyTasks(spec: StudySpec): Task[] {
  return rows(spec).flatMap((row) => {
    const replicates = row.choice.deterministic ? 1 : (spec.replicates[row.problem.id] ?? 1);
    const sizes = sizesFor(spec, row.problem, row.choice);
    return planTasks({
      ...request(spec, row),
      purpose: spec.purpose ?? "study",
      replicates,
      sizes,
      before: 0,
    });
  });
}

/** The looks at one problem x source: sizes ascending, and the tasks of one of them. */
export interface Looks {
  readonly problem: string;
  readonly source: string;
  readonly sizes: readonly number[];
  tasks(n: number): Task[];
}

/**
 * The looks of a study that stops at the tolerance. Each look begins the points anew, which doubles the work at most and
 * leaves every estimate as it would be in a study of all sizes.
 */
export function studyLooks(spec: StudySpec): Looks[] {
  return rows(spec).map((row) => {
    const replicates = row.choice.deterministic ? 1 : (spec.replicates[row.problem.id] ?? 1);
    const common = { ...request(spec, row), purpose: "study", replicates, before: 0, look: true } as const;
    return {
      problem: row.problem.id,
      source: row.choice.id,
      sizes: sizesFor(spec, row.problem, row.choice),
      tasks: (n) => planTasks({ ...common, sizes: [n] }),
    };
  });
}

/** The long runs that a missing reference is formed from. */
export function referenceTasks(spec: StudySpec): Task[] {
  return spec.problems
    .filter((problem) => problem.reference === null)
    .flatMap((problem) =>
      referenceSources(problem.dimension).flatMap((source) => {
        const choice = parseSource(source);
        const n = choice.source.nearestSize(REFERENCE_FACTOR * Math.max(...(spec.sizes[problem.id] ?? [1])));
        const row = { problem, choice, spec: source };
        const replicates = spec.replicates[problem.id] ?? 1;
        const estimators = ["crude"];
        const own = { estimators, purpose: "reference" as const, replicates, sizes: [n], before: 0 };
        return planTasks({ ...request(spec, row), ...own });
      }),
    );
}

/** A candidate of the first stage, to be confirmed at its own n. */
export interface ConfirmationRequest {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly n: number;
}

/** Fewer fresh replicates than this confirm nothing. */
const FEWEST_FRESH = 32;

/**
 * The second stage: fresh keys for the candidates, `replicates` of them, or as many as a source has left (draws from a
 * file come to an end); a candidate without them stays unconfirmed.
 */
export function confirmationTasks(
  spec: StudySpec,
  candidates: readonly ConfirmationRequest[],
  replicates: number,
): Task[] {
  const wanted = (row: Row) =>
    candidates.filter((c) => c.problem === row.problem.id && c.source === row.choice.id);
  return rows(spec).flatMap((row) => {
    const sizes = [...new Set(wanted(row).map((c) => c.n))].sort((a, b) => a - b);
    const estimators = [...new Set(wanted(row).map((c) => c.estimator))];
    if (sizes.length === 0) return [];
    const before = spec.replicates[row.problem.id] ?? 1;
    const largest = Math.max(...sizesFor(spec, row.problem, row.choice));
    const supply = row.choice.source.replicateSupply?.(row.problem.dimension, largest);
    const fresh = Math.min(replicates, (supply?.count ?? Infinity) - before);
    if (fresh < FEWEST_FRESH || supply?.fresh === false) return [];
    const own = { estimators, purpose: "confirmation" as const, replicates: fresh, sizes, before };
    return planTasks({ ...request(spec, row), ...own });
  });
}

/** The sources of a study as the record describes them, each once. */
export function recordSources(spec: StudySpec): RecordSource[] {
  const byId = new Map(rows(spec).map(({ choice }) => [choice.id, choice]));
  return [...byId.values()].map(recordSource);
}

/** A source as a record describes it. */
export function recordSource({ source, randomisations, deterministic, id }: SourceChoice): RecordSource {
  const { title, citation, family, method, outputBits, period, largestDimension, nesting, knownStructure } =
    source;
  return {
    title,
    citation,
    family,
    method,
    outputBits,
    largestDimension,
    nesting,
    knownStructure,
    id,
    period: period === null ? null : period.toString(),
    deterministic,
    randomisations,
    ...(source.repeatable === false ? { repeatable: source.repeatable } : {}),
  };
}

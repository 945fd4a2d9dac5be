/** From loaded problems and flags to the spec of a study: every setting resolved, every source and size checked. */
import { nearest } from "../numeric/nearest.js";
import type { Problem, StudySettings } from "../problem/contract.js";
import { resolveSettings, settingValues, type ResolvedSettings } from "../problem/settings.js";
import type { StudySpec } from "../record/types.js";
import { estimatorIds } from "../estimators/registry.js";
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { fitQuantity } from "./fit-quantity.js";
import { validSizes } from "./spec.js";

/** A problem with the settings of the suite around it. */
export interface SuiteProblem {
  readonly problem: Problem;
  readonly suite: { readonly study: StudySettings } | null;
}

/** Every setting of a problem, and where it comes from. */
export function settingsOf({ problem, suite }: SuiteProblem, flags: StudySettings): ResolvedSettings {
  return resolveSettings({
    flags,
    problem: problem.study,
    ...(suite === null ? {} : { suite: suite.study }),
  });
}

/** Sources that cannot serve a problem are left out of it and said; the others go on. */
export interface SpecResult {
  readonly spec: StudySpec;
  readonly warnings: readonly string[];
}

/**
 * The spec of a study over `entries`. Throws RangeError for an unknown source or estimator, for problems that disagree on
 * the seed or the level of false alarms (they are one study), and where no source is left for a problem.
 */
export function buildSpec(entries: readonly SuiteProblem[], flags: StudySettings): SpecResult {
  const warnings: string[] = [];
  const settings = entries.map((entry) =>
    fitQuantity(entry.problem, settingValues(settingsOf(entry, flags)), warnings),
  );
  const perProblem = <T>(value: (index: number) => T): Record<string, T> =>
    Object.fromEntries(entries.map(({ problem }, i) => [problem.id, value(i)]));
  for (const { estimators } of settings) estimators.forEach(checkEstimator);
  const sources = entries.map(({ problem }, i) =>
    usableSources(problem, (settings[i] as (typeof settings)[number]).sources.map(parseSource), warnings),
  );
  const at = (i: number) => settings[i] as (typeof settings)[number];
  entries.forEach(({ problem }, i) => {
    for (const choice of sources[i] ?? []) checkSupply(problem, choice, at(i).sizes, at(i).replicates);
  });
  checkPasses(entries, sources, warnings);
  const spec: StudySpec = {
    problems: entries.map(({ problem }) => problem),
    sources: perProblem((i) => (sources[i] ?? []).map((choice) => choice.spec)),
    sizes: perProblem((i) => at(i).sizes),
    replicates: perProblem((i) => at(i).replicates),
    estimators: perProblem((i) => at(i).estimators),
    falseAlarms: common(
      entries,
      settings.map((s) => s.falseAlarms),
      "falseAlarms",
      "--false-alarms",
    ),
    seed: common(
      entries,
      settings.map((s) => s.seed),
      "seed",
      "--seed",
    ),
  };
  return { spec, warnings };
}

function checkEstimator(id: string): void {
  if ((estimatorIds as readonly string[]).includes(id)) return;
  const guess = nearest(id, estimatorIds);
  const hint = guess === null ? "" : `; did you mean "${guess}"?`;
  throw new RangeError(`estimators: expected one of ${estimatorIds.join(", ")}, found "${id}"${hint}`);
}

/** The sources asked for and the one in use, each once, without those that have too few coordinates. */
function usableSources(problem: Problem, asked: readonly SourceChoice[], warnings: string[]): SourceChoice[] {
  const wanted = problem.inUse === null ? asked : [...asked, parseSource(problem.inUse.source)];
  const distinct = new Map<string, SourceChoice>();
  for (const choice of wanted) {
    const known = distinct.get(choice.id);
    if (known === undefined) distinct.set(choice.id, choice);
    else if (JSON.stringify(known.spec) !== JSON.stringify(choice.spec)) {
      throw new RangeError(
        `sources: two different sources are called "${choice.id}"; give one of them another name`,
      );
    }
  }
  const usable = [...distinct.values()].filter((choice) => {
    const fits = problem.dimension <= choice.source.largestDimension;
    if (!fits) {
      const { id, source } = choice;
      warnings.push(
        `${problem.id}: ${id} is left out, it has ${source.largestDimension} coordinates of ${problem.dimension}.`,
      );
    }
    return fits;
  });
  if (usable.length === 0) {
    throw new RangeError(
      `sources: none of ${wanted.map((choice) => choice.id).join(", ")} has ${problem.dimension} coordinates, which "${problem.id}" needs; name another with --source`,
    );
  }
  return usable;
}

/** Throws where a source has fewer replicates of the largest size than the study takes. */
function checkSupply(problem: Problem, choice: SourceChoice, sizes: readonly number[], asked: number): void {
  if (choice.deterministic) return;
  const n = Math.max(...validSizes(choice, sizes));
  const supply = choice.source.replicateSupply?.(problem.dimension, n);
  if (supply === undefined || supply.count >= asked) return;
  throw new RangeError(
    `replicates: source "${choice.id}" has ${supply.count} of ${n} points in ${problem.dimension} coordinates (${supply.why}), but ${asked} are asked for by "${problem.id}"; take fewer replicates or points (--replicates, --sizes)`,
  );
}

/** Throws where draws that pass by once would have to serve two problems. */
function checkPasses(
  entries: readonly SuiteProblem[],
  sources: readonly (readonly SourceChoice[])[],
  warnings: string[],
): void {
  const once = new Map<string, string>();
  entries.forEach(({ problem }, i) => {
    for (const { id, source } of sources[i] ?? []) {
      if (source.singlePass !== true) continue;
      if (source.replicateSupply?.(problem.dimension, 1).fresh !== false) continue;
      const other = once.get(id);
      if (other !== undefined) {
        throw new RangeError(
          `sources: the draws of "${id}" pass by once and serve one problem, found "${other}" and "${problem.id}"; study them one at a time`,
        );
      }
      once.set(id, problem.id);
      warnings.push(
        `${id}: its draws pass by once: the study cannot be repeated, and a bias not be confirmed.`,
      );
    }
  });
}

function common(
  entries: readonly SuiteProblem[],
  values: readonly number[],
  key: string,
  flag: string,
): number {
  const first = values[0] as number;
  const other = values.findIndex((value) => value !== first);
  if (other < 0) return first;
  const [a, b] = [entries[0], entries[other]].map((entry) => entry?.problem.id);
  throw new RangeError(
    `${key}: the problems of one study share it, found ${first} (${a}) and ${values[other]} (${b}); settle it with ${flag}`,
  );
}

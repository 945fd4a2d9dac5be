/**
 * Null studies: many small studies in which every source is sound, and how many of them confirm a bias. Where the
 * estimates come from is pluggable (`EstimateMaker`): drawn by the test's own generator here, or by the real engine.
 */
import { assembleRecord, candidatesOf } from "../../src/findings/assemble.js";
import { CONFIRMATION_REPLICATES } from "../../src/findings/bias.js";
import type { Problem } from "../../src/problem/contract.js";
import type { RawCell, RecordSource } from "../../src/record/types.js";
import { makeAssembly, makeSpec } from "../findings/make.js";

/** One problem x source of a null study, n fixed. */
export interface NullCase {
  readonly problem: Problem;
  readonly source: RecordSource;
  readonly n: number;
  readonly indicator: boolean;
}

/** Fresh estimates of a case: `study` and `purpose` are part of the key, so that no two calls share points. */
export type EstimateMaker<Case extends NullCase> = (
  one: Case,
  study: number,
  purpose: "study" | "confirmation",
  replicates: number,
) => Promise<number[]> | number[];

export interface NullOutcome {
  readonly studies: number;
  /** Studies with any candidate, with any confirmed bias. */
  readonly withCandidate: number;
  readonly withConfirmed: number;
  /** Candidates and confirmed biases by problem id. */
  readonly candidates: ReadonlyMap<string, number>;
  readonly confirmed: ReadonlyMap<string, number>;
}

export async function runNullStudies<Case extends NullCase>(
  cases: readonly Case[],
  make: EstimateMaker<Case>,
  options: { readonly studies: number; readonly replicates: number; readonly falseAlarms: number },
): Promise<NullOutcome> {
  const candidates = new Map<string, number>();
  const confirmed = new Map<string, number>();
  const [problems, sources] = [unique(cases.map((c) => c.problem)), unique(cases.map((c) => c.source))];
  let withCandidate = 0;
  let withConfirmed = 0;
  for (let study = 0; study < options.studies; study++) {
    const rawCells: RawCell[] = [];
    for (const one of cases) rawCells.push(cellOf(one, await make(one, study, "study", options.replicates)));
    const assembly = makeAssembly(rawCells, {
      problems,
      sources,
      spec: makeSpec(problems, options.falseAlarms),
    });
    const found = candidatesOf(assembly);
    if (found.length === 0) continue;
    withCandidate++;
    const confirmations = [];
    for (const test of found) {
      count(candidates, test.problem);
      const one = cases.find((c) => c.problem.id === test.problem && c.source.id === test.source);
      if (one === undefined) continue;
      const estimates = await make(one, study, "confirmation", CONFIRMATION_REPLICATES);
      confirmations.push({ ...test, estimates });
    }
    const biased = assembleRecord({ ...assembly, confirmations }).tests.filter((test) => test.confirmed);
    for (const test of biased) count(confirmed, test.problem);
    if (biased.length > 0) withConfirmed++;
  }
  return { studies: options.studies, withCandidate, withConfirmed, candidates, confirmed };
}

function unique<T extends { readonly id: string }>(items: readonly T[]): T[] {
  return [...new Map(items.map((item) => [item.id, item])).values()];
}

function count(counts: Map<string, number>, key: string): void {
  counts.set(key, (counts.get(key) ?? 0) + 1);
}

function cellOf({ problem, source, n, indicator }: NullCase, estimates: number[]): RawCell {
  return {
    problem: problem.id,
    source: source.id,
    estimator: "crude",
    output: "mean",
    n,
    dimension: 1,
    indicator,
    estimates,
    withinVariances: estimates.map(() => null),
    secondsPerPoint: null,
    nonFinite: null,
  };
}

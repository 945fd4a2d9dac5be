/**
 * The explanations of a study: a prediction for every pair of problem and source whose bias was confirmed (or for all pairs,
 * where that is what was asked), the known structure alone for the others. It needs no threads: a prediction takes a
 * second or two, and depends on the study's seed alone, so that a run that is taken up again gives the same.
 */
import { setImmediate } from "node:timers/promises";
import { studentFactor } from "../numeric/student.js";
import type { Explanation, MeasuredBias } from "../record/explanation.js";
import type { BiasTest, Cell, StudySpec } from "../record/types.js";
import { isMean } from "../problem/quantity.js";
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { explain, structureOnly, type ExplainRequest } from "./explain.js";
import type { RunnableProblem } from "./runnable.js";

/** Pairs that get a prediction: those with a confirmed bias, or all of these sources (by id). */
export type ExplainedPairs = "confirmed" | readonly string[];

export interface ExplanationsRequest {
  readonly spec: StudySpec;
  readonly problems: readonly RunnableProblem[];
  readonly cells: readonly Cell[];
  readonly tests: readonly BiasTest[];
  readonly pairs: ExplainedPairs;
  readonly signal: AbortSignal;
  /** Called behind each pair. */
  readonly done: () => void;
}

/** Predictions that a study computes at most; the reason of what is beyond them says so. */
const MOST_PREDICTIONS = 40;

const NOT_CONFIRMED = "no bias was confirmed";
const LEFT_OUT = `left out, since a study predicts ${MOST_PREDICTIONS} biases at most (tolerand explain does it)`;

/** A pair that may have something to explain: its crude estimates at the largest n. */
export interface Pair {
  readonly cell: Cell;
  readonly test: BiasTest | null;
  readonly choice: SourceChoice;
  /** Why there is no prediction; null where there is to be one. */
  readonly reason: string | null;
}

/** The pairs of a study that get a prediction, and those of known structure that do not. */
export function pairsToExplain(request: Pick<ExplanationsRequest, "spec" | "cells" | "tests" | "pairs">): {
  predicted: Pair[];
  known: Pair[];
} {
  const { spec, cells, tests, pairs } = request;
  const choices = new Map(
    Object.values(spec.sources)
      .flat()
      .map(parseSource)
      .map((choice) => [choice.id, choice]),
  );
  const [predicted, known]: [Pair[], Pair[]] = [[], []];
  const means = new Set(spec.problems.filter((one) => isMean(one.quantity)).map(({ id }) => id));
  for (const cell of cells.filter((one) => means.has(one.problem))) {
    const choice = choices.get(cell.source);
    const same = (other: Pick<Cell, "problem" | "source" | "estimator" | "output">): boolean =>
      other.problem === cell.problem &&
      other.source === cell.source &&
      other.estimator === cell.estimator &&
      other.output === cell.output;
    const last = cells.filter(same).every((other) => other.n <= cell.n);
    if (choice === undefined || cell.estimator !== "crude" || !last) continue;
    const test = tests.find(same) ?? null;
    const wanted = pairs === "confirmed" ? test?.confirmed === true : pairs.includes(cell.source);
    if (wanted && predicted.length < MOST_PREDICTIONS) predicted.push({ cell, test, choice, reason: null });
    else if (choice.source.knownStructure !== null)
      known.push({ cell, test, choice, reason: wanted ? LEFT_OUT : NOT_CONFIRMED });
  }
  return { predicted, known };
}

/** Explanations in the order of cells; those that are there, after an abort. */
export async function explainStudy(request: ExplanationsRequest): Promise<Explanation[]> {
  const { predicted, known } = pairsToExplain(request);
  const found = new Map<Pair, Explanation>();
  for (const pair of predicted) {
    if (request.signal.aborted) return [];
    const explanation = explain(explainRequest(pair, request));
    // a study is silent on sources that have no lattice; who asks about one is told
    if (request.pairs !== "confirmed" || explanation.structure !== null) found.set(pair, explanation);
    request.done();
    await setImmediate();
  }
  for (const pair of known) {
    if (request.signal.aborted) return [];
    const explanation = structureOnly(explainRequest(pair, request), pair.reason ?? NOT_CONFIRMED);
    if (explanation !== null) found.set(pair, explanation);
    await setImmediate();
  }
  const order = (pair: Pair): number => request.cells.indexOf(pair.cell);
  return [...found].sort(([a], [b]) => order(a) - order(b)).map(([, explanation]) => explanation);
}

function explainRequest(
  { cell, test, choice }: Pair,
  { spec, problems }: ExplanationsRequest,
): ExplainRequest {
  const problem = problems.find(({ id }) => id === cell.problem);
  const described = spec.problems.find(({ id }) => id === cell.problem);
  if (problem === undefined || described === undefined) throw new Error(`unknown problem "${cell.problem}"`);
  const { confidence } = described.tolerance;
  return {
    problem,
    choice,
    output: cell.output,
    seed: spec.seed,
    confidence,
    n: cell.n,
    centre: cell.reference ?? cell.mean ?? 0,
    measured: measuredBias(cell, test, confidence),
  };
}

/** From the fresh replicates of a confirmation where there are such, else from those of the study. */
function measuredBias(cell: Cell, test: BiasTest | null, confidence: number): MeasuredBias | null {
  const again = test?.confirmation ?? null;
  const bias = again?.bias ?? cell.bias;
  const error = again?.standardError ?? cell.biasStandardError;
  const replicates = again?.replicates ?? cell.replicates;
  if (bias === null) return null;
  const half = error === null ? 0 : studentFactor(confidence, Math.max(1, replicates - 1)) * error;
  return { value: bias, standardError: error, interval: [bias - half, bias + half], n: cell.n, replicates };
}

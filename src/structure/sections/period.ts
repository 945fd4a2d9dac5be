/**
 * The period of a source with its reasons, the periods of its low bits, the cycle from a given state, and how much of it a
 * planned study would use.
 */
import type { SourceChoice } from "../../sources/choice.js";
import { Key } from "../../sources/key.js";
import { periodText } from "../../sources/period-text.js";
import { isPseudoRandom, type PseudoRandomSource } from "../../sources/pseudo-random.js";
import type { BinaryLinear, State } from "../../sources/recurrence.js";
import { UnfinishedFactorisation } from "../../numeric/factor.js";
import type { InspectionRequest, Part, Section } from "../contract.js";
import { recurrenceInUse } from "../lattice-structure.js";
import { binaryPeriod } from "../binary-period.js";
import { FACTOR_STEPS, periodOf, usageOf, type Reason } from "../period.js";
import { recurrencePeriod } from "../recurrence-period.js";

export interface PeriodData {
  readonly period: bigint | null;
  /** "computed" here from the recurrence, or "published" by those who defined it. */
  readonly periodBasis: "computed" | "published" | null;
  /** Which states have it. */
  readonly periodStates: string | null;
  readonly periodReasons: readonly Reason[];
  /** Why there is none; null where there is one. */
  readonly periodMissing: string | null;
  readonly periodFromState: {
    readonly state: string;
    readonly preperiod: bigint;
    readonly period: bigint;
  } | null;
  /** Period of the k lowest bits of outputs of a power-of-two modulus, k = 1, 2, ...; null for others. */
  readonly lowBitPeriods: readonly bigint[] | null;
  /** Where `points` were given and there is a period. */
  readonly periodUse: {
    readonly points: number;
    readonly dimension: number;
    readonly streams: number;
    /** Outputs of one run. */
    readonly outputs: bigint;
    readonly share: number;
    readonly overlapProbability: number | null;
  } | null;
}

type Facts = Omit<PeriodData, "periodUse">;

/** Numbers above it are not factorised: the equivalent modulus of subtract-with-borrow has some 576 bits. */
const LARGEST_FACTORISED = 1n << 130n;

/** States of up to so many bits are looked at: 2^128 - 1 has only factors that are found at once. */
const LARGEST_BINARY = 128;

/** The recurrence is the same from every state. */
const ANY_KEY = new Key("period");

export const periodSection: Section<PeriodData> = {
  applies: ({ source }) => isPseudoRandom(source),
  otherwise: ({ id, source }) =>
    source.family === "pseudo-random" || source.family === "own"
      ? `${id}: no period, as its state cannot be followed`
      : null,
  inspect: ({ source }: SourceChoice, request) => {
    if (!isPseudoRandom(source))
      throw new RangeError(`source: expected one with a recurrence, found "${source.id}"`);
    const facts = factsOf(source, request.state);
    return { ...facts, periodUse: useOf(source, facts, request) };
  },
  show: showPeriod,
};

function factsOf(source: PseudoRandomSource, state: string | null): Facts {
  const { recurrence } = source;
  const start = state === null ? null : recurrence.stateFromText(state);
  const linear = recurrenceInUse(source);
  const { binary } = recurrence;
  if (binary !== undefined && binary.stateBits <= LARGEST_BINARY) {
    return binaryFacts(source, binary, recurrence.stateFromKey(ANY_KEY), state);
  }
  if (linear === null || linear.modulus > LARGEST_FACTORISED) return published(source, state);
  const [a = 0n, ...more] = linear.multipliers;
  // a combined generator has a state of several words, the one recurrence of order 1 that is equivalent to it only one
  const single = recurrence.linear?.modulus === recurrence.output.modulus;
  if (more.length === 0 && single) {
    const map = { multiplier: a, increment: linear.increment, modulus: linear.modulus };
    const report = periodOf(map, start?.[0] === undefined ? null : start[0] % linear.modulus);
    return {
      period: report.period,
      periodBasis: report.period === null ? null : "computed",
      periodStates: report.states,
      periodReasons: report.reasons,
      periodMissing: report.missing,
      periodFromState:
        report.from === null
          ? null
          : {
              state: String(report.from.state),
              preperiod: report.from.preperiod,
              period: report.from.period,
            },
      lowBitPeriods: report.lowBits,
    };
  }
  if (linear.increment !== 0n) return published(source, state);
  try {
    const { period, reasons } = recurrencePeriod(linear, FACTOR_STEPS);
    if (period === null) return { ...published(source, state), periodReasons: reasons };
    return {
      ...published(source, state),
      period,
      periodBasis: "computed",
      periodStates: "every state whose components are not all 0",
      periodReasons: reasons,
      periodMissing: null,
    };
  } catch (error) {
    if (!(error instanceof UnfinishedFactorisation)) throw error;
    const facts = published(source, state);
    return facts.period === null ? { ...facts, periodMissing: `not found: ${error.message}` } : facts;
  }
}

function binaryFacts(
  source: PseudoRandomSource,
  binary: BinaryLinear,
  from: State,
  state: string | null,
): Facts {
  const facts = published(source, state);
  const { stateBits } = binary;
  const stream = binary.words(from);
  const outputs = Array.from({ length: 2 * stateBits }, () => stream.next().value);
  const { period, reasons } = binaryPeriod(outputs, stateBits, FACTOR_STEPS);
  if (period !== null) {
    return {
      ...facts,
      period,
      periodBasis: "computed",
      periodStates: "every state but 0",
      periodReasons: reasons,
      periodMissing: null,
    };
  }
  // a product of primitive polynomials, as combined registers have, is not primitive itself
  if (facts.period !== null) return facts;
  const missing = "the longest period is not reached: cycles differ from state to state";
  return { ...facts, periodReasons: reasons, periodMissing: missing };
}

/** What the source's definition says. */
function published(source: PseudoRandomSource, state: string | null): Facts {
  const { period } = source;
  return {
    period,
    periodBasis: period === null ? null : "published",
    periodStates: null,
    periodReasons: [],
    periodMissing: period === null ? "not known: it differs from state to state, or was not published" : null,
    periodFromState: state === null || period === null ? null : { state, preperiod: 0n, period },
    lowBitPeriods: null,
  };
}

function useOf(
  { usage, recurrence }: PseudoRandomSource,
  { period, periodFromState }: Facts,
  { points, dimensions, streams }: InspectionRequest,
): PeriodData["periodUse"] {
  const known = periodFromState?.period ?? period;
  if (points === null || known === null) return null;
  const dimension = dimensions.at(-1) ?? 1;
  const { tuples } = usage;
  const perPoint = tuples.kind === "strided" ? dimension * tuples.step : 1;
  const outputs = BigInt(points) * BigInt(perPoint * recurrence.output.integers);
  const runs = tuples.kind === "strided" ? streams : streams * dimension;
  const { share, overlap } = usageOf(known, outputs, runs);
  return { points, dimension, streams: runs, outputs, share, overlapProbability: overlap };
}

function showPeriod(data: PeriodData): Part[] {
  const { period, periodBasis, periodStates, periodReasons, periodMissing, periodFromState } = data;
  const lines: string[] = [];
  if (period !== null) {
    const short = periodText(period);
    const exact = String(period);
    const digits = short.replaceAll(",", "") === exact || exact.length > 60 ? short : `${short} = ${exact}`;
    const states = periodStates === null ? "" : `, ${periodStates}`;
    lines.push(`${digits}${states} (${periodBasis ?? ""}).`);
  }
  if (periodMissing !== null)
    lines.push(`${periodMissing.charAt(0).toUpperCase()}${periodMissing.slice(1)}.`);
  lines.push(...periodReasons.map(({ condition, holds }) => `${holds ? "yes" : "no "}  ${condition}`));
  if (
    periodFromState !== null &&
    (period === null || periodFromState.period !== period || periodFromState.preperiod > 0n)
  ) {
    const { state, preperiod, period: own } = periodFromState;
    const before = preperiod === 0n ? "" : ` after ${preperiod} outputs that do not come again`;
    lines.push(`From state ${state}: ${own}${before}.`);
  }
  return [{ title: "Period", lines, table: lowBitTable(data), notes: useNotes(data) }];
}

function lowBitTable({ lowBitPeriods }: PeriodData): Part["table"] {
  if (lowBitPeriods === null) return null;
  return {
    columns: [
      { title: "lowest bits", align: "right" },
      { title: "period", align: "right" },
    ],
    rows: lowBitPeriods.flatMap((period, k) =>
      k < 8 || k % 8 === 7 || k === lowBitPeriods.length - 1 ? [[String(k + 1), String(period)]] : [],
    ),
  };
}

function useNotes({ periodUse: use, period, periodFromState }: PeriodData): string[] {
  const known = periodFromState?.period ?? period;
  if (use === null || known === null) return [];
  const notes = [
    `${use.points} points of ${use.dimension} coordinates take ${use.outputs} outputs: ${shareText(use.share)} of the period. Common practice stays below its square root for linear generators (no single source); Knuth, vol. 2, 3.6, advises at most a thousandth.`,
  ];
  if (use.overlapProbability !== null) {
    notes.push(
      `${use.streams} runs from independent random states: some two of them overlap with probability ${shareText(use.overlapProbability)}.`,
    );
  }
  return notes;
}

function shareText(share: number): string {
  if (share === 0) return "less than 1e-300";
  return share >= 0.001 && share < 1000 ? share.toPrecision(3) : share.toExponential(1);
}

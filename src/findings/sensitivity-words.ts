/** Which inputs matter, in sentences. Every figure with its interval; evidence is called evidence. */
import type { Problem } from "../problem/contract.js";
import type { Between, InputShare, NetOrder, Sensitivity, Share } from "../record/sensitivity.js";
import { formatCount, formatPercent, formatValue } from "./format.js";
import { looksOf, superposition, type Looks } from "./sensitivity.js";

/** "4.5 %": two digits that count, none below a hundredth of a per cent. */
export const shareText = (value: number): string => {
  const rounded = Math.round(Number(value.toPrecision(2)) * 1e4) / 1e4;
  return formatPercent(rounded === 0 ? 0 : rounded).replace("-", "\u2212");
};

export const shareInterval = ({ interval: [low, high] }: Share): string =>
  `${shareText(low)} to ${shareText(high)}`;

const half = ({ interval: [low, high] }: Share): number => (high - low) / 2;

function between({ atLeast, atMost }: Between): string {
  if (atLeast === atMost) return formatCount(atLeast);
  return `${formatCount(atLeast)} to ${formatCount(atMost)}`;
}

/** "at most 2 coordinates"; only from below where that is all that is known. */
function togetherText(found: Between, dimension: number): string {
  if (found.atMost === 1) return "1 coordinate";
  if (found.atLeast < found.atMost && found.atMost >= dimension)
    return `${formatCount(found.atLeast)} or more coordinates (no upper end is resolved)`;
  return `at most ${between(found)} coordinates`;
}

const orderText = ({ order, interval: [low, high] }: NetOrder): string =>
  `${formatValue(order, (high - low) / 4)} (${formatValue(low, (high - low) / 4)} to ${formatValue(high, (high - low) / 4)})`;

/** Units and inputs by what they have part in, largest first. */
export function ranked(shares: readonly InputShare[]): InputShare[] {
  return [...shares].sort((a, b) => b.total.value - a.total.value || a.first - b.first);
}

/** The finding in one sentence, without a full stop. */
export function sensitivityHeadline({ measures, reason }: Sensitivity): string {
  if (measures === null) return reason ?? "which inputs matter is not known";
  const order = ranked(measures.units);
  const [first, second] = order;
  const what = measures.grouped ? "groups of coordinates" : "coordinates";
  if (first === undefined) return "there are no inputs";
  if (order.length === 1) return `${first.label} is the only input`;
  const matter = order.filter(({ total }) => total.value >= 0.01).length;
  const lead =
    second !== undefined && first.total.value > 1.5 * second.total.value
      ? `${first.label} matters most (part in ${shareText(first.total.value)} of the variance)`
      : `${first.label} and ${second?.label ?? ""} matter most (part in ${shareText(first.total.value)} and ${shareText(second?.total.value ?? 0)} of the variance)`;
  return `${lead}; ${formatCount(matter)} of ${formatCount(order.length)} ${what} have part in 1 % or more`;
}

const LOOKS: Readonly<Record<Looks, string>> = {
  smooth: "as those of a smooth integrand do: no sign of a kink or jump",
  kinked:
    "as those of an integrand with a kink that is not parallel to the axes do: evidence of one, no proof",
  jumping:
    "as those of an integrand with a jump that is not parallel to the axes do: evidence of one, no proof",
  rough:
    "more slowly than those of a smooth integrand: evidence of a kink or jump that is not parallel to the axes, no proof",
  untold: "which does not tell a smooth integrand from one with a kink or jump",
};

/** What the figures say, a sentence each; empty where nothing was measured. */
export function sensitivityLines({ measures, confidence }: Sensitivity, { dimension }: Problem): string[] {
  if (measures === null) return [];
  const { meanDimension, allAlone, truncation, smoothness, grouped } = measures;
  const level = formatPercent(confidence);
  const super99 = superposition(measures, dimension);
  const lines = [
    `Mean dimension ${formatValue(meanDimension.value, half(meanDimension))} (${level} interval ${formatValue(meanDimension.interval[0], half(meanDimension))} to ${formatValue(meanDimension.interval[1], half(meanDimension))}): ${
      meanDimension.interval[1] < 1.05
        ? "the integrand is all but a sum of functions of one coordinate."
        : meanDimension.value < 2
          ? "coordinates act mostly one at a time or in pairs."
          : "several coordinates act only together."
    }`,
    `${grouped ? "Groups" : "Coordinates"} decide ${shareText(allAlone.value)} of the variance each alone (${shareInterval(allAlone)}).`,
    `99 % of the variance lies in parts of ${togetherText(super99, dimension)} at a time (superposition dimension) and is decided by the first ${between(truncation)} of ${formatCount(dimension)} (truncation dimension, in the order of the inputs).`,
  ];
  if (smoothness !== null) {
    const { integrand, smooth, kinked, jumping } = smoothness;
    lines.push(
      `Estimates by ${smoothness.source} spread as n to the power ${orderText(integrand)}, ${LOOKS[looksOf(smoothness)]}; companions of the same inputs: smooth ${orderText(smooth)}, kinked ${orderText(kinked)}, jumping ${orderText(jumping)}.`,
    );
  }
  if (measures.varianceError > RARE)
    lines.push(
      `The variance itself is known to ${shareText(measures.varianceError)} only (standard error): few points meet what makes it, so the intervals may be too narrow, of shares near 0 above all; take more points.`,
    );
  lines.push(meaning(meanDimension, super99, truncation, dimension, smoothness?.integrand ?? null));
  return lines;
}

/** Beyond this relative standard error of the variance its makers are too few for intervals to be trusted. */
const RARE = 0.03;

/** Half a power more than n^-1/2 is a gain that pays at any n of practice. */
const GAIN = -0.6;

function meaning(
  meanDimension: Share,
  super99: Between,
  truncation: Between,
  dimension: number,
  order: NetOrder | null,
): string {
  const low = meanDimension.interval[1] < 2 || super99.atMost <= 2;
  const early = dimension > 4 && truncation.atMost <= dimension / 2;
  const structure = low
    ? "Few coordinates act together, so a quasi-random source needs good projections of low order only"
    : early
      ? "The first coordinates decide, and there quasi-random sources are best"
      : "Much of the variance needs several coordinates together, where the projections of quasi-random sources are weaker";
  if (order === null) return `${structure}.`;
  const measured =
    order.interval[1] < GAIN
      ? `a scrambled net does converge faster than n^−1/2 here`
      : order.interval[0] > GAIN
        ? `a scrambled net gains little in order here`
        : `whether a scrambled net gains in order is not settled at these sizes`;
  return `${structure}; ${measured}.`;
}

export interface SensitivityTable {
  readonly columns: readonly { readonly title: string; readonly align: "left" | "right" }[];
  readonly rows: readonly (readonly string[])[];
}

/** Shares by unit or input, largest first, `most` of them. */
export function sharesTable(shares: readonly InputShare[], title: string, most: number): SensitivityTable {
  return {
    columns: [
      { title, align: "left" },
      { title: "Alone", align: "right" },
      { title: "Interval", align: "right" },
      { title: "Has part in", align: "right" },
      { title: "Interval", align: "right" },
    ],
    rows: ranked(shares)
      .slice(0, most)
      .map(({ label, alone, total }) => [
        label,
        shareText(alone.value),
        shareInterval(alone),
        shareText(total.value),
        shareInterval(total),
      ]),
  };
}

/** Pairs with an interaction that is more than chance, largest first, `most` of them; no rows where there is none. */
export function pairsTable({ measures }: Sensitivity, most: number): SensitivityTable {
  const pairs = measures?.pairs.filter(({ interaction }) => interaction.interval[0] > 0) ?? [];
  return {
    columns: [
      { title: "Pair", align: "left" },
      { title: "Together", align: "right" },
      { title: "Only together", align: "right" },
      { title: "Interval", align: "right" },
    ],
    rows: pairs
      .slice(0, most)
      .map(({ i, j, closed, interaction }) => [
        `${measures?.units[i]?.label ?? ""}, ${measures?.units[j]?.label ?? ""}`,
        shareText(closed.value),
        shareText(interaction.value),
        shareInterval(interaction),
      ]),
  };
}

/**
 * The pair map of a net: how unevenly each pair of coordinates is covered (its t) against how much the integrand depends on
 * the two together (second-order Sobol' index), so that a reader sees whether a bad pair matters here.
 */
import { formatPercent } from "../../findings/format.js";
import { PAGE } from "../look.js";
import { type Chart, type Datum, type Margins, type Spec, counted, framed, spread } from "./chart.js";

export interface PairPoint {
  /** 0-based coordinates. */
  readonly indices: readonly [number, number];
  /** What the two coordinates are called; null for x[i] and x[j]. */
  readonly names: readonly [string, string] | null;
  readonly t: number;
  /** Second-order Sobol' index: the share of the variance that the two bring only together. */
  readonly dependence: number;
  /** Limits of an interval for it, and its level such as 0.99; null where there is none. */
  readonly interval: { readonly low: number; readonly high: number; readonly level: number } | null;
}

export interface PairMapData {
  /** Stem of the chart's file behind "pair-map-". */
  readonly slug: string;
  readonly source: string;
  readonly problem: string;
  readonly base: number;
  /** m: t is that of the first base^m points. */
  readonly digits: number;
  readonly pairs: readonly PairPoint[];
}

/** A share of the variance below which a pair is said to matter little (common practice, no single source). */
export const MATTERS = 0.01;

/** Pairs drawn at most, those of largest dependence. */
const MOST = 1000;

/** Pairs named in the drawing. */
const NAMED = 6;

const [WIDTH, HEIGHT] = [520, 300];

/** "4.5 %", of two digits that count. */
const share = (value: number): string => formatPercent(Number(value.toPrecision(2)));

const nameOf = ({ indices, names }: PairPoint): string =>
  names === null ? `x[${indices[0] + 1}], x[${indices[1] + 1}]` : names.join(", ");

/** Whether a pair's share is at least what matters, by its lower limit where it has one. */
function matters({ dependence, interval }: PairPoint): boolean {
  return dependence >= MATTERS && (interval === null || interval.low > 0);
}

function finding({ pairs, digits, base, problem, source }: PairMapData): string {
  const worst = Math.max(...pairs.map(({ t }) => t));
  const heavy = pairs.filter(matters).sort((a, b) => b.t - a.t || b.dependence - a.dependence);
  const [first] = heavy;
  if (first === undefined) {
    return `No pair of coordinates brings ${formatPercent(MATTERS)} of the variance of ${problem} together, so the pairs that ${source} covers badly (t up to ${worst}) matter little here.`;
  }
  const what = `${nameOf(first)}, ${share(first.dependence)} of the variance`;
  if (first.t === 0) {
    return `${source} covers every pair that matters to ${problem} as evenly as ${base}^${digits} points can: t = 0.`;
  }
  return `Of ${counted(heavy.length, "pair")} that ${heavy.length === 1 ? "matters" : "matter"} to ${problem}, ${source} covers ${what}, worst: t = ${first.t} of ${digits}.`;
}

/** The chart; null where there are no pairs. */
export function pairMap(data: PairMapData): Chart | null {
  const { pairs, source, problem, base, digits } = data;
  if (pairs.length === 0) return null;
  const ranked = [...pairs].sort((a, b) => b.dependence - a.dependence || b.t - a.t);
  const drawn = ranked.slice(0, MOST);
  const named = drawn.filter(matters).slice(0, NAMED);
  const values = drawn.map((pair, i): Datum => {
    // pairs of the same t side by side: thirteen places, in an order that parts neighbours in dependence; those that matter
    // stand on the line
    const place = matters(pair) ? 0 : (((i * 5) % 13) - 6) / 20;
    return {
      x: pair.t + place,
      y: pair.dependence,
      low: pair.interval?.low ?? pair.dependence,
      high: pair.interval?.high ?? pair.dependence,
      matters: matters(pair),
      about: `${nameOf(pair)}: t = ${pair.t}, ${share(pair.dependence)} of the variance${intervalText(pair)}`,
    };
  });
  const top = Math.max(MATTERS * 1.5, ...values.map((d) => d["high"] as number));
  const bottom = Math.min(0, ...values.map((d) => d["low"] as number));
  const labels = named.map((pair): Datum => {
    const beside = named.filter(({ t }) => t === pair.t);
    const pixels = beside.map(
      ({ dependence }) => (HEIGHT * (top * 1.08 - dependence)) / ((top - bottom) * 1.08),
    );
    const pixel = spread(pixels, 14, 6, HEIGHT - 6)[beside.indexOf(pair)] ?? 0;
    const y = top * 1.08 - (pixel * (top - bottom) * 1.08) / HEIGHT;
    return { x: pair.t, y, label: nameOf(pair) };
  });
  const largest = Math.max(2, ...pairs.map(({ t }) => t));
  const x = {
    field: "x",
    type: "quantitative",
    scale: { domain: [-0.5, largest + 0.5], nice: false, zero: false },
    axis: {
      title: `t of the pair at ${base}^${digits} points (0 even, ${digits} says nothing)`,
      values: Array.from({ length: largest + 1 }, (_, t) => t),
      grid: false,
      format: "d",
    },
  };
  const yScale = { domain: [bottom * 1.08, top * 1.08], nice: false, zero: false };
  const y = {
    field: "y",
    type: "quantitative",
    scale: yScale,
    axis: { title: "share of the variance", format: ".0%", tickCount: 5 },
  };
  const description = { field: "about", type: "nominal" };
  const layer: Spec[] = [
    {
      data: { values: [{ y: MATTERS, label: `${formatPercent(MATTERS)} of the variance` }] },
      mark: { type: "rule", color: PAGE.soft.light, strokeDash: [4, 3], aria: false },
      encoding: { y },
    },
    {
      data: { values: values.filter((d) => d["low"] !== d["high"]) },
      mark: { type: "rule", color: PAGE.soft.light, strokeWidth: 1.2, aria: false },
      encoding: { x, y: { ...y, field: "low" }, y2: { field: "high" } },
    },
    {
      data: { values: values.filter((d) => d["matters"] !== true) },
      mark: { type: "point", shape: "circle", filled: false, size: 26, color: PAGE.soft.light },
      encoding: { x, y, description },
    },
    {
      data: { values: values.filter((d) => d["matters"] === true) },
      mark: { type: "point", shape: "square", filled: true, size: 60, color: PAGE.ink.light, opacity: 1 },
      encoding: { x, y, description },
    },
    {
      data: { values: labels },
      mark: { type: "text", align: "left", baseline: "middle", dx: 9, color: PAGE.ink.light, aria: false },
      encoding: { x, y, text: { field: "label", type: "nominal" } },
    },
  ];
  const title = finding(data);
  const says = `Pairs of coordinates of ${problem}: how evenly ${source} covers them, and how much the result depends on both together.`;
  const margins: Margins = { left: 78, right: 130, top: 14, bottom: 52 };
  const levels = [...new Set(pairs.flatMap(({ interval }) => (interval === null ? [] : [interval.level])))];
  return {
    name: `pair-map-${data.slug}`,
    title,
    says,
    caption:
      `Further right: boxes of the pair hold uneven numbers of points. Further up: more of the variance lies in the two coordinates together. Trouble is at the top right. ` +
      `Filled squares bring at least ${formatPercent(MATTERS)} of the variance (dashed line), open circles less${
        levels.length === 0 ? "" : `; bars are intervals at ${formatPercent(levels[0] ?? 0)}`
      }. Places within one t only keep pairs apart.`,
    alt: `Scatter of ${counted(pairs.length, "pair")} of coordinates, t against share of the variance. ${title}`,
    notDrawn:
      drawn.length === pairs.length
        ? []
        : [
            `${pairs.length - drawn.length} pairs of least share are not drawn; all have at most ${share(ranked[MOST]?.dependence ?? 0)} of the variance.`,
          ],
    table: {
      columns: [
        { title: "Pair", align: "left" },
        { title: "t", align: "right" },
        { title: "Share of the variance", align: "right" },
        { title: "Interval", align: "left" },
      ],
      rows: drawn
        .slice(0, 50)
        .map((pair) => [
          nameOf(pair),
          String(pair.t),
          share(pair.dependence),
          intervalText(pair).replace(/^ \(|\)$/g, ""),
        ]),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height: HEIGHT, margins, layer }),
    marks: new Map(),
    size: [WIDTH + margins.left + margins.right, HEIGHT + margins.top + margins.bottom],
    margins,
  };
}

function intervalText({ interval }: PairPoint): string {
  if (interval === null) return "";
  const [low, high] = [share(interval.low), share(interval.high)];
  return ` (${low} to ${high} at ${formatPercent(interval.level)})`;
}

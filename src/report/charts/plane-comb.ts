/**
 * The plane comb: where the points of a source lie between neighbouring planes of the vector at fault, beside those of a
 * sound source, and how the integrand varies on the way from one plane to the next. Three strips over one axis.
 */
import { formatCount, formatPercent, formatValue } from "../../findings/format.js";
import { planesText, vectorText } from "../../findings/explanation-words.js";
import type { PlaneComb } from "../../record/explanation.js";
import { PAGE } from "../look.js";
import type { ExplainedRow } from "../view.js";
import { type Chart, type Datum, type Margins, type Spec, Marks, framed } from "./chart.js";
import { pixelY } from "./rows-frame.js";

const WIDTH = 560;
const STRIP = 96;
const GAP = 44;
const MARGINS: Margins = { left: 150, right: 56, top: 22, bottom: 50 };

const TURN_LABELS =
  "datum.value == 0 ? '0' : (datum.value < 0 ? '\u2212' : '') + (abs(datum.value) == 0.5 ? '\u00bd' : '\u00bc')";

/** Bars of one strip: their values over the bins, and how they are labelled. */
interface Strip {
  readonly label: string;
  readonly values: readonly number[];
  readonly low: number;
  readonly high: number;
  readonly lowText: string;
  readonly highText: string;
  readonly text: (value: number) => string;
}

function shares(counts: readonly number[], points: number): number[] {
  return counts.map((count) => count / points);
}

/** The turn at the middle of a bin, from -1/2 on. */
function turnOf(bin: number, bins: number): number {
  return (bin - bins / 2) / bins;
}

function stripsOf(row: ExplainedRow, comb: PlaneComb): Strip[] {
  const percent = (value: number): string => `${formatPercent(Number(value.toPrecision(2)))} of the points`;
  const histogram = (label: string, counts: readonly number[]): Strip => {
    const values = shares(counts, comb.points);
    const high = Math.max(...values, 1e-9);
    return {
      label,
      values,
      low: 0,
      high,
      lowText: "0",
      highText: formatPercent(Number(high.toPrecision(2))),
      text: percent,
    };
  };
  const [low, high] = [Math.min(0, ...comb.profile), Math.max(0, ...comb.profile)];
  return [
    histogram(row.row.label, comb.source),
    histogram(comb.soundSource, comb.sound),
    {
      label: "integrand",
      values: comb.profile,
      low,
      high: high > low ? high : low + 1,
      lowText: formatValue(low),
      highText: formatValue(high > low ? high : low + 1),
      text: (value) => `mean of the integrand ${formatValue(value)}`,
    },
  ];
}

/** The middle half of the bins' mass: in how many bins the points lie. */
function occupied(counts: readonly number[]): number {
  return counts.filter((count) => count > 0).length;
}

/** The chart of one explained pair, or null where no vector stands out. */
export function planeComb(row: ExplainedRow): Chart | null {
  const { comb, aliases } = row.explanation;
  const [alias] = aliases;
  if (comb === null || alias === undefined) return null;
  const bins = comb.source.length;
  const strips = stripsOf(row, comb);
  const height = strips.length * STRIP + (strips.length - 1) * GAP;
  const top = (k: number): number => k * (STRIP + GAP);
  const marks = new Marks();
  const data = strips.flatMap((strip, k) =>
    strip.values.map((value, bin): Datum => {
      const at = (v: number): number => top(k) + STRIP * (1 - (v - strip.low) / (strip.high - strip.low));
      const turn = turnOf(bin, bins);
      const about = `${strip.label}, ${formatValue(turn)} of the way to the next plane: ${strip.text(value)}`;
      return {
        strip: k,
        from: turn - 0.46 / bins,
        to: turn + 0.46 / bins,
        y: at(value),
        base: at(Math.max(0, strip.low)),
        about: k === 0 ? marks.values(row.row.view, about) : about,
      };
    }),
  );
  const x = {
    field: "from",
    type: "quantitative",
    title: "position between neighbouring planes (0: on a plane, ±½: half-way)",
    scale: { domain: [-0.5 - 0.5 / bins, 0.5], nice: false, zero: false },
    axis: { values: [-0.5, -0.25, 0, 0.25, 0.5], labelExpr: TURN_LABELS, grid: false },
  };
  const y = pixelY(height);
  const bars = (k: number, colour: string): Spec => ({
    data: { values: data.filter((d) => d["strip"] === k) },
    mark: { type: "rect", color: colour },
    encoding: {
      x,
      x2: { field: "to" },
      y,
      y2: { field: "base" },
      description: { field: "about", type: "nominal" },
    },
  });
  const words = strips.flatMap((strip, k): Datum[] => [
    { y: top(k) + STRIP / 2, label: strip.label, align: "label" },
    { y: top(k) + 5, label: strip.highText, align: "end" },
    { y: top(k) + STRIP - 5, label: strip.lowText, align: "end" },
  ]);
  const text = (kind: string, dx: number, colour: string): Spec => ({
    data: { values: words.filter((d) => d["align"] === kind) },
    mark: {
      type: "text",
      align: "right",
      baseline: "middle",
      dx,
      color: colour,
      fontSize: kind === "end" ? 11 : 12,
    },
    encoding: { x: { value: 0 }, y, text: { field: "label", type: "nominal" } },
  });
  const bases = strips.map((strip, k) => ({
    y: top(k) + STRIP * (1 - (Math.max(0, strip.low) - strip.low) / (strip.high - strip.low)),
  }));
  const last = strips.at(-1);
  const mean = comb.profile.reduce((sum, value) => sum + value, 0) / bins;
  const means = last === undefined ? 0 : top(2) + STRIP * (1 - (mean - last.low) / (last.high - last.low));
  const layer: Spec[] = [
    {
      data: { values: [{ from: 0 }] },
      mark: { type: "rule", color: PAGE.rule.light, strokeDash: [3, 3], aria: false },
      encoding: { x },
    },
    bars(0, row.row.view.ink.light),
    bars(1, PAGE.soft.light),
    bars(2, PAGE.tolerance.light),
    {
      data: { values: bases },
      mark: { type: "rule", color: PAGE.rule.light, aria: false },
      encoding: { y },
    },
    {
      data: { values: [{ y: means }] },
      mark: { type: "rule", color: PAGE.outside.light, strokeDash: [5, 3], aria: false },
      encoding: { y },
    },
    {
      data: { values: [{ y: means, label: "mean" }] },
      mark: {
        type: "text",
        align: "left",
        baseline: "middle",
        dx: 5,
        fontSize: 11,
        color: PAGE.outside.light,
      },
      encoding: { x: { value: WIDTH }, y, text: { field: "label", type: "nominal" } },
    },
    text("label", -62, PAGE.ink.light),
    text("end", -8, PAGE.soft.light),
  ];
  const vector = vectorText(alias);
  const filled = occupied(comb.source);
  const title =
    filled === bins
      ? `Points of ${row.row.label} fill the space between the planes of ${vector} unevenly.`
      : `All points of ${row.row.label} lie on the planes of ${vector}${filled > 1 ? ` (or ${filled - 1} other places)` : ""}, while the integrand varies between them.`;
  const says = `${formatCount(comb.points)} points of each source in ${bins} bins of ${vector} modulo 1, and the integrand's mean in each bin, in its own units.`;
  return {
    name: `comb-${row.slug}`,
    title,
    says,
    caption:
      "Every bar is a thin slab of the cube, parallel to the planes. Points of a sound source fill all slabs alike; where a source fills one slab only, its estimate is the integrand's mean there, the bar at 0 in the lowest strip, in place of the mean over all bars (dashed). The strips have scales of their own.",
    alt: `${row.subject.title}, ${row.row.label}: ${planesText(alias)}. ${title}`,
    notDrawn: [],
    table: {
      columns: [
        { title: "Between planes", align: "right" },
        { title: row.row.label, align: "right" },
        { title: comb.soundSource, align: "right" },
        { title: "Integrand, mean", align: "right" },
      ],
      rows: comb.source.map((count, bin) => [
        formatValue(turnOf(bin, bins)),
        formatCount(count),
        formatCount(comb.sound[bin] ?? 0),
        formatValue(comb.profile[bin] ?? 0),
      ]),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

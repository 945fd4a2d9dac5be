/**
 * Error against n, log-log: one line per source, its interval at each n, the tolerance as a line, and two reference
 * slopes (-1/2, what independent points give; -1). Lines join measured points only.
 */
import { formatCount, formatValue, plainNumber } from "../../findings/format.js";
import { PAGE } from "../look.js";
import { toleranceWords } from "../verdict-row.js";
import type { Row, Subject, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  familyKey,
  fitted,
  framed,
  powersOfTen,
  sourceChannels,
  spread,
  POWER_LABELS,
} from "./chart.js";
import { drawable, finding, notes, table } from "./error-points.js";

const WIDTH = 600;
const HEIGHT = 380;
const MARGINS: Margins = { left: 70, right: 200, top: 14, bottom: 48 };
const LABEL_GAP = 14;

/** A guide of the given slope from the upper left corner of the data, cut to the drawing. */
function guide(slope: number, from: [number, number], right: number, bottom: number): Datum[] {
  const [n0, e0] = from;
  const n1 = Math.min(right, n0 * (bottom / e0) ** (1 / slope));
  const name = slope === -1 ? "slope −1" : "slope −½";
  return [
    { n: n0, rmse: e0, guide: name },
    { n: n1, rmse: e0 * (n1 / n0) ** slope, guide: name },
  ];
}

function labelFor(row: Row): string {
  if (row.test?.confirmed === true) return `${row.label}: biased`;
  return row.view.source.deterministic ? `${row.label}: no error bar` : row.label;
}

/** The chart of one subject, or null where nothing can be drawn. */
export function errorAgainstN(view: View, subject: Subject): Chart | null {
  const { points, exact, missing } = drawable(subject.rows);
  if (points.length === 0) return null;
  const sizes = [...new Set(points.map((p) => p.n))].sort((a, b) => a - b);
  const [left, right] = [(sizes[0] ?? 1) / 1.15, (sizes[sizes.length - 1] ?? 2) * 1.15];
  const levels = points.flatMap((p) => [p.rmse, p.high ?? p.rmse, Math.max(p.low ?? p.rmse, p.rmse / 10)]);
  const known = subject.tolerance === null ? levels : [...levels, subject.tolerance];
  const [bottom, top] = [Math.min(...known) / 1.6, Math.max(...known) * 1.8];
  const marks = new Marks();
  const views = [...new Set(points.map((p) => p.row.view))];
  const { colour, dash, shape } = sourceChannels(views);

  const data = points.map((p): Datum => {
    const interval =
      p.high === null ? "no error bar" : `95 % interval ${formatValue(p.low ?? 0)} to ${formatValue(p.high)}`;
    const about = `${p.row.label} at n = ${formatCount(p.n)}: RMSE ${formatValue(p.rmse)} (${interval})`;
    return {
      source: p.row.view.index,
      series: marks.name(p.row.view, p.row.label),
      about: marks.values(p.row.view, about),
      n: p.n,
      rmse: p.rmse,
      filled: p.high !== null,
      ...(p.high === null ? {} : { low: Math.max(p.low ?? bottom, bottom), high: p.high }),
    };
  });

  const ends = subject.rows.flatMap((row) => points.filter((p) => p.row === row).slice(-1));
  const pixel = (e: number): number => (HEIGHT * Math.log(top / e)) / Math.log(top / bottom);
  const gap = Math.min(LABEL_GAP, HEIGHT / Math.max(1, ends.length - 1));
  const places = spread(
    ends.map((p) => pixel(p.rmse)),
    gap,
    4,
    HEIGHT - 4,
  );
  const labels = ends.map((p, i): Datum => {
    const at = top * (bottom / top) ** ((places[i] ?? 0) / HEIGHT);
    const series = marks.name(p.row.view, p.row.label);
    return {
      source: p.row.view.index,
      series,
      n: p.n,
      rmse: p.rmse,
      at,
      label: fitted(labelFor(p.row), MARGINS.right - 20),
    };
  });

  const start: [number, number] = [sizes[0] ?? 1, top / 1.3];
  const guides =
    right / left < 3 ? [] : [...guide(-0.5, start, right, bottom), ...guide(-1, start, right, bottom)];
  const x = {
    field: "n",
    type: "quantitative",
    title: "points n (log scale)",
    scale: { type: "log", base: 2, domain: [left, right], nice: false },
    axis: { values: ticks(sizes), format: ",", grid: false },
  };
  const y = {
    field: "rmse",
    type: "quantitative",
    title: "root mean square error (log scale)",
    scale: { type: "log", domain: [bottom, top], nice: false },
    axis: { values: powersOfTen(bottom, top), labelExpr: POWER_LABELS, titleX: -50 },
  };
  const description = { field: "about", type: "nominal" };
  const byName = { field: "series", type: "nominal" };
  const layer: Spec[] = [
    ...guideLayers(guides, x, y),
    ...toleranceLine(subject, y),
    {
      data: { values: data },
      mark: { type: "line", strokeWidth: 1.6 },
      encoding: { x, y, color: colour, strokeDash: dash, detail: byName, description: byName },
    },
    {
      data: { values: data.filter((d) => d["high"] !== undefined) },
      mark: { type: "rule", strokeWidth: 1.2, opacity: 0.75 },
      encoding: { x, y: { ...y, field: "low" }, y2: { field: "high" }, color: colour, description: byName },
    },
    ...[true, false].map((filled) => ({
      data: { values: data.filter((d) => d["filled"] === filled) },
      mark: { type: "point", filled, size: 46, opacity: 1, ...(filled ? {} : { fill: PAGE.paper.light }) },
      encoding: { x, y, color: colour, shape, description },
    })),
    {
      data: { values: labels },
      mark: { type: "rule", strokeWidth: 0.8, opacity: 0.6 },
      encoding: { x, x2: { value: WIDTH + 12 }, y, y2: { field: "at" }, color: colour, description: byName },
    },
    {
      data: { values: labels },
      mark: { type: "text", align: "left", baseline: "middle" },
      encoding: {
        x: { value: WIDTH + 16 },
        y: { ...y, field: "at" },
        text: { field: "label", type: "nominal" },
        color: colour,
        description: byName,
      },
    },
    ...toleranceLabel(subject, y),
  ];

  const title = finding(subject, points);
  const says = `Root mean square error of the estimate over replicates, in units of the quantity, against points n per replicate.`;
  const lowest = ends.map((p) => `${p.row.label} ${formatValue(p.rmse)} at n = ${formatCount(p.n)}`);
  return {
    name: `error-against-n-${subject.slug}`,
    title,
    says,
    caption:
      "Lower is better, steeper improves faster: dotted guides show the slopes −½ (independent points) and −1. Bars are 95 % intervals of the RMSE; hollow marks have none: a deterministic source makes one error per n, and that is drawn. " +
      "A curve that turns flat has met its bias. The line across is the tolerance itself; to keep it with the stated confidence the RMSE must lie well below. " +
      familyKey(view, true),
    alt: `Line chart of root mean square error against n for ${subject.title}, tolerance ${toleranceWords(subject)}. ${title} At the largest n: ${lowest.join("; ")}.`,
    notDrawn: notes(exact, missing, subject.rows),
    table: table(subject),
    spec: framed({
      title,
      says,
      alt: `${subject.title}: ${title}`,
      width: WIDTH,
      height: HEIGHT,
      margins: MARGINS,
      layer,
    }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, HEIGHT + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

/** At most eight of the sizes, evenly picked, the largest among them. */
function ticks(sizes: readonly number[]): number[] {
  const spaced: number[] = [];
  const apart = Math.max(1.9, ((sizes[sizes.length - 1] ?? 1) / (sizes[0] ?? 1)) ** (1 / 7));
  for (const n of [...sizes].reverse()) {
    if (spaced.length === 0 || (spaced[0] ?? 0) / n >= apart * 0.99) spaced.unshift(n);
  }
  return spaced;
}

function guideLayers(guides: readonly Datum[], x: Spec, y: Spec): Spec[] {
  if (guides.length === 0) return [];
  const ends = guides.filter((_, i) => i % 2 === 1);
  return [
    {
      data: { values: guides },
      mark: { type: "line", color: PAGE.soft.light, strokeWidth: 1, strokeDash: [1, 4], aria: false },
      encoding: { x, y, detail: { field: "guide", type: "nominal" } },
    },
    {
      data: { values: ends },
      mark: {
        type: "text",
        align: "right",
        baseline: "bottom",
        dx: -4,
        dy: -4,
        fontSize: 11,
        color: PAGE.soft.light,
        aria: false,
      },
      encoding: { x, y, text: { field: "guide", type: "nominal" } },
    },
  ];
}

function toleranceLine(subject: Subject, y: Spec): Spec[] {
  if (subject.tolerance === null) return [];
  const mark = { type: "rule", color: PAGE.tolerance.light, strokeWidth: 1.4, aria: false };
  return [{ data: { values: [{ rmse: subject.tolerance }] }, mark, encoding: { y } }];
}

/** The word beside the line, drawn last and on a halo of paper, since curves may cross it. */
function toleranceLabel(subject: Subject, y: Spec): Spec[] {
  if (subject.tolerance === null) return [];
  const values = [{ rmse: subject.tolerance, label: `tolerance ${plainNumber(subject.tolerance, 3)}` }];
  const text = { type: "text", align: "left", baseline: "bottom", dy: -4, aria: false };
  const encoding = { x: { value: 6 }, y, text: { field: "label", type: "nominal" } };
  const halo = { color: PAGE.paper.light, stroke: PAGE.paper.light, strokeWidth: 4 };
  return [
    { data: { values }, mark: { ...text, ...halo }, encoding },
    { data: { values }, mark: { ...text, color: PAGE.tolerance.light }, encoding },
  ];
}

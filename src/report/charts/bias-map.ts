/**
 * The bias map: problem x source, each cell the bias at the largest n in standard errors. Confirmed biases carry a
 * diamond, so colour is never the only sign.
 */
import { formatCount, formatPercent, formatValue, signed } from "../../findings/format.js";
import { PAGE, TINTS } from "../look.js";
import type { Row, Subject, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  counted,
  fitted,
  framed,
  listed,
} from "./chart.js";
import { pixelY, rowLabels } from "./rows-frame.js";

const ROW = 26;
const HEAD = 150;

interface MapCell {
  readonly subject: Subject;
  readonly row: Row;
  /** Bias in standard errors, or null where there is no error bar. */
  readonly z: number | null;
  readonly bias: number | null;
  readonly error: number | null;
  readonly n: number;
  readonly confirmed: boolean;
}

function mapCells(view: View): MapCell[] {
  return view.subjects.flatMap((subject) =>
    subject.rows.flatMap((row) => {
      const cell = row.cells.find((c) => c.n === row.test?.n) ?? row.last;
      if (cell === null) return [];
      const { bias, biasStandardError: error } = cell;
      const usable =
        row.test?.kind !== "none" &&
        bias !== null &&
        error !== null &&
        error > 0 &&
        Number.isFinite(bias / error);
      return [
        {
          subject,
          row,
          z: usable ? bias / error : null,
          bias,
          error,
          n: cell.n,
          confirmed: row.test?.confirmed ?? false,
        },
      ];
    }),
  );
}

/** Steps of |z| at 2, 4 and 10: none of them is a test, the diamond is. */
function tint(z: number | null): string {
  if (z === null || Math.abs(z) < 2) return TINTS.none.light;
  const side = z > 0 ? TINTS.above : TINTS.below;
  const step = Math.abs(z) < 4 ? side[0] : Math.abs(z) < 10 ? side[1] : side[2];
  return step.light;
}

/** One decimal below 10, whole numbers up to 9,999, thousands as `k` beyond. */
function standardised(z: number | null): string {
  if (z === null) return "–";
  const size = Math.abs(z);
  const text =
    size < 9.95 ? size.toFixed(1) : size < 9999.5 ? size.toFixed(0) : `${(size / 1000).toPrecision(2)}k`;
  if (text === "0.0") return text;
  return `${z < 0 ? "−" : "+"}${text}`;
}

function finding(cells: readonly MapCell[], tests: number, level: number): string {
  const confirmed = cells.filter((c) => c.confirmed);
  const base = `${counted(tests, "test")} at a family level of ${formatPercent(level)}`;
  if (confirmed.length === 0) return `No bias was confirmed in ${base}.`;
  const bySource = new Map<string, string[]>();
  for (const c of confirmed)
    bySource.set(c.row.label, [...(bySource.get(c.row.label) ?? []), c.subject.title]);
  const parts = [...bySource].map(([label, titles]) => `${label} on ${listed(titles, 3)}`);
  return `${confirmed.length} of ${counted(cells.length, "pair")} show a confirmed bias: ${listed(parts, 3)}.`;
}

/** The map of all subjects and sources, or null where there is nothing to show. */
export function biasMap(view: View): Chart | null {
  const cells = mapCells(view);
  if (cells.length === 0) return null;
  const labels = [...new Set(cells.map((c) => c.row.label))];
  const wide = Math.max(44, Math.min(60, Math.floor(640 / view.subjects.length)));
  const [width, height] = [view.subjects.length * wide, labels.length * ROW];
  const margins: Margins = { left: 170, right: 165, top: HEAD, bottom: 14 };
  const marks = new Marks();

  const data = cells.map((c): Datum => {
    const column = view.subjects.indexOf(c.subject);
    const how = c.z === null ? "not tested" : `${standardised(c.z)} standard errors`;
    const about = `${c.row.label} on ${c.subject.title}, n = ${formatCount(c.n)}: bias ${
      c.bias === null ? "not known" : signed(c.bias, c.error)
    } (${how})${c.confirmed ? "; confirmed on fresh keys" : ""}`;
    return {
      series: marks.name(c.row.view, c.row.label),
      about: marks.values(c.row.view, about),
      x: column * wide + 1,
      x2: (column + 1) * wide - 1,
      middle: (column + 0.5) * wide,
      y: labels.indexOf(c.row.label) * ROW + 1,
      y2: (labels.indexOf(c.row.label) + 1) * ROW - 1,
      centre: (labels.indexOf(c.row.label) + 0.5) * ROW,
      tint: tint(c.z),
      text: `${c.confirmed ? "◆" : ""}${standardised(c.z)}`,
      confirmed: c.confirmed,
    };
  });
  const tints = [...new Set(data.map((d) => d["tint"] as string))];
  const xScale = { scale: { domain: [0, width], range: [0, width], nice: false, zero: false }, axis: null };
  const x = (field: string): Spec => ({ field, type: "quantitative", ...xScale });
  const y = (field: string): Spec => pixelY(height, field);
  const description = { field: "about", type: "nominal" };
  const heads = view.subjects.map((s, i) => ({ at: (i + 0.5) * wide, label: fitted(s.title, 205) }));
  const sourceLabels = labels.map((label, i): Datum => ({ label, series: label, y: (i + 0.5) * ROW }));
  const layer: Spec[] = [
    {
      data: { values: data },
      mark: { type: "rect" },
      encoding: {
        x: x("x"),
        x2: { field: "x2" },
        y: y("y"),
        y2: { field: "y2" },
        fill: { field: "tint", type: "nominal", scale: { domain: tints, range: tints }, legend: null },
        description,
      },
    },
    {
      data: { values: data.filter((d) => d["confirmed"]) },
      mark: { type: "rect", fill: null, stroke: PAGE.ink.light, strokeWidth: 1.4 },
      encoding: { x: x("x"), x2: { field: "x2" }, y: y("y"), y2: { field: "y2" }, description },
    },
    {
      data: { values: data },
      mark: { type: "text", baseline: "middle", fontSize: 11, color: PAGE.ink.light },
      encoding: { x: x("middle"), y: y("centre"), text: { field: "text", type: "nominal" }, description },
    },
    {
      data: { values: heads },
      mark: {
        type: "text",
        angle: 320,
        align: "left",
        baseline: "middle",
        color: PAGE.ink.light,
        aria: false,
      },
      encoding: { x: x("at"), y: { value: -10 }, text: { field: "label", type: "nominal" } },
    },
    rowLabels(sourceLabels, height, margins.left - 16, null),
  ];
  const title = finding(cells, view.record.family.tests, view.record.family.level);
  const says =
    "Bias at the largest n divided by its standard error, per problem (columns) and source (rows).";
  const size: [number, number] = [
    width + margins.left + margins.right,
    height + margins.top + margins.bottom,
  ];
  return {
    name: "bias-map",
    title,
    says,
    caption:
      "Values within about ±2 are what an unbiased source gives; warm cells lie above the reference, cool ones below, deeper from 4 and from 10 standard errors on. " +
      "A diamond and an outline mark a bias that passed the test of the whole family and was confirmed on fresh keys; a deep colour without them is a candidate that was not confirmed. " +
      "A dash means that there was nothing to test: a deterministic source, estimates that are all equal, or none that is finite.",
    alt: `Grid of ${labels.length} sources by ${view.subjects.length} problems with the bias in standard errors. ${title}`,
    notDrawn: [],
    table: {
      columns: [
        { title: "Problem", align: "left" },
        { title: "Source", align: "left" },
        { title: "n", align: "right" },
        { title: "Bias", align: "right" },
        { title: "Standard error", align: "right" },
        { title: "Bias in standard errors", align: "right" },
        { title: "Confirmed", align: "left" },
      ],
      rows: cells.map((c) => [
        c.subject.title,
        c.row.label,
        formatCount(c.n),
        c.bias === null ? "–" : signed(c.bias, c.error),
        c.error === null ? "–" : formatValue(c.error),
        standardised(c.z),
        c.confirmed ? "◆ confirmed" : "",
      ]),
    },
    spec: framed({ title, says, alt: title, width, height, margins, layer }),
    marks: marks.map,
    size,
    margins,
  };
}

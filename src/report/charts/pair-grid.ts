/** t of all pairs of coordinates of a net as a triangular grid: where the badly covered pairs are. */
import { formatCount } from "../../findings/format.js";
import { PAGE, TINTS } from "../look.js";
import { type Chart, type Datum, type Margins, type Spec, framed } from "./chart.js";
import { pixelY } from "./rows-frame.js";

export interface PairGridData {
  /** Stem of the chart's file behind "pair-grid-". */
  readonly slug: string;
  readonly source: string;
  readonly base: number;
  readonly digits: number;
  readonly dimension: number;
  /** t of coordinates i < j (0-based) at j (j - 1) / 2 + i. */
  readonly values: ArrayLike<number>;
}

/** Coordinates drawn at most: 4,950 cells. */
const MOST = 100;

const SIDE = 560;

/** Cells of at least so many pixels carry their number. */
const READABLE = 17;

/** The chart; null for fewer than two coordinates. */
export function pairGrid({ slug, source, base, digits, dimension, values }: PairGridData): Chart | null {
  if (dimension < 2) return null;
  const drawn = Math.min(dimension, MOST);
  const cell = Math.max(5, Math.min(30, Math.floor(SIDE / drawn)));
  const side = cell * drawn;
  const largest = Array.from(values).reduce((most, t) => Math.max(most, t), 0);
  const data: Datum[] = [];
  for (let j = 1; j < drawn; j++) {
    for (let i = 0; i < j; i++) {
      const t = values[(j * (j - 1)) / 2 + i] ?? 0;
      // the square grows with t, so that colour is not the only sign
      const half = (cell / 2 - 0.5) * (0.5 + (0.5 * t) / Math.max(1, largest));
      const [x, y] = [(i + 0.5) * cell, (j + 0.5) * cell];
      data.push({
        x: x - half,
        x2: x + half,
        y: y - half,
        y2: y + half,
        middle: x,
        centre: y,
        tint: tint(t, digits),
        text: String(t),
        about: `coordinates ${i + 1} and ${j + 1}: t = ${t}`,
      });
    }
  }
  const tints = [...new Set(data.map((d) => d["tint"] as string))];
  const scale = { scale: { domain: [0, side], range: [0, side], nice: false, zero: false }, axis: null };
  const x = (field: string): Spec => ({ field, type: "quantitative", ...scale });
  const y = (field: string): Spec => pixelY(side, field);
  const every = Math.max(1, Math.ceil(drawn / 20));
  const labels = Array.from({ length: drawn }, (_, j) => j)
    .filter((j) => j % every === 0)
    .map((j) => ({ at: (j + 0.5) * cell, label: String(j + 1) }));
  const text = { type: "text", baseline: "middle", fontSize: 11, aria: false };
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
        description: { field: "about", type: "nominal" },
      },
    },
    ...(cell < READABLE
      ? []
      : [
          {
            data: { values: data },
            mark: { ...text, color: PAGE.ink.light },
            encoding: { x: x("middle"), y: y("centre"), text: { field: "text", type: "nominal" } },
          },
        ]),
    {
      data: { values: labels },
      mark: { ...text, align: "right", dx: -6, color: PAGE.soft.light },
      encoding: { x: { value: 0 }, y: y("at"), text: { field: "label", type: "nominal" } },
    },
    {
      data: { values: labels },
      mark: { ...text, color: PAGE.soft.light },
      encoding: { x: x("at"), y: { value: side + 10 }, text: { field: "label", type: "nominal" } },
    },
  ];
  const counts = Array.from({ length: largest + 1 }, () => 0);
  for (const t of Array.from(values)) counts[t] = (counts[t] ?? 0) + 1;
  const total = (dimension * (dimension - 1)) / 2;
  const bad = counts.reduce((sum, count, t) => (2 * t > digits ? sum + count : sum), 0);
  const title =
    largest === 0
      ? `${source} covers all ${formatCount(total)} pairs of coordinates as evenly as ${base}^${digits} points can.`
      : `${source} at ${base}^${digits} points: t is at most ${largest} over ${formatCount(total)} pairs of coordinates, and above ${digits / 2} in ${bad === 0 ? "none" : formatCount(bad)}.`;
  const says = "t of every pair of coordinates; rows and columns are coordinates, counted from 1.";
  const margins: Margins = { left: 46, right: 20, top: 12, bottom: 30 };
  return {
    name: `pair-grid-${slug}`,
    title,
    says,
    caption: `Larger and deeper squares: boxes of the pair hold more uneven numbers of points. Tints change above a quarter, a half and three quarters of ${digits}; t = ${digits} says nothing at all.`,
    alt: `Triangular grid of t for pairs of ${drawn} coordinates. ${title}`,
    notDrawn:
      drawn === dimension
        ? []
        : [
            `Only the first ${drawn} of ${dimension} coordinates are drawn; the sentence is about all of them.`,
          ],
    table: {
      columns: [
        { title: "t", align: "right" },
        { title: "Pairs", align: "right" },
      ],
      rows: counts.map((count, t) => [String(t), formatCount(count)]),
    },
    spec: framed({ title, says, alt: title, width: side, height: side, margins, layer }),
    marks: new Map(),
    size: [side + margins.left + margins.right, side + margins.top + margins.bottom],
    margins,
  };
}

function tint(t: number, digits: number): string {
  if (4 * t <= digits) return TINTS.none.light;
  const step = 2 * t <= digits ? 0 : 4 * t <= 3 * digits ? 1 : 2;
  return (TINTS.above[step] ?? TINTS.none).light;
}

/** The figure S of the dual lattice by dimension, a line per source: where each is far from the best lattice possible. */
import type { InspectedView } from "../inspection-view.js";
import {
  type Chart,
  type Margins,
  Marks,
  POWER_LABELS,
  counted,
  familyKey,
  framed,
  listed,
  powersOfTen,
} from "./chart.js";
import { lineLayers } from "./lines-frame.js";

const WIDTH = 560;
const HEIGHT = 320;
const MARGINS: Margins = { left: 60, right: 190, top: 14, bottom: 48 };

/** Figures below it are named in the title. */
const POOR = 0.1;

interface Point {
  readonly item: InspectedView;
  readonly dimension: number;
  readonly figure: number;
  readonly planes: string;
}

/** A table number: four digits behind the point, or three that count. */
function figureText(figure: number): string {
  return figure >= 0.001 ? figure.toFixed(4) : figure.toExponential(1);
}

function pointsOf(items: readonly InspectedView[]): Point[] {
  return items.flatMap((item) => {
    const { dual } = item.inspection.findings;
    return (dual?.dual ?? [])
      .filter(({ dimension }) => dual?.order === 1 || dimension > (dual?.order ?? 1))
      .map(({ dimension, figure, hyperplanes }) => ({
        item,
        dimension,
        figure,
        planes: String(hyperplanes),
      }));
  });
}

function finding(points: readonly Point[]): string {
  const worst = [...new Set(points.map(({ item }) => item))].map((item) => {
    const own = points.filter((point) => point.item === item);
    return own.reduce((least, point) => (point.figure < least.figure ? point : least));
  });
  worst.sort((a, b) => a.figure - b.figure);
  const falling = worst.filter(({ figure }) => figure < POOR);
  const rest = worst.slice(falling.length);
  const words = ({ item, figure, dimension }: Point): string =>
    `${item.inspection.choice.id} falls to S = ${figureText(figure)} in dimension ${dimension}`;
  const [least] = rest;
  if (least === undefined) return `${listed(falling.map(words))}.`;
  const above = `at ${figureText(least.figure)} or above`;
  if (falling.length > 0)
    return `${listed(falling.map(words))}; ${rest.length > 1 ? "the others stay" : `${least.item.inspection.choice.id} stays`} ${above}.`;
  return `${rest.length > 1 ? "All figures stay" : `${least.item.inspection.choice.id} stays`} ${above}, the least in dimension ${least.dimension}${rest.length > 1 ? ` (${least.item.inspection.choice.id})` : ""}.`;
}

/** Null where no source has a lattice. */
export function figureByDimension(items: readonly InspectedView[]): Chart | null {
  const points = pointsOf(items);
  if (points.length === 0) return null;
  const drawn = [...new Set(points.map(({ item }) => item))];
  const dimensions = points.map(({ dimension }) => dimension);
  const [left, right] = [Math.min(...dimensions), Math.max(...dimensions)];
  const [bottom, top] = [Math.min(0.1, ...points.map(({ figure }) => figure)) / 1.4, 1.15];
  const marks = new Marks();
  const pixel = (figure: number): number => (HEIGHT * Math.log(top / figure)) / Math.log(top / bottom);
  const layer = lineLayers(
    points.map(({ item, dimension, figure, planes }) => {
      const { id } = item.inspection.choice;
      const about = `${id} in dimension ${dimension}: S = ${figureText(figure)}, ${planes} planes`;
      return { view: item.view, label: id, x: dimension, y: figure, about };
    }),
    marks,
    {
      x: {
        title: "dimension t",
        scale: { domain: [left - 0.4, right + 0.4], nice: false, zero: false },
        axis: { format: "d", grid: false, tickMinStep: 1 },
      },
      y: {
        title: "figure S (log scale)",
        scale: { type: "log", domain: [bottom, top], nice: false },
        axis: { values: powersOfTen(bottom, top), labelExpr: POWER_LABELS, titleX: -44 },
      },
      size: [WIDTH, HEIGHT],
      margins: MARGINS,
      pixel,
      value: (at) => top * (bottom / top) ** (at / HEIGHT),
    },
  );
  const title = finding(points);
  const says = "Length of the shortest dual vector over the longest possible one, by dimension.";
  return {
    name: "figure-by-dimension",
    title,
    says,
    caption:
      "1 is the best lattice there can be; the lower, the fewer and further apart the planes on which all tuples lie. Beyond 8 dimensions (but for 24) the longest possible length is a bound, so the figure is a lower limit. " +
      familyKey({ sources: drawn.map(({ view }) => view) }, true),
    alt: `Line chart of the figure S of ${counted(drawn.length, "source")} (${listed(drawn.map(({ inspection }) => inspection.choice.id))}) in dimensions ${left} to ${right}. ${title}`,
    notDrawn: [],
    table: {
      columns: [
        { title: "Source", align: "left" },
        { title: "Dimension", align: "right" },
        { title: "S", align: "right" },
        { title: "Planes", align: "right" },
      ],
      rows: points.map(({ item, dimension, figure, planes }) => [
        item.inspection.choice.id,
        String(dimension),
        figureText(figure),
        planes,
      ]),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height: HEIGHT, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, HEIGHT + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

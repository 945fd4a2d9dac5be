/** Charts with one line per source over whole numbers, named at its end. */
import type { SourceView } from "../view.js";
import { type Datum, type Margins, type Spec, Marks, fitted, sourceChannels, spread } from "./chart.js";

export interface LinePoint {
  readonly view: SourceView;
  readonly label: string;
  readonly x: number;
  readonly y: number;
  /** The values in words. */
  readonly about: string;
}

export interface Axes {
  /** Vega-Lite's axis and scale of each direction, without the field. */
  readonly x: Spec;
  readonly y: Spec;
  readonly size: readonly [width: number, height: number];
  readonly margins: Margins;
  /** Pixels from the top of a value, and back. */
  readonly pixel: (y: number) => number;
  readonly value: (pixel: number) => number;
}

const LABEL_GAP = 14;

/** Lines, points and names; points in order of x for each source. */
export function lineLayers(points: readonly LinePoint[], marks: Marks, axes: Axes): Spec[] {
  const [width, height] = axes.size;
  const views = [...new Set(points.map(({ view }) => view))];
  const { colour, dash, shape } = sourceChannels(views);
  const values = points.map(({ view, label, x, y, about }): Datum => ({
    source: view.index,
    series: marks.name(view, label),
    about: marks.values(view, about),
    x,
    y,
  }));
  const ends = views.flatMap((view) => points.filter((point) => point.view === view).slice(-1));
  const places = spread(
    ends.map(({ y }) => axes.pixel(y)),
    Math.min(LABEL_GAP, height / Math.max(1, ends.length - 1)),
    4,
    height - 4,
  );
  const names = ends.map(({ view, label, x, y }, k): Datum => ({
    source: view.index,
    series: label,
    x,
    y,
    at: axes.value(places[k] ?? 0),
    label: fitted(label, axes.margins.right - 20),
  }));
  const x = { ...axes.x, field: "x", type: "quantitative" };
  const y = { ...axes.y, field: "y", type: "quantitative" };
  const byName = { field: "series", type: "nominal" };
  return [
    {
      data: { values },
      mark: { type: "line", strokeWidth: 1.6 },
      encoding: { x, y, color: colour, strokeDash: dash, detail: byName, description: byName },
    },
    {
      data: { values },
      mark: { type: "point", filled: true, size: 34, opacity: 1 },
      encoding: { x, y, color: colour, shape, description: { field: "about", type: "nominal" } },
    },
    {
      data: { values: names },
      mark: { type: "rule", strokeWidth: 0.8, opacity: 0.6 },
      encoding: {
        x,
        x2: { value: width + 12 },
        y,
        y2: { field: "at" },
        color: colour,
        description: byName,
      },
    },
    {
      data: { values: names },
      mark: { type: "text", align: "left", baseline: "middle" },
      encoding: {
        x: { value: width + 16 },
        y: { ...y, field: "at" },
        text: { field: "label", type: "nominal" },
        color: colour,
        description: byName,
      },
    },
  ];
}

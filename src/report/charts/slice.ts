/** Points of a source seen along the planes of its dual vector, beside those of a sound source. */
import { vectorText } from "../../structure/sections/text.js";
import type { InspectedView } from "../inspection-view.js";
import { PAGE } from "../look.js";
import { type Chart, type Datum, type Margins, type Spec, Marks, framed } from "./chart.js";
import { pixelY } from "./rows-frame.js";

const PANEL = 300;
const GAP = 40;
const WIDTH = 2 * PANEL + GAP;
const HEIGHT = 260;
const MARGINS: Margins = { left: 40, right: 40, top: 34, bottom: 52 };

/** Null for a source without planes that could be seen. */
export function slice({ view, inspection, slice: seen }: InspectedView): Chart | null {
  if (seen === null) return null;
  const { id } = inspection.choice;
  const [from, to] = seen.window;
  const marks = new Marks();
  const across = (panel: number, value: number): number =>
    panel * (PANEL + GAP) + ((value - from) / (to - from)) * PANEL;
  const x = {
    field: "x",
    type: "quantitative",
    axis: null,
    scale: { domain: [0, WIDTH], range: [0, WIDTH], nice: false, zero: false },
  };
  const y = pixelY(HEIGHT);
  const dots = (panel: number, points: readonly (readonly [number, number])[]): Datum[] =>
    points.map(([value, up]) => ({ x: round(across(panel, value)), y: round(HEIGHT * (1 - up)) }));
  const ticks = [0, 1].flatMap((panel) =>
    [from, (from + to) / 2, to].map((value) => ({
      x: across(panel, value),
      label: signed(value),
      y: HEIGHT + 16,
    })),
  );
  const heads = [
    { x: 0, label: marks.name(view, id), y: -12 },
    { x: PANEL + GAP, label: `${seen.soundSource}, held to be sound`, y: -12 },
  ];
  const panels = [0, 1].map((panel) => ({ x: panel * (PANEL + GAP), x2: panel * (PANEL + GAP) + PANEL }));
  const text = (values: readonly Datum[], mark: Spec): Spec => ({
    data: { values },
    mark: { type: "text", baseline: "middle", ...mark },
    encoding: { x, y, text: { field: "label", type: "nominal" } },
  });
  const layer: Spec[] = [
    {
      data: { values: panels.map((panel) => ({ ...panel, y: 0, y2: HEIGHT })) },
      mark: { type: "rect", fill: null, stroke: PAGE.rule.light, strokeWidth: 1, aria: false },
      encoding: { x, x2: { field: "x2" }, y, y2: { field: "y2" } },
    },
    {
      data: { values: dots(0, seen.points) },
      mark: {
        type: "point",
        filled: true,
        size: 7,
        opacity: 1,
        color: view.ink.light,
        shape: "circle",
        aria: false,
      },
      encoding: { x, y },
    },
    {
      data: { values: dots(1, seen.sound) },
      mark: {
        type: "point",
        filled: true,
        size: 7,
        opacity: 1,
        color: PAGE.soft.light,
        shape: "circle",
        aria: false,
      },
      encoding: { x, y },
    },
    text(heads, { align: "left", fontWeight: 600, color: PAGE.ink.light }),
    text(ticks, { align: "center", color: PAGE.soft.light }),
    text([{ x: WIDTH / 2, y: HEIGHT + 38, label: "h·u: whole numbers apart, plane by plane" }], {
      align: "center",
      color: PAGE.ink.light,
    }),
  ];
  const dimension = seen.vector.length;
  const title = `${dimension === 2 ? "Pairs" : dimension === 3 ? "Triples" : `Tuples of ${dimension}`} of ${id} lie on planes h·u = whole number plus a constant, h = ${vectorText(seen.vector)}.`;
  const says = `${seen.points.length} points with ${signed(from)} ≤ h·u ≤ ${signed(to)}, seen along the planes, beside as many of ${seen.soundSource}.`;
  return {
    name: `slice-${view.slug}`,
    title,
    says,
    caption:
      "Across the picture runs h·u, upwards a direction inside the planes. A source on planes shows upright lines with nothing between them; a sound one fills the picture. An integrand that varies from one plane to the next within that distance is integrated on the lines alone.",
    alt: `Two scatter plots of ${dimension}-dimensional points in a view along planes. ${id} on the left: upright lines of points, empty between them. ${seen.soundSource} on the right: points everywhere.`,
    notDrawn: [],
    table: {
      columns: [
        { title: "h·u", align: "right" },
        { title: id, align: "right" },
        { title: seen.soundSource, align: "right" },
      ],
      rows: histogram(seen.points, seen.sound, from, to),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height: HEIGHT, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, HEIGHT + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

function signed(value: number): string {
  return String(value).replace("-", "−");
}

function round(pixels: number): number {
  return Math.round(pixels * 10) / 10;
}

/** Points in quarters of the distance between planes. */
function histogram(
  points: readonly (readonly [number, number])[],
  sound: readonly (readonly [number, number])[],
  from: number,
  to: number,
): string[][] {
  const bins = 4 * (to - from);
  const count = (all: readonly (readonly [number, number])[], bin: number): number =>
    all.filter(([value]) => Math.min(bins - 1, Math.floor(4 * (value - from))) === bin).length;
  return Array.from({ length: bins }, (_, bin) => {
    const [low, high] = [from + bin / 4, from + (bin + 1) / 4];
    return [`${signed(low)} to ${signed(high)}`, String(count(points, bin)), String(count(sound, bin))];
  });
}

/** Predicted against measured bias, each with its interval, over all pairs of problem and source that have a prediction. */
import { formatPercent, formatValue, signed } from "../../findings/format.js";
import type { Estimated } from "../../record/explanation.js";
import { PAGE } from "../look.js";
import type { ExplainedRow, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  counted,
  framed,
  sourceChannels,
} from "./chart.js";
import { markedLine, pixelY, rowLabels, rulings } from "./rows-frame.js";

const WIDTH = 500;
const STEP = 36;
/** Of the prediction above the middle of its row, and of the measurement below it. */
const APART = 7;
const MARGINS: Margins = { left: 260, right: 110, top: 26, bottom: 50 };

interface Both {
  readonly row: ExplainedRow;
  readonly tolerance: number;
  readonly predicted: Estimated & { readonly standardError: number };
  readonly measured: Estimated & { readonly standardError: number | null };
}

function boths(rows: readonly ExplainedRow[]): Both[] {
  return rows.flatMap((row): Both[] => {
    const { predicted, measured } = row.explanation;
    const { tolerance } = row.subject;
    if (predicted === null || measured === null || tolerance === null) return [];
    const numbers = [...predicted.interval, ...measured.interval];
    return numbers.every(Number.isFinite) ? [{ row, tolerance, predicted, measured }] : [];
  });
}

/** The chart over all explained pairs, or null where there is none. */
export function predictedBias(view: View): Chart | null {
  const all = boths(view.explained);
  if (all.length === 0) return null;
  const height = all.length * STEP;
  const marks = new Marks();
  const views = [...new Set(all.map(({ row }) => row.row.view))];
  const { colour } = sourceChannels(views);
  const inTolerances = (estimated: Estimated, tolerance: number) => ({
    value: estimated.value / tolerance,
    low: estimated.interval[0] / tolerance,
    high: estimated.interval[1] / tolerance,
  });
  const data = all.flatMap(({ row, tolerance, predicted, measured }, i): Datum[] => {
    const label = `${row.row.label}, ${row.subject.title}`;
    const series = marks.name(row.row.view, label);
    const words = (kind: string, { value, interval }: Estimated, error: number | null): string =>
      marks.values(
        row.row.view,
        `${label}: ${kind} bias ${signed(value, error)} (${formatValue(interval[0], error)} to ${formatValue(interval[1], error)})`,
      );
    const common = { source: row.row.view.index, series, label };
    const side = row.explanation.explained ? "explained" : "not explained";
    return [
      {
        ...common,
        ...inTolerances(predicted, tolerance),
        kind: "predicted",
        middle: (i + 0.5) * STEP,
        y: (i + 0.5) * STEP - APART,
        side,
        about: words("predicted", predicted, predicted.standardError),
      },
      {
        ...common,
        ...inTolerances(measured, tolerance),
        kind: "measured",
        middle: (i + 0.5) * STEP,
        y: (i + 0.5) * STEP + APART,
        side,
        about: words("measured", measured, measured.standardError),
      },
    ];
  });
  const ends = data.flatMap((d) => [Number(d["low"]), Number(d["high"])]);
  const [least, most] = [Math.min(-1.2, ...ends), Math.max(1.2, ...ends)];
  const room = 0.04 * (most - least);
  const x = {
    field: "value",
    type: "quantitative",
    title: "bias, in tolerances of the problem",
    scale: { domain: [least - room, most + room], nice: false, zero: false },
    axis: { format: "~g", grid: true, tickCount: 7 },
  };
  const y = pixelY(height);
  const byName = { field: "series", type: "nominal" };
  const of = (kind: string): Datum[] => data.filter((d) => d["kind"] === kind);
  const points = (kind: string, mark: Spec): Spec => ({
    data: { values: of(kind) },
    mark: { type: "point", filled: true, opacity: 1, ...mark },
    encoding: { x, y, color: colour, description: { field: "about", type: "nominal" } },
  });
  const rowText = of("predicted").map((d): Datum => ({ ...d, y: Number(d["middle"]) }));
  const layer: Spec[] = [
    rulings(
      [...all.keys()].map((i) => (i + 1) * STEP),
      height,
    ),
    {
      data: { values: [{ from: -1, to: 1 }] },
      mark: { type: "rect", color: PAGE.wash.light, aria: false },
      encoding: { x: { ...x, field: "from" }, x2: { field: "to" } },
    },
    ...markedLine(x, -1, "−1", [1, 0]),
    ...markedLine(x, 0, "0", [1, 0]),
    ...markedLine(x, 1, "+1 tolerance", [1, 0]),
    {
      data: { values: data.filter((d) => d["low"] !== d["high"]) },
      mark: { type: "rule", strokeWidth: 1.8 },
      encoding: { x: { ...x, field: "low" }, x2: { field: "high" }, y, color: colour, description: byName },
    },
    points("predicted", { shape: "square", size: 60 }),
    points("measured", { shape: "diamond", size: 85 }),
    rowLabels(rowText, height, MARGINS.left - 16, colour),
    {
      data: { values: rowText },
      mark: { type: "text", align: "left", baseline: "middle", color: PAGE.ink.light },
      encoding: {
        x: { value: WIDTH + 12 },
        y,
        text: { field: "side", type: "nominal" },
        description: byName,
      },
    },
  ];
  const explained = all.filter(({ row }) => row.explanation.explained).length;
  const title = `The planes of the source explain ${
    explained === all.length
      ? all.length === 1
        ? "the one bias"
        : `all ${all.length} biases`
      : `${explained} of ${all.length} biases`
  } that a prediction was made for.`;
  const says =
    "Bias as the source's dual vectors predict it, and as it was measured, in tolerances of the problem.";
  const level = formatPercent(all[0]?.row.explanation.predicted?.confidence ?? 0.99);
  return {
    name: "predicted-bias",
    title,
    says,
    caption: `The square above is the prediction, made without the source from its lattice and the integrand alone; the diamond below is the measurement. Bars are intervals at ${level}. The shaded band is the tolerance.`,
    alt: `${counted(all.length, "pair")} of source and problem. ${title}`,
    notDrawn: [],
    table: {
      columns: [
        { title: "Source, problem", align: "left" },
        { title: "Predicted", align: "right" },
        { title: "Standard error", align: "right" },
        { title: "Measured", align: "right" },
        { title: "Standard error", align: "right" },
        { title: "Finding", align: "left" },
      ],
      rows: all.map(({ row, predicted, measured }) => [
        `${row.row.label}, ${row.subject.title}`,
        signed(predicted.value, predicted.standardError),
        formatValue(predicted.standardError),
        signed(measured.value, measured.standardError),
        measured.standardError === null ? "–" : formatValue(measured.standardError),
        row.explanation.explained ? "explained" : "not explained",
      ]),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

/**
 * The alias table as a picture: what each dual vector adds to the bias, largest first, then their sum beside the bias that
 * was measured. Bars are two standard errors either way, for the sums the interval at the stated confidence.
 */
import { explanationHeadline, planesText, vectorText } from "../../findings/explanation-words.js";
import { formatCount, formatPercent, formatValue, signed } from "../../findings/format.js";
import { PAGE } from "../look.js";
import type { ExplainedRow } from "../view.js";
import { type Chart, type Datum, type Margins, type Spec, Marks, framed } from "./chart.js";
import { pixelY, rowLabels, rulings } from "./rows-frame.js";

const WIDTH = 440;
const STEP = 28;
const MARGINS: Margins = { left: 230, right: 180, top: 20, bottom: 50 };

interface Line {
  readonly label: string;
  readonly side: string;
  readonly value: number;
  readonly error: number | null;
  readonly interval: readonly [number, number];
  readonly kind: "vector" | "predicted" | "cycle" | "measured";
}

function linesOf({ explanation }: ExplainedRow): Line[] {
  const { aliases, predicted, measured, fullCycle } = explanation;
  const vectors = aliases.flatMap((alias): Line[] => {
    const { contribution, standardError, copies } = alias;
    if (contribution === null || standardError === null) return [];
    return [
      {
        label: `${vectorText(alias)}${copies > 1 ? ` × ${formatCount(copies)} places` : ""}`,
        side: planesText(alias),
        value: contribution,
        error: standardError,
        interval: [contribution - 2 * standardError, contribution + 2 * standardError],
        kind: "vector",
      },
    ];
  });
  if (predicted !== null) {
    const pairs = `${formatCount(predicted.pairs)} ${predicted.pairs === 1 ? "pair" : "pairs"}`;
    vectors.push({
      label: "predicted bias",
      side: `sum over ${pairs}`,
      value: predicted.value,
      error: predicted.standardError,
      interval: predicted.interval,
      kind: "predicted",
    });
  }
  if (fullCycle !== null && fullCycle.bias !== null) {
    const { bias: value, states, referenceUncertainty: error } = fullCycle;
    const side = `all ${formatCount(states)} states`;
    vectors.push({ label: "full cycle", side, value, error, interval: [value, value], kind: "cycle" });
  }
  if (measured !== null) {
    const { value, standardError: error, interval, replicates } = measured;
    const side = error === null ? "one run" : `${formatCount(replicates)} replicates`;
    vectors.push({ label: "measured bias", side, value, error, interval, kind: "measured" });
  }
  return vectors;
}

/** The chart of one explained pair, or null where nothing was estimated. */
export function aliasChart(row: ExplainedRow): Chart | null {
  const lines = linesOf(row);
  if (!lines.some(({ kind }) => kind === "vector")) return null;
  const height = lines.length * STEP;
  const ends = lines.flatMap(({ interval }) => interval);
  const [low, high] = [Math.min(0, ...ends), Math.max(0, ...ends)];
  const room = 0.06 * (high - low || 1);
  const marks = new Marks();
  const data = lines.map((line, i): Datum => {
    const words = `${line.label}: ${signed(line.value, line.error)}${
      line.error === null ? "" : ` ± ${formatValue(line.error)} standard error`
    } (${line.side})`;
    return {
      kind: line.kind,
      label: line.label,
      series: marks.name(row.row.view, line.label),
      about: marks.values(row.row.view, words),
      side: line.side,
      y: (i + 0.5) * STEP,
      value: line.value,
      low: line.interval[0],
      high: line.interval[1],
    };
  });
  const x = {
    field: "value",
    type: "quantitative",
    title: "part of the bias, in units of the quantity",
    scale: { domain: [low - room, high + room], nice: false, zero: false },
    axis: { format: "~g", grid: true, tickCount: 6 },
  };
  const y = pixelY(height);
  const byName = { field: "series", type: "nominal" };
  const points = (kind: Line["kind"], mark: Spec): Spec => ({
    data: { values: data.filter((d) => d["kind"] === kind) },
    mark: { type: "point", filled: true, opacity: 1, ...mark },
    encoding: { x, y, description: { field: "about", type: "nominal" } },
  });
  const own = row.row.view.ink.light;
  const vectors = data.filter((d) => d["kind"] === "vector").length;
  const layer: Spec[] = [
    rulings(
      [...lines.keys()].map((i) => (i + 1) * STEP),
      height,
    ),
    {
      data: { values: [{ y: vectors * STEP }] },
      mark: { type: "rule", color: PAGE.soft.light, aria: false },
      encoding: { y },
    },
    {
      data: { values: [{ value: 0 }] },
      mark: { type: "rule", color: PAGE.soft.light, aria: false },
      encoding: { x },
    },
    {
      data: { values: data },
      mark: { type: "rule", strokeWidth: 1.6, color: own },
      encoding: { x: { ...x, field: "low" }, x2: { field: "high" }, y, description: byName },
    },
    points("vector", { shape: "circle", size: 55, color: own }),
    points("predicted", { shape: "square", size: 75, color: own }),
    points("cycle", { shape: "triangle-up", size: 75, color: own }),
    points("measured", { shape: "diamond", size: 95, color: PAGE.ink.light }),
    rowLabels(data, height, MARGINS.left - 16, null),
    {
      data: { values: data },
      mark: { type: "text", align: "left", baseline: "middle", color: PAGE.soft.light },
      encoding: {
        x: { value: WIDTH + 12 },
        y,
        text: { field: "side", type: "nominal" },
        description: byName,
      },
    },
  ];
  const title = explanationHeadline(row.explanation);
  const confidence = row.explanation.predicted?.confidence ?? row.subject.confidence;
  const cycle = lines.some(({ kind }) => kind === "cycle")
    ? "; the triangle is the average over every state, which is exact"
    : "";
  const says =
    "What each dual vector adds to the bias, largest first, their sum, and the bias that was measured.";
  return {
    name: `aliases-${row.slug}`,
    title,
    says,
    caption: `A circle is what one vector and its opposite (at all its places along the coordinates) add, its bar two standard errors either way. Below the line the square is the prediction, the diamond the measurement, each with its ${formatPercent(confidence)} interval${cycle}. They agree where the structure explains the bias.`,
    alt: `${row.subject.title}, ${row.row.label}: what ${vectors} dual vectors add to the bias. ${title}`,
    notDrawn: [],
    table: {
      columns: [
        { title: "Vector", align: "left" },
        { title: "Planes", align: "left" },
        { title: "Adds", align: "right" },
        { title: "Standard error", align: "right" },
      ],
      rows: lines.map(({ label, side, value, error }) => [
        label,
        side,
        signed(value, error),
        error === null ? "–" : formatValue(error),
      ]),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

/** Orders of convergence with their intervals: a row per source, in it a mark per problem. */
import { formatValue, signed } from "../../findings/format.js";
import { FAMILY_ORDER, PAGE } from "../look.js";
import type { Row, Subject, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  counted,
  familyKey,
  framed,
  listed,
  sourceChannels,
} from "./chart.js";
import { markedLine, pixelY, rowLabels, rulings } from "./rows-frame.js";

const WIDTH = 560;
const MARGINS: Margins = { left: 170, right: 60, top: 28, bottom: 48 };

interface Fitted {
  readonly subject: Subject;
  readonly row: Row;
  readonly order: number;
  readonly interval: readonly [number, number] | null;
}

function fits(view: View): Fitted[] {
  return view.subjects.flatMap((subject) =>
    subject.rows.flatMap((row): Fitted[] => {
      const order = row.convergence?.order ?? null;
      if (order === null || !Number.isFinite(order)) return [];
      const interval = row.convergence?.orderInterval ?? null;
      return [{ subject, row, order, interval: interval?.every(Number.isFinite) === true ? interval : null }];
    }),
  );
}

/** The middle one of a sorted list (the lower of two). */
function middle(values: readonly number[]): number {
  return [...values].sort((a, b) => a - b)[Math.floor((values.length - 1) / 2)] ?? 0;
}

function finding(all: readonly Fitted[]): string {
  const sound = all.filter((f) => f.row.test?.confirmed !== true);
  const parts = FAMILY_ORDER.flatMap((family) => {
    const orders = sound.filter((f) => f.row.view.source.family === family).map((f) => f.order);
    if (orders.length === 0) return [];
    return [
      `${formatValue(middle(orders))} for ${family === "own" ? "your own sources" : `${family} sources`}`,
    ];
  });
  if (parts.length === 0) return "Every source with a known order has a confirmed bias.";
  const apart = sound.length < all.length ? ", confirmed biases apart" : "";
  return `Orders of convergence centre on ${listed(parts)}${apart}.`;
}

/** Pixels between the marks of one row: closer where there are many problems. */
function dodge(problems: number): number {
  return problems <= 6 ? 9 : problems <= 12 ? 5.5 : 3.8;
}

/** The chart over all sources, or null where no order was fitted. */
export function orders(view: View): Chart | null {
  const all = fits(view);
  if (all.length === 0) return null;
  const labels = FAMILY_ORDER.flatMap((family) => {
    const rows = all.filter((f) => f.row.view.source.family === family);
    return [...new Set(rows.map((f) => f.row.label))];
  });
  const gap = dodge(view.subjects.length);
  const step = Math.max(24, view.subjects.length * gap + 10);
  const height = labels.length * step;
  const values = all.map((f) => f.order);
  const [left, right] = [Math.min(-1.1, ...values) - 0.25, Math.max(-0.3, ...values) + 0.25];
  const marks = new Marks();
  const { colour, shape } = sourceChannels([...new Set(all.map((f) => f.row.view))]);
  const data = all.map((f): Datum => {
    const words =
      f.interval === null
        ? "no interval"
        : `95 % interval ${formatValue(f.interval[0])} to ${formatValue(f.interval[1])}`;
    const place = (view.subjects.indexOf(f.subject) - (view.subjects.length - 1) / 2) * gap;
    return {
      source: f.row.view.index,
      series: marks.name(f.row.view, f.row.label),
      about: marks.values(
        f.row.view,
        `${f.row.label} on ${f.subject.title}: order ${formatValue(f.order)} (${words})`,
      ),
      y: (labels.indexOf(f.row.label) + 0.5) * step + place,
      order: f.order,
      ...(f.interval === null
        ? {}
        : { low: Math.max(f.interval[0], left), high: Math.min(f.interval[1], right) }),
    };
  });
  const rowText = labels.map((label, i): Datum => {
    const source = all.find((f) => f.row.label === label)?.row.view.index ?? 0;
    return { label, series: label, source, y: (i + 0.5) * step };
  });
  const cut = all.filter(
    (f) => f.interval !== null && (f.interval[0] < left || f.interval[1] > right),
  ).length;
  const x = {
    field: "order",
    type: "quantitative",
    title: "order (slope of log RMSE on log n)",
    scale: { domain: [left, right], nice: false, zero: false },
    axis: { format: "~g", grid: true, tickCount: 7 },
  };
  const y = pixelY(height);
  const byName = { field: "series", type: "nominal" };
  const description = { field: "about", type: "nominal" };
  const layer: Spec[] = [
    rulings(
      labels.map((_, i) => (i + 1) * step),
      height,
    ),
    ...markedLine(x, -0.5, "−½", [4, 3]),
    ...markedLine(x, -1, "−1", [4, 3]),
    {
      data: { values: data.filter((d) => d["low"] !== undefined) },
      mark: { type: "rule", strokeWidth: 1.3, opacity: 0.75 },
      encoding: { x: { ...x, field: "low" }, x2: { field: "high" }, y, color: colour, description: byName },
    },
    ...[true, false].map((filled) => ({
      data: { values: data.filter((d) => (d["low"] !== undefined) === filled) },
      mark: {
        type: "point",
        filled,
        size: gap > 6 ? 42 : 22,
        opacity: 1,
        ...(filled ? {} : { fill: PAGE.paper.light }),
      },
      encoding: { x, y, color: colour, shape, description },
    })),
    rowLabels(rowText, height, MARGINS.left - 16, colour),
  ];
  const title = finding(all);
  const says = "Order of convergence of each source (rows), one mark per problem, with its 95 % interval.";
  return {
    name: "orders",
    title,
    says,
    caption:
      "Further left is better: −½ is what independent points give, −1 halves the error with every doubling of n. Within a source the problems stand from top to bottom in the order of this report. " +
      "A pseudo-random source far from −½ has met its bias: its curve bends. Hollow marks have no interval. " +
      familyKey(view, false),
    alt: `Dot plot of the order of convergence of ${counted(labels.length, "source")}. ${title}`,
    notDrawn:
      cut > 0 ? [`${counted(cut, "interval")} cut at the edge of the figure; whole in the table.`] : [],
    table: {
      columns: [
        { title: "Source", align: "left" },
        { title: "Problem", align: "left" },
        { title: "Order", align: "right" },
        { title: "95 % interval", align: "right" },
      ],
      rows: all.map((f) => [
        f.row.label,
        f.subject.title,
        signed(f.order, f.interval === null ? 0.1 : (f.interval[1] - f.interval[0]) / 2),
        f.interval === null ? "–" : `${formatValue(f.interval[0])} to ${formatValue(f.interval[1])}`,
      ]),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

/**
 * Which inputs matter: for each coordinate (or group, or whole input) the share of the variance that it decides alone and
 * the share that it has part in, with intervals, largest first. The gap between the two is what it does with others only.
 */
import { formatPercent } from "../../findings/format.js";
import {
  ranked,
  sensitivityHeadline,
  shareInterval,
  shareText,
  sharesTable,
} from "../../findings/sensitivity-words.js";
import type { InputShare } from "../../record/sensitivity.js";
import { PAGE } from "../look.js";
import type { Subject, View } from "../view.js";
import { type Chart, type Datum, type Margins, type Spec, framed } from "./chart.js";
import { pixelY, rowLabels, rulings } from "./rows-frame.js";

const WIDTH = 440;
const STEP = 26;
const MARGINS: Margins = { left: 150, right: 200, top: 20, bottom: 50 };

/** Rows drawn at most; the record holds all. */
const MOST = 16;

/** The chart of one subject; null where the shares are not known. */
export function inputsChart(
  _: View | null,
  subject: Pick<Subject, "slug" | "title" | "sensitivity">,
): Chart | null {
  const { sensitivity } = subject;
  const measures = sensitivity?.measures ?? null;
  if (sensitivity === null || measures === null) return null;
  const order = ranked(measures.units);
  const rows: readonly InputShare[] = [
    ...(measures.inputs.length <= 4 ? ranked(measures.inputs) : []).filter(({ count }) => count > 1),
    ...order.slice(0, MOST),
  ];
  const whole = rows.length - Math.min(MOST, order.length);
  const height = rows.length * STEP;
  const data = rows.map(({ label, alone, total, count }, k): Datum => {
    const name = k < whole ? `all of ${label} (${count})` : label;
    return {
      y: (k + 0.5) * STEP,
      label: name,
      series: name,
      about: `${name}: alone ${shareText(alone.value)} (${shareInterval(alone)}), has part in ${shareText(total.value)} (${shareInterval(total)})`,
      side: `${shareText(alone.value)} alone, ${shareText(total.value)} in all`,
      alone: alone.value,
      aloneLow: alone.interval[0],
      aloneHigh: alone.interval[1],
      total: total.value,
      totalLow: total.interval[0],
      totalHigh: total.interval[1],
      above: (k + 0.5) * STEP - 4,
      below: (k + 0.5) * STEP + 4,
    };
  });
  const ends = rows.flatMap(({ alone, total }) => [...alone.interval, ...total.interval]);
  const [low, high] = [Math.min(0, ...ends), Math.max(...ends)];
  const room = 0.04 * (high - low || 1);
  const x = {
    type: "quantitative",
    title: "share of the variance of the integrand",
    scale: { domain: [low - room, high + room], nice: false, zero: false },
    axis: { format: ".0%", grid: true, tickCount: 5 },
  };
  const description = { field: "about", type: "nominal" };
  const series = (field: "alone" | "total", at: "above" | "below", mark: Spec): Spec[] => [
    {
      data: { values: data },
      mark: { type: "rule", strokeWidth: 1.6, color: PAGE.soft.light, aria: false },
      encoding: {
        x: { ...x, field: `${field}Low` },
        x2: { field: `${field}High` },
        y: pixelY(height, at),
      },
    },
    {
      data: { values: data },
      mark: { type: "point", opacity: 1, color: PAGE.ink.light, ...mark },
      encoding: { x: { ...x, field }, y: pixelY(height, at), description },
    },
  ];
  const layer: Spec[] = [
    rulings(
      [...rows.keys()].map((k) => (k + 1) * STEP),
      height,
    ),
    {
      data: { values: [{ zero: 0 }] },
      mark: { type: "rule", color: PAGE.soft.light, aria: false },
      encoding: { x: { ...x, field: "zero" } },
    },
    ...series("total", "below", { shape: "square", filled: false, size: 60, strokeWidth: 1.6 }),
    ...series("alone", "above", { shape: "circle", filled: true, size: 50 }),
    rowLabels(data, height, MARGINS.left - 16, null),
    {
      data: { values: data },
      mark: { type: "text", align: "left", baseline: "middle", color: PAGE.soft.light, aria: false },
      encoding: {
        x: { value: WIDTH + 12 },
        y: pixelY(height),
        text: { field: "side", type: "nominal" },
      },
    },
  ];
  const title = `${capital(sensitivityHeadline(sensitivity))}.`;
  const says = "Share of the variance that each decides alone and that it has part in, largest first.";
  const left = order.length - MOST;
  return {
    name: `inputs-${subject.slug}`,
    title,
    says,
    caption: `A filled circle is what the coordinate decides alone (first-order Sobol' index), an open square what it has part in (total index), each with its ${formatPercent(sensitivity.confidence)} interval; the way from circle to square is what it does only together with others. A coordinate whose square lies at 0 could be left out.`,
    alt: `${subject.title}: which inputs matter. ${title}`,
    notDrawn: left > 0 ? [`${left} more that matter less are not drawn; the record holds them.`] : [],
    table: sharesTable(measures.units, measures.grouped ? "Coordinates" : "Coordinate", 1000),
    spec: framed({ title, says, alt: title, width: WIDTH, height, margins: MARGINS, layer }),
    marks: new Map(),
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

function capital(text: string): string {
  // a name of the formula keeps its letter
  return /^[a-z]\w*(\[| and | matters)/.test(text) ? text : `${text.charAt(0).toUpperCase()}${text.slice(1)}`;
}

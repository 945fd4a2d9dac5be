/**
 * Where the error comes from: the bias of each source at its largest n with two standard errors either way, beside
 * the smallest bias that the test could have found and the tolerance. The axis is linear within about the tolerance and
 * logarithmic beyond (sign(x) log(1 + |x|/c), c the tolerance) once a bias exceeds three tolerances.
 */
import {
  formatCount,
  formatPValue,
  formatValue,
  orDash,
  plainNumber,
  signed,
} from "../../findings/format.js";
import { PAGE } from "../look.js";
import { toleranceWords } from "../verdict-row.js";
import { biasWord } from "../../findings/headline.js";
import type { Row, Subject, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  counted,
  framed,
  listed,
  powersOfTen,
  sourceChannels,
} from "./chart.js";
import { markedLine, pixelY, rowLabels, rulings } from "./rows-frame.js";

const WIDTH = 560;
const STEP = 26;
const MARGINS: Margins = { left: 150, right: 160, top: 26, bottom: 50 };

interface Found {
  readonly row: Row;
  readonly n: number;
  readonly bias: number;
  readonly error: number | null;
  readonly detectable: number | null;
  readonly confirmed: boolean;
}

function found(rows: readonly Row[]): Found[] {
  return rows.flatMap((row) => {
    const cell = row.cells.find((c) => c.n === row.test?.n) ?? row.last;
    if (cell === null || cell.bias === null || !Number.isFinite(cell.bias)) return [];
    const error = cell.biasStandardError;
    const usable = error !== null && Number.isFinite(error) ? error : null;
    const detectable = row.test?.detectableBias ?? null;
    return [
      {
        row,
        n: cell.n,
        bias: cell.bias,
        error: usable,
        detectable: detectable !== null && Number.isFinite(detectable) ? detectable : null,
        confirmed: row.test?.confirmed ?? false,
      },
    ];
  });
}

function finding(all: readonly Found[]): string {
  const biased = all.filter((f) => f.confirmed);
  const clear = all.filter((f) => !f.confirmed && f.detectable !== null);
  const limits = clear.map((f) => f.detectable ?? 0);
  const rest =
    clear.length === 0
      ? ""
      : `no bias found in ${biased.length > 0 ? "the other " : ""}${counted(clear.length, "tested source")}, where one of ${formatValue(Math.min(...limits))}${
          clear.length > 1 ? ` to ${formatValue(Math.max(...limits))}` : ""
        } would have shown`;
  if (biased.length === 0)
    return rest === ""
      ? "No source could be tested for bias."
      : `${rest[0]?.toUpperCase() ?? ""}${rest.slice(1)}.`;
  const names = biased.map((f) => `${f.row.label} (${signed(f.bias, f.error)})`);
  const lead = `Confirmed bias in ${listed(names)}`;
  return rest === "" ? `${lead}.` : `${lead}; ${rest}.`;
}

function scaleFor(
  all: readonly Found[],
  tolerance: number | null,
): { scale: Spec; values: number[]; bent: boolean } {
  const reach = all.flatMap((f) => [Math.abs(f.bias) + 2 * (f.error ?? 0), f.detectable ?? 0]);
  const largest = Math.max(...reach, tolerance ?? 0, Number.MIN_VALUE) * 1.08;
  if (tolerance !== null && largest > 3 * tolerance) {
    const beyond = powersOfTen(tolerance * 1.5, largest);
    const values = [0, ...[tolerance, ...beyond].flatMap((v) => [v, -v])].sort((x, y) => x - y);
    return {
      scale: { type: "symlog", constant: tolerance, domain: [-largest, largest], nice: false },
      values,
      bent: true,
    };
  }
  return { scale: { domain: [-largest, largest], nice: false, zero: false }, values: [], bent: false };
}

/** The chart of one subject, or null where no bias is known. */
export function biasChart(_view: View, subject: Subject): Chart | null {
  const all = found(subject.rows);
  if (all.length === 0) return null;
  const height = all.length * STEP;
  const { scale, values, bent } = scaleFor(all, subject.tolerance);
  const marks = new Marks();
  const { colour, shape } = sourceChannels(all.map((f) => f.row.view));

  const data = all.map((f, i): Datum => {
    const spreadWords = f.error === null ? "no error bar" : `± ${formatValue(f.error)} standard error`;
    const limit =
      f.detectable === null ? "" : `; smallest bias the test would have found ${formatValue(f.detectable)}`;
    const verdict = f.confirmed ? "; confirmed on fresh keys" : "";
    const about = `${f.row.label} at n = ${formatCount(f.n)}: bias ${signed(f.bias, f.error)} (${spreadWords})${limit}${verdict}`;
    const word = f.row.test === null ? "not tested" : biasWord(f.row.test);
    return {
      source: f.row.view.index,
      series: marks.name(f.row.view, f.row.label),
      about: marks.values(f.row.view, about),
      label: f.row.label,
      y: (i + 0.5) * STEP,
      bias: f.bias,
      low: f.bias - 2 * (f.error ?? 0),
      high: f.bias + 2 * (f.error ?? 0),
      ...(f.detectable === null ? {} : { up: f.detectable, down: -f.detectable }),
      confirmed: f.confirmed,
      side: `${f.confirmed ? "◆ " : ""}${word}`,
    };
  });

  const x = {
    field: "bias",
    type: "quantitative",
    title: bent
      ? "bias, in units of the quantity (linear within about the tolerance, logarithmic beyond)"
      : "bias, in units of the quantity",
    scale,
    axis: { format: "~g", grid: true, ...(values.length > 0 ? { values } : { tickCount: 7 }) },
  };
  const y = pixelY(height);
  const byName = { field: "series", type: "nominal" };
  const description = { field: "about", type: "nominal" };
  const tested = data.filter((d) => d["up"] !== undefined);
  const ends = ["up", "down"].map((field): Spec => ({
    data: { values: tested },
    mark: { type: "tick", orient: "vertical", size: 15, thickness: 1.6, color: PAGE.soft.light },
    encoding: { x: { ...x, field }, y, description: byName },
  }));
  const layer: Spec[] = [
    rulings(
      all.map((_, i) => (i + 1) * STEP),
      height,
    ),
    ...(subject.tolerance === null
      ? []
      : [
          {
            data: { values: [{ from: -subject.tolerance, to: subject.tolerance }] },
            mark: { type: "rect", color: PAGE.wash.light, aria: false },
            encoding: { x: { ...x, field: "from" }, x2: { field: "to" } },
          },
          ...markedLine(x, subject.tolerance, `+${plainNumber(subject.tolerance, 4)}`, [1, 0]),
          ...markedLine(x, -subject.tolerance, plainNumber(-subject.tolerance, 4), [1, 0]),
        ]),
    {
      data: { values: [{ at: 0 }] },
      mark: { type: "rule", color: PAGE.soft.light, aria: false },
      encoding: { x: { ...x, field: "at" } },
    },
    ...ends,
    {
      data: { values: data.filter((d) => d["low"] !== d["high"]) },
      mark: { type: "rule", strokeWidth: 1.6 },
      encoding: { x: { ...x, field: "low" }, x2: { field: "high" }, y, color: colour, description: byName },
    },
    ...[true, false].map((filled) => ({
      data: { values: data.filter((d) => d["confirmed"] === filled) },
      mark: {
        type: "point",
        filled,
        size: filled ? 85 : 50,
        opacity: 1,
        ...(filled ? {} : { fill: PAGE.paper.light }),
      },
      encoding: { x, y, color: colour, shape: filled ? { value: "diamond" } : shape, description },
    })),
    rowLabels(data, height, MARGINS.left - 16, colour),
    {
      data: { values: data },
      mark: {
        type: "text",
        align: "left",
        baseline: "middle",
        color: PAGE.ink.light,
      },
      encoding: {
        x: { value: WIDTH + 12 },
        y,
        text: { field: "side", type: "nominal" },
        description: byName,
      },
    },
  ];
  const title = finding(all);
  const says =
    "Bias (mean estimate minus reference) of each source at its largest n, in units of the quantity.";
  return {
    name: `bias-${subject.slug}`,
    title,
    says,
    caption:
      "A point is the measured bias, its bar two standard errors either way, replicates and reference together. The grey ticks beside it stand at the smallest bias, of either sign, that the test would have found with 80 % power. " +
      "A filled diamond is a bias confirmed on fresh keys. The shaded band is the tolerance.",
    alt: `Bias of ${counted(all.length, "source")} on ${subject.title}, tolerance ${toleranceWords(subject)}. ${title}`,
    notDrawn:
      all.length < subject.rows.length
        ? [`${counted(subject.rows.length - all.length, "source")} without a known bias not drawn.`]
        : [],
    table: {
      columns: [
        { title: "Source", align: "left" },
        { title: "n", align: "right" },
        { title: "Bias", align: "right" },
        { title: "Standard error", align: "right" },
        { title: "Detectable bias", align: "right" },
        { title: "p, adjusted (Holm)", align: "right" },
        { title: "Finding", align: "left" },
      ],
      rows: all.map((f, i) => [
        f.row.label,
        formatCount(f.n),
        signed(f.bias, f.error),
        f.error === null ? "–" : formatValue(f.error),
        f.detectable === null ? "–" : formatValue(f.detectable),
        orDash(f.row.test?.pValueAdjusted, formatPValue),
        String(data[i]?.["side"] ?? ""),
      ]),
    },
    spec: framed({
      title,
      says,
      alt: `${subject.title}: ${title}`,
      width: WIDTH,
      height,
      margins: MARGINS,
      layer,
    }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

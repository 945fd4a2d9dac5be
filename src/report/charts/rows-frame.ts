/** Charts with one line of text per row at the left (sources or problems): places, labels and rulings. */
import { PAGE } from "../look.js";
import { type Datum, type Spec, fitted } from "./chart.js";

/** A quantitative y in pixels from the top, without an axis. */
export function pixelY(height: number, field = "y"): Spec {
  return {
    field,
    type: "quantitative",
    axis: null,
    scale: { domain: [0, height], range: [0, height], nice: false, zero: false },
  };
}

/** The labels at the left of the rows; `colour` where a row belongs to a source. */
export function rowLabels(
  labels: readonly Datum[],
  height: number,
  limit: number,
  colour: Spec | null,
): Spec {
  return {
    data: { values: labels.map((one) => ({ ...one, label: fitted(String(one["label"]), limit) })) },
    mark: {
      type: "text",
      align: "right",
      baseline: "middle",
      dx: -10,
      ...(colour === null ? { color: PAGE.ink.light } : {}),
    },
    encoding: {
      x: { value: 0 },
      y: pixelY(height),
      text: { field: "label", type: "nominal" },
      ...(colour === null ? {} : { color: colour }),
      description: { field: "series", type: "nominal" },
    },
  };
}

/** Hairlines between rows, at the given heights in pixels. */
export function rulings(at: readonly number[], height: number): Spec {
  return {
    data: { values: at.map((y) => ({ y })) },
    mark: { type: "rule", color: PAGE.grid.light, strokeWidth: 1, aria: false },
    encoding: { y: pixelY(height) },
  };
}

/** A vertical line with a word at its upper end. */
export function markedLine(x: Spec, value: number, label: string, dash: readonly number[]): Spec[] {
  const data = { values: [{ at: value, label }] };
  const at = { ...x, field: "at" };
  return [
    {
      data,
      mark: { type: "rule", color: PAGE.soft.light, strokeWidth: 1, strokeDash: dash, aria: false },
      encoding: { x: at },
    },
    {
      data,
      mark: { type: "text", baseline: "bottom", fontSize: 11, color: PAGE.soft.light, aria: false },
      encoding: { x: at, y: { value: -4 }, text: { field: "label", type: "nominal" } },
    },
  ];
}

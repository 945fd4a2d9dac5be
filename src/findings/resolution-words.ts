/** What output bits cost an integrand, in words and as a table of texts. */
import type { ResolutionCost, ResolutionLadder } from "../record/resolution.js";
import { formatPercent, formatValue } from "./format.js";

const COLUMNS = [
  { title: "bits", align: "right" },
  { title: "bias", align: "right" },
  { title: "interval", align: "left" },
  { title: "in the outermost cells", align: "right" },
  { title: "out of reach", align: "right" },
] as const;

/** What the table shows. */
export function resolutionTitle({ costs }: ResolutionLadder): string {
  const [first] = costs;
  const which = first?.endpoint === "left" ? "the left ends" : "the middles";
  const level = formatPercent(first?.confidence ?? 0);
  return `what bits cost: the bias of ${which} of cells of width 2^\u2212bits, ${level} intervals (◂ its own)`;
}

/** One row for each number of bits, the source's own marked. */
export function resolutionTable({ own, costs }: ResolutionLadder): {
  readonly columns: readonly { readonly title: string; readonly align: "left" | "right" }[];
  readonly rows: readonly string[][];
} {
  return { columns: COLUMNS, rows: costs.map((cost) => row(cost, own)) };
}

function row(cost: ResolutionCost, own: number): string[] {
  const { bits, bias, standardError, interval, unreachableTail: tail, nonFinite } = cost;
  const mark = bits === own ? " ◂" : "  ";
  const [low, high] = interval;
  const range = nonFinite > 0 ? `not finite at ${nonFinite} evaluations` : `${brief(low)} to ${brief(high)}`;
  return [
    `${bits}${mark}`,
    brief(bias, standardError),
    range,
    brief(tail.bias, tail.standardError),
    brief(tail.probability),
  ];
}

/** Many orders of magnitude stand in one column: two digits, with an exponent below 1e-4. */
function brief(value: number, uncertainty: number | null = null): string {
  return formatValue(value, Math.abs(value) < 1e-4 ? null : uncertainty);
}

/** What output bits cost an integrand, as a terminal shows it. */
import { formatPercent, formatValue } from "../findings/format.js";
import type { ResolutionCost, ResolutionLadder } from "../record/resolution.js";
import { textTable, type TextColumn } from "./text-table.js";

const COLUMNS: readonly TextColumn[] = [
  { title: "bits", align: "right" },
  { title: "bias", align: "right" },
  { title: "interval", align: "left" },
  { title: "in the outermost cells", align: "right" },
  { title: "out of reach", align: "right" },
];

/** One line for each number of bits, the source's own marked. */
export function resolutionLines({ own, costs }: ResolutionLadder): string[] {
  const [first] = costs;
  if (first === undefined) return [];
  const which = first.endpoint === "middle" ? "the middles" : "the left ends";
  const level = formatPercent(first.confidence);
  return [
    `what bits cost: the bias of ${which} of cells of width 2^\u2212bits, ${level} intervals (◂ its own)`,
    ...textTable(
      COLUMNS,
      costs.map((cost) => row(cost, own)),
    ),
  ];
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

/** Which inputs matter, as a terminal shows it. */
import type { Problem } from "../problem/contract.js";
import type { Sensitivity } from "../record/sensitivity.js";
import { formatCount, formatPercent, formatValue } from "../findings/format.js";
import {
  pairsTable,
  sensitivityHeadline,
  shareInterval,
  shareText,
  sensitivityLines,
  sharesTable,
  type SensitivityTable,
} from "../findings/sensitivity-words.js";
import { plainText, textTable, type TextColumn } from "./text-table.js";

/** Rows of a table; the JSON holds all. */
const MOST = 16;

/** Pairs that do something only together beside how a net covers them; empty where nothing was asked. */
export function netPairsText({ measures, nets }: Sensitivity, asked: readonly string[]): string {
  if (measures === null) return "";
  const blocks = nets
    .filter(({ source }) => asked.includes(source))
    .map(({ source, base, digits, t }) => {
      const rows = measures.pairs.flatMap(({ i, j, interaction }, k) => {
        if (!(interaction.interval[0] > 0)) return [];
        const names = `${measures.units[i]?.label ?? ""}, ${measures.units[j]?.label ?? ""}`;
        return [[names, shareText(interaction.value), shareInterval(interaction), String(t[k] ?? "")]];
      });
      const points = `${formatCount(base)}^${digits} points`;
      if (rows.length === 0)
        return `${source}: no pair that was looked at does more together than chance, so no uneven pair matters here\n`;
      const lines = textTable(PAIR_COLUMNS, rows.slice(0, MOST)).map((line) => `    ${line}`);
      return `${source}: pairs that do something only together, and t of each at ${points} (0 even, ${digits} says nothing)\n${lines.join("\n")}\n`;
    });
  return blocks.map((block) => `\n${block}`).join("");
}

const PAIR_COLUMNS: readonly TextColumn[] = [
  { title: "Pair", align: "left" },
  { title: "Only together", align: "right" },
  { title: "Interval", align: "right" },
  { title: "t", align: "right" },
];

export function sensitivityText(problem: Problem, sensitivity: Sensitivity): string {
  const { measures, confidence } = sensitivity;
  const lines = [
    `${plainText(problem.title)}: which inputs matter`,
    `  ${sensitivityHeadline(sensitivity)}`,
    ...sensitivityLines(sensitivity, problem).map((line) => `  ${line}`),
  ];
  const add = ({ columns, rows }: SensitivityTable): void => {
    if (rows.length > 0) lines.push("", ...textTable(columns, rows).map((line) => `    ${line}`));
  };
  if (measures !== null) {
    add(sharesTable(measures.units, measures.grouped ? "Coordinates" : "Coordinate", MOST));
    if (measures.units.length > MOST)
      lines.push(
        `    and ${formatCount(measures.units.length - MOST)} more that matter less (--json has all)`,
      );
    add(sharesTable(measures.inputs, "Input", MOST));
    add(pairsTable(sensitivity, MOST));
    lines.push(
      "",
      `  Shares of the variance ${formatValue(measures.variance)}, with ${formatPercent(confidence)} intervals; ${formatCount(measures.replicates)} replicates of ${formatCount(measures.points)} points by ${measures.source}, ${formatCount(measures.evaluations)} values in all.`,
    );
  }
  return `${lines.join("\n")}\n`;
}

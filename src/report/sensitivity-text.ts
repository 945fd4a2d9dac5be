/** Which inputs matter, as a terminal shows it. */
import type { Problem } from "../problem/contract.js";
import type { Sensitivity } from "../record/sensitivity.js";
import { formatCount, formatPercent, formatValue } from "../findings/format.js";
import {
  pairsTable,
  sensitivityHeadline,
  sensitivityLines,
  sharesTable,
  type SensitivityTable,
} from "../findings/sensitivity-words.js";
import { plainText, textTable } from "./text-table.js";

/** Rows of a table; the JSON holds all. */
const MOST = 16;

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

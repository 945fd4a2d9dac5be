/** Explanations as a terminal shows them. */
import {
  explanationHeadline,
  explanationLines,
  hazardText,
  planesText,
  structureText,
  vectorText,
} from "../findings/explanation-words.js";
import { formatCount, formatValue } from "../findings/format.js";
import { resolutionTable, resolutionTitle } from "../findings/resolution-words.js";
import type { Alias, Explanation } from "../record/explanation.js";
import { plainText, textTable, type TextColumn } from "./text-table.js";

const COLUMNS: readonly TextColumn[] = [
  { title: "dual vector", align: "left" },
  { title: "places", align: "right" },
  { title: "planes", align: "left" },
  { title: "adds", align: "right" },
  { title: "standard error", align: "right" },
];

/** One block of lines per explanation. */
export function explanationText(title: string, explanations: readonly Explanation[]): string {
  const blocks = explanations.map((explanation) => {
    const lines = [`${explanation.source} on ${plainText(title)}`, `  ${explanationHeadline(explanation)}`];
    lines.push(...explanationLines(explanation).map((line) => `  ${line}`));
    const { structure, aliases, predicted } = explanation;
    if (structure !== null) lines.push(`  ${structureText(structure)}`);
    const hazard = predicted === null ? hazardText(explanation) : null;
    if (hazard !== null) lines.push(`  its structure: ${hazard}`);
    if (predicted !== null) lines.push(...textTable(COLUMNS, aliases.map(row)).map((line) => `    ${line}`));
    const { resolution } = explanation;
    if (resolution !== null) {
      const { columns, rows } = resolutionTable(resolution);
      lines.push(
        `  ${resolutionTitle(resolution)}`,
        ...textTable(columns, rows).map((line) => `    ${line}`),
      );
    }
    return lines.join("\n");
  });
  return `${blocks.join("\n\n")}\n`;
}

function row(alias: Alias): string[] {
  const { contribution, standardError, copies } = alias;
  return [
    vectorText(alias),
    formatCount(copies),
    planesText(alias),
    contribution === null ? "" : formatValue(contribution, standardError),
    standardError === null ? "" : formatValue(standardError),
  ];
}

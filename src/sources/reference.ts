/** The reference page of sources (docs/sources.md): its tables, made from the registry. */
import type { Family, SourceDescription } from "./contract.js";
import { periodText } from "./period-text.js";
import { acceptedRandomisations } from "./randomisations.js";
import { listSources } from "./registry.js";

/** Headings of the families that the registry has, in the order of the page. */
const HEADINGS: Readonly<Record<Exclude<Family, "own">, string>> = {
  "pseudo-random": "Pseudo-random sources",
  "quasi-random": "Quasi-random sources",
  stratified: "Stratified sources",
};

/** One table for each family, and the publications, as Markdown. */
export function sourceTables(): string {
  const sources = listSources();
  const sections = Object.entries(HEADINGS).map(([family, heading]) => {
    const members = sources.filter((source) => source.family === family);
    return `## ${heading}\n\n${table(members, family === "pseudo-random")}\n`;
  });
  return `${sections.join("\n")}\n## Publications\n\n${publications(sources)}\n`;
}

function table(members: readonly SourceDescription[], pseudoRandom: boolean): string {
  const columns = pseudoRandom
    ? ["id", "title", "method", "period", "bits", "known structure"]
    : ["id", "title", "method", "dimensions", "sizes", "randomisations"];
  const rows = members.map((source) => {
    const { id, title, method, period, outputBits, largestDimension, nesting, knownStructure } = source;
    const last = pseudoRandom
      ? [
          period === null ? "–" : periodText(period),
          source.repeatable === false ? `${outputBits}, not repeatable` : String(outputBits),
          knownStructure ?? "",
        ]
      : [
          largestDimension.toLocaleString("en"),
          nesting === "sequence" ? "any" : "built for one",
          acceptedRandomisations(source)
            .slice(1)
            .map((names) => `\`${names.join("+")}\``)
            .join(", ") || "always random",
        ];
    return [`\`${id}\``, title, method, ...last];
  });
  return [columns, columns.map(() => "---"), ...rows]
    .map((row) => `| ${row.map(cell).join(" | ")} |`)
    .join("\n");
}

function publications(sources: readonly SourceDescription[]): string {
  const byCitation = new Map<string, string[]>();
  for (const { id, citation } of sources) {
    byCitation.set(citation, [...(byCitation.get(citation) ?? []), `\`${id}\``]);
  }
  return [...byCitation].map(([citation, ids]) => `- ${ids.join(", ")}: ${escape(citation)}`).join("\n");
}

/** A text that Markdown shows as it is, in a cell of a table. */
function cell(text: string): string {
  return text.startsWith("`") ? text : escape(text).replaceAll("|", "\\|");
}

function escape(text: string): string {
  return text.replaceAll(/[*_<]/g, String.raw`\$&`);
}

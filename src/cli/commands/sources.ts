/** `tolerand sources`: the shelf, by family. */
import { jsonText } from "../../record/json.js";
import type { SourceDescription } from "../../sources/contract.js";
import { listSources } from "../../sources/registry.js";
import { periodText } from "../../sources/period-text.js";
import { textTable } from "../../report/text-table.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { booleanFlag } from "../read.js";

/** The description alone: a source also carries its methods. */
function described(source: SourceDescription) {
  const {
    id,
    title,
    citation,
    family,
    method,
    outputBits,
    period,
    largestDimension,
    nesting,
    randomisations,
    knownStructure,
  } = source;
  return {
    id,
    title,
    citation,
    family,
    method,
    outputBits,
    period,
    largestDimension,
    nesting,
    randomisations,
    knownStructure,
  };
}

export function run(args: Arguments, io: Io): Promise<number> {
  const sources = listSources().map(described);
  if (booleanFlag(args, "json")) {
    io.stdout.write(`${jsonText(sources, 2)}\n`);
    return Promise.resolve(EXIT.done);
  }
  for (const family of new Set(sources.map((source) => source.family))) {
    const members = sources.filter((source) => source.family === family);
    const rows = members.map((source) => [
      source.id,
      source.method,
      source.period === null ? "–" : periodText(source.period),
      String(source.outputBits),
      source.largestDimension.toLocaleString("en"),
      source.randomisations.join(", ") || (source.knownStructure ?? ""),
    ]);
    const last = family === "quasi-random" ? "randomisations" : "known structure";
    const lines = textTable(
      [
        { title: family, align: "left" },
        { title: "method", align: "left" },
        { title: "period", align: "right" },
        { title: "bits", align: "right" },
        { title: "coordinates", align: "right" },
        { title: last, align: "left" },
      ],
      rows,
    );
    io.stdout.write(`${lines.join("\n")}\n\n`);
  }
  io.stderr.write(
    "Next: tolerand points sobol+owen --dimension 2 prints points; --json gives citations too.\n",
  );
  return Promise.resolve(EXIT.done);
}

/** Observations of an empirical input: one column of a CSV file in the folder of the problem file. */
import { dirname, join } from "node:path";
import { parseCsv } from "./csv.js";
import { readText } from "./document.js";
import { leaves } from "./draws-folder.js";
import { ProblemError, show } from "./errors.js";
import type { Findings } from "./findings.js";

/** The numbers of a column, or null after a finding. */
export async function readObservations(
  file: string,
  column: string | undefined,
  path: readonly string[],
  findings: Findings,
): Promise<number[] | null> {
  const folder = dirname(findings.document.file);
  if (leaves(folder, file)) {
    findings.add(
      [...path, "file"],
      `expected a path in the folder of the problem file, found ${show(file)}, which leaves it; move it there`,
    );
    return null;
  }
  try {
    const place = join(folder, file);
    const table = parseCsv(await readText(place), place);
    const name = column ?? (table.columns.length === 1 ? table.columns[0] : undefined);
    if (name === undefined || !table.columns.includes(name)) {
      const found = column === undefined ? "nothing" : show(column);
      findings.add(
        [...path, column === undefined ? "file" : "column"],
        `expected a column of ${file} (${table.columns.join(", ")}), found ${found}`,
      );
      return null;
    }
    const values: number[] = [];
    for (const { line, fields } of table.rows) {
      const text = fields[name] ?? "";
      const value = text === "" ? Number.NaN : Number(text);
      if (!Number.isFinite(value)) {
        findings.add(
          [...path, "file"],
          `expected numbers in column "${name}", found ${show(text)} on line ${line} of ${file}`,
        );
        return null;
      }
      values.push(value);
    }
    return values;
  } catch (error) {
    if (!(error instanceof ProblemError)) throw error;
    findings.add([...path, "file"], error.message);
    return null;
  }
}

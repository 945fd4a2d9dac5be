/** A table of comma-separated values with a header line (RFC 4180), as text fields by column name and line. */
import { CsvError, parse } from "csv-parse/sync";
import { fileError, ProblemError } from "./errors.js";

export interface CsvRow {
  /** Line of the file, 1-based, on which the row ends. */
  readonly line: number;
  readonly fields: Readonly<Record<string, string>>;
}

export interface CsvTable {
  readonly columns: readonly string[];
  readonly rows: readonly CsvRow[];
}

interface Parsed {
  readonly record: Record<string, string>;
  readonly info: { readonly lines: number };
}

/**
 * The table in `text`; spaces around fields and empty lines do not count. Throws ProblemError, with the line, for a row of
 * another length, an open quote, a column that is named twice or not at all, and a file without rows.
 */
export function parseCsv(text: string, file: string): CsvTable {
  let columns: readonly string[] = [];
  const header = (names: readonly string[]): string[] => {
    columns = names.map((name) => name.trim());
    const twice = columns.find((name, k) => name === "" || columns.indexOf(name) !== k);
    if (twice !== undefined) {
      const what = twice === "" ? "a column without a name" : `the column "${twice}" twice`;
      throw fileError(file, `expected a header line that names each column once, found ${what}`);
    }
    return [...columns];
  };
  let parsed: readonly Parsed[];
  try {
    parsed = parse(text, { bom: true, columns: header, info: true, skip_empty_lines: true, trim: true });
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const line = typeof error["lines"] === "number" ? error["lines"] : null;
    const message =
      error.code === "CSV_RECORD_INCONSISTENT_COLUMNS"
        ? `expected ${columns.length} fields as in the header line, found another number; write a field with a comma in quotation marks`
        : `not comma-separated values (${error.message.replace(/\.$/, "")})`;
    throw new ProblemError([{ file, line, column: line === null ? null : 1, message }]);
  }
  if (parsed.length === 0) throw fileError(file, "expected a header line and rows below it, found no row");
  return { columns, rows: parsed.map(({ record, info }) => ({ line: info.lines, fields: record })) };
}

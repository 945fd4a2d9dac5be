/** Tables of text for terminals and for the summary: columns by width, numbers to the right. */
import type { StudyRecord } from "../record/types.js";
import { referenceWords, toleranceWords, verdictRows } from "./verdict-row.js";
import { type Subject, viewRecord } from "./view.js";

export interface TextColumn {
  readonly title: string;
  readonly align: "left" | "right";
}

/** Control characters of a terminal have no place in a user's text. */
export function plainText(text: string): string {
  // eslint-disable-next-line no-control-regex -- control characters are exactly what is meant
  return text.replace(/[\u0000-\u001f\u007f-\u009f]+/g, " ");
}

function width(text: string): number {
  return [...text].length;
}

function padded(text: string, size: number, align: "left" | "right"): string {
  const gap = " ".repeat(Math.max(0, size - width(text)));
  return align === "left" ? text + gap : gap + text;
}

/** Lines of a table: a line of titles, then one line per row; no trailing spaces. */
export function textTable(columns: readonly TextColumn[], rows: readonly (readonly string[])[]): string[] {
  const clean = [columns.map((column) => column.title), ...rows].map((row) => row.map(plainText));
  const sizes = columns.map((_, j) => Math.max(...clean.map((row) => width(row[j] ?? ""))));
  return clean.map((row) =>
    columns
      .map((column, j) => padded(row[j] ?? "", sizes[j] ?? 0, column.align))
      .join("  ")
      .trimEnd(),
  );
}

/** ANSI colours (ECMA-48 SGR) of the verdicts; the shape and the word carry the meaning without them. */
const PAINTS: Record<string, string> = { "●": "32", "◆": "31;1", "◐": "33" };

function paint(line: string, shape: string, colour: boolean): string {
  const code = PAINTS[shape];
  return colour && code !== undefined ? `\u001b[${code}m${line}\u001b[0m` : line;
}

const COLUMNS: readonly TextColumn[] = [
  { title: " ", align: "left" },
  { title: "source", align: "left" },
  { title: "at n", align: "right" },
  { title: "verdict", align: "left" },
  { title: "total", align: "right" },
  { title: "largest line", align: "left" },
  { title: "n to tolerance", align: "right" },
  { title: "cost", align: "right" },
];

function subjectLines(subject: Subject, colour: boolean): string[] {
  const head = [
    plainText(subject.title),
    `d ${subject.problem.dimension}`,
    `reference ${referenceWords(subject)}`,
    `tolerance ${toleranceWords(subject)}`,
  ].join("   ");
  const rows = verdictRows(subject);
  const table = textTable(
    COLUMNS,
    rows.map((r) => [r.shape, r.row.label, r.n, r.word, r.total, r.largestLine, r.reach, r.cost]),
  );
  const lines = table.map((line, i) => `  ${i === 0 ? line : paint(line, rows[i - 1]?.shape ?? "", colour)}`);
  const used = subject.inUseSentence;
  return [head, ...lines, ...(used === null ? [] : [`  ${plainText(used)}`])];
}

/**
 * The verdict tables of a record for a terminal, one per problem, cheapest source first. `colour` is the caller's
 * decision (a terminal, and NO_COLOR not set).
 */
export function verdictTables(record: StudyRecord, options: { readonly colour: boolean }): string {
  const blocks = viewRecord(record).subjects.map((subject) =>
    subjectLines(subject, options.colour).join("\n"),
  );
  return `${blocks.join("\n\n")}\n`;
}

/** What is wrong with a problem file: every finding with its place, shown together and without a stack trace. */

/** One finding. Line and column are 1-based; null where the finding is about the file as a whole. */
export interface ProblemIssue {
  readonly file: string;
  readonly line: number | null;
  readonly column: number | null;
  /** What was found, what is allowed, what to do next. */
  readonly message: string;
}

/** Findings that are shown at once; the rest is counted. */
const SHOWN = 20;

function line(issue: ProblemIssue): string {
  const place = issue.line === null ? issue.file : `${issue.file}:${issue.line}:${issue.column ?? 1}`;
  return `${place}: ${issue.message}`;
}

/** Problem files that are refused. The message has one line per finding: `file:line:column: message`. */
export class ProblemError extends Error {
  readonly issues: readonly ProblemIssue[];

  constructor(issues: readonly ProblemIssue[]) {
    const lines = issues.slice(0, SHOWN).map(line);
    if (issues.length > SHOWN) lines.push(`... and ${issues.length - SHOWN} more; mend these first`);
    super(lines.join("\n"));
    this.name = "ProblemError";
    this.issues = issues;
  }
}

/** A refusal of a file or folder as a whole. */
export function fileError(file: string, message: string): ProblemError {
  return new ProblemError([{ file, line: null, column: null, message }]);
}

/** A value as a message quotes it: short, on one line, "nothing" where there is none. */
export function show(value: unknown): string {
  if (value === undefined || value === null) return "nothing";
  if (typeof value === "number" || typeof value === "boolean") return String(value);
  if (typeof value === "object" && !Array.isArray(value)) {
    const keys = Object.keys(value);
    return keys.length === 0 ? "an empty mapping" : `a mapping with ${keys.slice(0, 4).join(", ")}`;
  }
  const text = JSON.stringify(value);
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}

/** Collects what is wrong with one file, in words and with places. */
import { z } from "zod";
import type { FormulaError } from "../formula/contract.js";
import { nearest } from "../numeric/nearest.js";
import type { Path, YamlDocument } from "./document.js";
import { show } from "./errors.js";
import type { ProblemIssue } from "./errors.js";

/** `study.sources item 2`: how a message names a part of the file. */
function nameOf(path: Path): string {
  let text = "";
  for (const part of path) {
    text += typeof part === "number" ? ` item ${part + 1}` : text === "" ? part : `.${part}`;
  }
  return text;
}

function at(value: unknown, path: Path): unknown {
  let here: unknown = value;
  for (const part of path) {
    if (here === null || typeof here !== "object") return undefined;
    here = (here as Record<string | number, unknown>)[part];
  }
  return here;
}

/** The keys that a schema allows at a path. */
function keysAt(root: z.ZodType, path: Path): readonly string[] {
  let here: unknown = z.toJSONSchema(root, { io: "input" });
  for (const part of path) {
    here =
      typeof part === "number"
        ? at(here, ["items"])
        : (at(here, ["properties", part]) ?? at(here, ["additionalProperties"]));
  }
  return Object.keys(at(here, ["properties"]) ?? {});
}

/** The findings about one file. */
export class Findings {
  readonly issues: ProblemIssue[] = [];
  readonly document: YamlDocument;

  constructor(document: YamlDocument) {
    this.document = document;
  }

  add(path: Path, message: string): void {
    this.#push(this.document.place(path), `${nameOf(path)}: ${message}`);
  }

  /** A finding about the key itself. */
  addKey(path: Path, message: string): void {
    this.#push(this.document.keyPlace(path), message);
  }

  /** A formula that the language refuses, at its place inside the file. */
  addFormula(path: Path, error: FormulaError): void {
    this.#push(this.document.inside(path, error.position), `${nameOf(path)}: ${error.message}`);
  }

  /** All findings from the top of the file down. */
  inOrder(): ProblemIssue[] {
    return this.issues.toSorted((a, b) => (a.line ?? 0) - (b.line ?? 0) || (a.column ?? 0) - (b.column ?? 0));
  }

  #push({ line, column }: { line: number; column: number }, message: string): void {
    this.issues.push({ file: this.document.file, line, column, message });
  }

  /** What the schema found at `base`, in words. `root` is the schema of the whole file. */
  addSchema(error: z.ZodError, base: Path, root: z.ZodType): void {
    for (const issue of error.issues) {
      const path: Path = [
        ...base,
        ...issue.path.map((part) => (typeof part === "number" ? part : String(part))),
      ];
      if (issue.code === "unrecognized_keys") {
        for (const key of issue.keys) this.unknownKey([...path, key], keysAt(root, path));
      } else if (issue.code === "invalid_key") {
        const expected = issue.issues[0]?.message ?? issue.message;
        this.addKey(path, `${nameOf(path.slice(0, -1))}: expected ${expected}, found ${show(path.at(-1))}`);
      } else {
        const found = at(this.document.value, path);
        const missing = found === undefined && path.length > 0;
        if (missing) this.addKey(path, `${nameOf(path)} is missing; expected ${issue.message}`);
        else this.add(path, `expected ${issue.message}, found ${show(found)}`);
      }
    }
  }

  unknownKey(path: Path, known: readonly string[]): void {
    const key = String(path.at(-1));
    const guess = nearest(key, known);
    const where = path.length > 1 ? ` in ${nameOf(path.slice(0, -1))}` : "";
    const hint = guess === null ? "" : ` did you mean "${guess}"?`;
    this.addKey(path, `unknown key "${key}"${where};${hint} known keys here: ${known.join(", ")}`);
  }
}

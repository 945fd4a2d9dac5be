/**
 * YAML 1.2 (core schema) read into plain data that remembers where everything stood. A problem file needs mappings,
 * lists, texts and numbers; anchors, aliases, tags and directives have no use in it and are refused, which closes the
 * door to texts that grow when they are read. A token scan in linear time bounds size, nesting and token count before
 * the recursive parser sees the text.
 */
import { open } from "node:fs/promises";
import { CST, Lexer, LineCounter, isAlias, isMap, isScalar, isSeq, parseDocument } from "yaml";
import type { ParsedNode, Scalar } from "yaml";
import { ProblemError, fileError } from "./errors.js";
import type { ProblemIssue } from "./errors.js";

/** Bytes of a problem file at most: a formula of that size is refused by the compiler anyway. */
export const LARGEST_FILE = 1024 * 1024;
/** Tokens at most, about 50,000 numbers in a list. Reading that many takes about 0.1 s. */
const MOST_TOKENS = 200_000;
const DEEPEST = 32;

export type Path = readonly (string | number)[];

export interface Place {
  readonly line: number;
  readonly column: number;
}

interface Entry {
  readonly key: Place | null;
  readonly value: Place;
  /** A scalar as it is written in the file, without its quotes; null for mappings and lists. */
  readonly source: string | null;
  /** True for text that stands in the file line by line (`|`), so that its own lines can be found again. */
  readonly literal: boolean;
}

const pathKey = (path: Path): string => path.map(String).join("\u0000");

/** A file's data and the places of its parts. */
export class YamlDocument {
  readonly file: string;
  readonly value: unknown;
  readonly #entries: ReadonlyMap<string, Entry>;
  readonly #lines: readonly string[];

  constructor(file: string, text: string, value: unknown, entries: ReadonlyMap<string, Entry>) {
    this.file = file;
    this.value = value;
    this.#entries = entries;
    this.#lines = text.split("\n");
  }

  /** Where the value at `path` begins; for a missing one, where the nearest part around it does. */
  place(path: Path): Place {
    const found = this.#nearest(path);
    return found.value;
  }

  /** Where the key of `path` stands. */
  keyPlace(path: Path): Place {
    const found = this.#nearest(path);
    return found.key ?? found.value;
  }

  /** Whether the file gives something at `path`. */
  has(path: Path): boolean {
    return this.#entries.has(pathKey(path));
  }

  /** The scalar at `path` as it is written, or null. */
  source(path: Path): string | null {
    return this.#entries.get(pathKey(path))?.source ?? null;
  }

  /** The place in the file of a place inside the text at `path`. Folded texts are only known by their beginning. */
  inside(path: Path, at: Place): Place {
    const entry = this.#entries.get(pathKey(path));
    if (entry === undefined) return this.place(path);
    if (entry.literal) {
      const first = this.#lines.findIndex((text, i) => i >= entry.value.line && text.trim() !== "");
      const indent = /^ */.exec(this.#lines[first] ?? "")?.[0].length ?? 0;
      return { line: entry.value.line + at.line, column: indent + at.column };
    }
    const start = this.#lines[entry.value.line - 1]?.charAt(entry.value.column - 1) ?? "";
    if (at.line > 1 || start === ">") return entry.value;
    const quote = start === '"' || start === "'" ? 1 : 0;
    return { line: entry.value.line, column: entry.value.column + quote + at.column - 1 };
  }

  #nearest(path: Path): Entry {
    for (let length = path.length; length >= 0; length--) {
      const entry = this.#entries.get(pathKey(path.slice(0, length)));
      if (entry !== undefined) return entry;
    }
    return { key: null, value: { line: 1, column: 1 }, source: null, literal: false };
  }
}

/** The text of a file of at most `LARGEST_FILE` bytes. Throws ProblemError for anything else. */
export async function readText(file: string): Promise<string> {
  let handle;
  try {
    handle = await open(file, "r");
  } catch (error) {
    const code = error instanceof Error && "code" in error ? String(error.code) : "unknown error";
    throw fileError(file, `cannot be opened (${code}); check the name and the permissions`);
  }
  try {
    const stat = await handle.stat();
    if (!stat.isFile()) throw fileError(file, "expected a file, found something else (a folder or a device)");
    if (stat.size > LARGEST_FILE) throw tooLarge(file, stat.size);
    const buffer = Buffer.alloc(LARGEST_FILE + 1);
    const { bytesRead } = await handle.read(buffer, 0, buffer.length, 0);
    if (bytesRead > LARGEST_FILE) throw tooLarge(file, bytesRead);
    try {
      return new TextDecoder("utf-8", { fatal: true }).decode(buffer.subarray(0, bytesRead));
    } catch {
      throw fileError(file, "expected text in UTF-8, found other bytes; save the file as UTF-8");
    }
  } finally {
    await handle.close();
  }
}

function tooLarge(file: string, bytes: number): ProblemError {
  return fileError(file, `expected at most ${LARGEST_FILE} bytes, found ${bytes}; is it a problem file?`);
}

/** The first reason to refuse a text before parsing it, with its offset; null if there is none. */
function scan(text: string): { offset: number; message: string } | null {
  let tokens = 0;
  let depth = 0;
  let onLine = 0;
  let offset = 0;
  let scalarFollows = false;
  for (const token of new Lexer().lex(text)) {
    if (++tokens > MOST_TOKENS) {
      return { offset, message: `expected at most ${MOST_TOKENS} YAML tokens; shorten the file` };
    }
    const type = scalarFollows ? "text" : CST.tokenType(token);
    scalarFollows = false;
    if (type === "flow-seq-start" || type === "flow-map-start") depth++;
    else if (type === "flow-seq-end" || type === "flow-map-end") depth--;
    else if (type === "newline") onLine = 0;
    else if (type === "seq-item-ind" || type === "explicit-key-ind" || type === "map-value-ind") {
      if (depth === 0) onLine++;
    } else if (type === "alias" || type === "anchor") {
      return { offset, message: `${type} "${token.slice(0, 40)}" is not allowed; write the value out` };
    } else if (type === "tag") {
      return { offset, message: `tag "${token.slice(0, 40)}" is not allowed; write plain text and numbers` };
    } else if (type === "directive-line") {
      return { offset, message: `directive "${token.slice(0, 40)}" is not allowed; remove the line` };
    }
    if (depth > DEEPEST || onLine > DEEPEST) {
      return {
        offset,
        message: `nested more than ${DEEPEST} deep; a problem file needs at most five levels`,
      };
    }
    if (type === "scalar") scalarFollows = true;
    // The marks before a scalar and a document, and after a broken flow, are not part of the text.
    if (type !== "scalar" && type !== "doc-mode" && type !== "flow-error-end") offset += token.length;
  }
  return null;
}

const SAFE_INTEGER = /^[-+]?[0-9]+$/;

function scalarValue(node: Scalar): unknown {
  const { value, source } = node;
  // Digits beyond 2^53 stay digits: whoever needs the number decides how to read it.
  if (typeof value === "number" && !Number.isSafeInteger(value) && SAFE_INTEGER.test(source ?? ""))
    return source;
  return value;
}

/** A key as text: `2` and `true` name themselves; an empty key is none. */
function keyText({ value }: Scalar): string | null {
  if (typeof value === "string") return value;
  return typeof value === "number" || typeof value === "boolean" ? String(value) : null;
}

/** Reads YAML text. Throws ProblemError with all findings, each with line and column. */
export function parseYaml(file: string, text: string): YamlDocument {
  const issues: ProblemIssue[] = [];
  const lines = new LineCounter();
  lines.addNewLine(0);
  for (let at = text.indexOf("\n"); at >= 0; at = text.indexOf("\n", at + 1)) lines.addNewLine(at + 1);
  const place = (offset: number): Place => {
    const { line, col } = lines.linePos(offset);
    return { line: Math.max(line, 1), column: Math.max(col, 1) };
  };
  const refuse = (offset: number, message: string): void => {
    issues.push({ file, ...place(offset), message });
  };

  const early = scan(text);
  if (early !== null) {
    refuse(early.offset, early.message);
    throw new ProblemError(issues);
  }
  const parsed = parseDocument(text, {
    version: "1.2",
    schema: "core",
    prettyErrors: false,
    uniqueKeys: false,
  });
  for (const error of [...parsed.errors, ...parsed.warnings]) {
    refuse(error.pos[0], `not valid YAML: ${error.message}; mend the text here`);
  }
  if (issues.length > 0) throw new ProblemError(issues);

  const entries = new Map<string, Entry>();
  const convert = (
    node: ParsedNode | null,
    path: Path,
    key: Place | null,
    start: number,
    deep: number,
  ): unknown => {
    const value = place(node?.range[0] ?? start);
    const scalar = isScalar(node) ? node : null;
    const source = scalar === null ? null : (scalar.source ?? "");
    entries.set(pathKey(path), { key, value, source, literal: scalar?.type === "BLOCK_LITERAL" });
    if (deep > DEEPEST) {
      refuse(
        node?.range[0] ?? start,
        `nested more than ${DEEPEST} deep; a problem file needs at most five levels`,
      );
      return null;
    }
    if (isSeq<ParsedNode>(node)) {
      return node.items.map((item, i) => convert(item, [...path, i], null, start, deep + 1));
    }
    if (isMap<ParsedNode, ParsedNode | null>(node)) {
      const result: Record<string, unknown> = {};
      for (const pair of node.items) {
        const at = pair.key.range[0];
        const name = isScalar(pair.key) ? keyText(pair.key) : null;
        const first = name === null ? undefined : entries.get(pathKey([...path, name]));
        if (name === null || name === "__proto__") {
          refuse(at, "expected a name as the key, found something else; write `name: value`");
        } else if (first?.key !== undefined && Object.hasOwn(result, name)) {
          refuse(at, `key "${name}" is given twice, first on line ${first.key?.line ?? 1}; keep one of them`);
        } else {
          result[name] = convert(pair.value, [...path, name], place(at), at, deep + 1);
        }
      }
      return result;
    }
    if (isAlias(node) || scalar === null) return null;
    return scalarValue(scalar);
  };
  const value = convert(parsed.contents, [], null, 0, 0);
  if (issues.length > 0) throw new ProblemError(issues);
  return new YamlDocument(file, text, value, entries);
}

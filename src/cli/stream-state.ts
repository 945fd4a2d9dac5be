/**
 * The state of a stream of points in a file, exact to the bit: JSON with what the stream was opened with (source,
 * dimension, seed), so that it cannot be taken up as another one, and the state itself (64-bit words in hexadecimal).
 */
import { readFileSync, renameSync, writeFileSync } from "node:fs";
import { resolve } from "node:path";
import type { SourceSpec } from "../problem/contract.js";
import { canonicalJson, jsonText } from "../record/json.js";
import type { Io } from "./command.js";
import { InputError } from "./errors.js";

const SCHEMA = "tolerand/state/1";

export interface SavedStream {
  readonly source: SourceSpec;
  readonly dimension: number;
  readonly seed: number;
  /** What the stream itself saved. */
  readonly state: unknown;
}

/** Writes the file whole or not at all. */
export function saveStream(path: string, stream: SavedStream, io: Io): void {
  const target = resolve(io.cwd, path);
  const draft = `${target}.${process.pid}.new`;
  try {
    writeFileSync(draft, `${jsonText({ schema: SCHEMA, ...stream }, 2)}\n`);
    renameSync(draft, target);
  } catch (error) {
    throw new InputError(`--save-state: cannot write "${path}" (${codeOf(error)}); choose another file`);
  }
}

/** What a file holds. Throws InputError where it is no saved state, or one of another source or dimension. */
export function loadStream(
  path: string,
  asked: { readonly source: SourceSpec; readonly dimension: number | null; readonly seed: number | null },
  io: Io,
): SavedStream {
  const saved = parse(path, readText(path, io));
  const differ = (key: string, found: unknown, wanted: unknown): never => {
    throw new InputError(
      `--from-state: "${path}" holds a state with ${key} ${jsonText(found)}, found ${jsonText(wanted)}; take the same, or leave --${key} out`,
    );
  };
  if (canonicalJson(saved.source) !== canonicalJson(asked.source)) {
    throw new InputError(
      `--from-state: "${path}" holds a state of source ${jsonText(saved.source)}, found ${jsonText(asked.source)}; name that source`,
    );
  }
  if (asked.dimension !== null && asked.dimension !== saved.dimension)
    differ("dimension", saved.dimension, asked.dimension);
  if (asked.seed !== null && asked.seed !== saved.seed) differ("seed", saved.seed, asked.seed);
  return saved;
}

function readText(path: string, io: Io): string {
  try {
    return readFileSync(resolve(io.cwd, path), "utf8");
  } catch (error) {
    throw new InputError(
      `--from-state: cannot read "${path}" (${codeOf(error)}); give a file that --save-state wrote`,
    );
  }
}

function parse(path: string, text: string): SavedStream {
  try {
    const value = JSON.parse(text) as Partial<SavedStream> & { schema?: unknown };
    const { schema, source, dimension, seed, state } = value;
    const whole = (number: unknown): number is number => Number.isSafeInteger(number) && Number(number) >= 0;
    if (schema === SCHEMA && source !== undefined && whole(dimension) && whole(seed) && state !== undefined)
      return { source, dimension, seed, state };
  } catch {
    // not JSON: reported below
  }
  throw new InputError(
    `--from-state: expected a state that --save-state wrote, found another text in "${path}"`,
  );
}

function codeOf(error: unknown): string {
  return error instanceof Error && "code" in error ? String(error.code) : "unknown error";
}

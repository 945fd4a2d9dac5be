/** Reading flags: text to numbers and lists, with messages that say what was found and what is allowed. */
import { readFileSync } from "node:fs";
import { availableParallelism } from "node:os";
import { resolve } from "node:path";
import type { Arguments, Io } from "./command.js";
import { InputError } from "./errors.js";
import { messages } from "./messages.js";

/** The text of a flag, or null where it was not given. A flag given twice counts by its last. */
export function textFlag(args: Arguments, name: string): string | null {
  const value = args[name];
  const last: unknown = Array.isArray(value) ? value.at(-1) : value;
  return typeof last === "string" || typeof last === "number" ? String(last) : null;
}

/** All texts of a repeatable flag. */
export function textFlags(args: Arguments, name: string): string[] {
  const value = args[name];
  if (value === undefined || value === null) return [];
  return (Array.isArray(value) ? value : [value]).map(String);
}

export function booleanFlag(args: Arguments, name: string): boolean {
  return args[name] === true;
}

/** A whole number of at least `least` (and at most 2^53 - 1); null where the flag was not given. */
export function wholeFlag(args: Arguments, name: string, least: number): number | null {
  const text = textFlag(args, name);
  if (text === null) return null;
  const value = /^\d+$/.test(text) ? Number(text) : Number.NaN;
  if (!(value >= least && value <= Number.MAX_SAFE_INTEGER)) {
    throw new InputError(messages.wholeNumber(name, least, text));
  }
  return value;
}

const MOST_THREADS = 256;

/** Worker threads: --threads, or as many as there are processors. */
export function threadCount(args: Arguments): number {
  const given = wholeFlag(args, "threads", 1);
  if (given !== null && given > MOST_THREADS) {
    throw new InputError(`--threads: expected a whole number from 1 to ${MOST_THREADS}, found "${given}"`);
  }
  return given ?? availableParallelism();
}

/** `@file` stands for the content of the file, relative to the working folder. */
export function textOrFile(text: string, flag: string, io: Io): string {
  if (!text.startsWith("@")) return text;
  const path = resolve(io.cwd, text.slice(1));
  try {
    return readFileSync(path, "utf8");
  } catch {
    throw new InputError(`--${flag}: cannot read "${text.slice(1)}"; give an existing file behind @`);
  }
}

/** A number above 0; null where the flag was not given. */
export function positiveFlag(args: Arguments, name: string): number | null {
  const text = textFlag(args, name);
  if (text === null) return null;
  const value = text.trim() === "" ? NaN : Number(text);
  if (!(value > 0 && Number.isFinite(value))) throw new InputError(messages.positive(name, text));
  return value;
}

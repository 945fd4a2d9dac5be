/** Reading a record: a record.json, or the report folder that holds it. */
import { readFile, stat } from "node:fs/promises";
import { join, resolve } from "node:path";
import { parseRecord } from "../record/schema.js";
import type { StudyRecord } from "../record/types.js";
import type { Io } from "./command.js";
import { asInput, InputError } from "./errors.js";

/** The record that `given` names and the file that it is in. Throws InputError for what is missing or no record. */
export async function readRecord(given: string, io: Io): Promise<{ record: StudyRecord; file: string }> {
  const path = resolve(io.cwd, given);
  const kind = await stat(path).catch(() => null);
  if (kind === null)
    throw new InputError(`record: "${given}" does not exist; give a record.json or a report folder`);
  const file = kind.isDirectory() ? join(path, "record.json") : path;
  const text = await readFile(file, "utf8").catch(() => {
    throw new InputError(`record: "${given}" holds no record.json; give a record.json or a report folder`);
  });
  return { record: asInput(() => parseRecord(json(text, given))), file };
}

/** True where `given` is a record.json or a folder that holds one. */
export async function isRecord(given: string, io: Io): Promise<boolean> {
  const path = resolve(io.cwd, given);
  const kind = await stat(path).catch(() => null);
  if (kind === null) return false;
  if (!kind.isDirectory()) return path.endsWith(".json");
  return (await stat(join(path, "record.json")).catch(() => null)) !== null;
}

function json(text: string, given: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw new InputError(`record: "${given}" is not JSON (${why}); give a record.json or a report folder`);
  }
}

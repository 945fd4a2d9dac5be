/** `tolerand report RECORD`: redraws a report from a record, without running anything. */
import { readFile, stat } from "node:fs/promises";
import { dirname, join, resolve } from "node:path";
import { parseRecord } from "../../record/schema.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { asInput, InputError } from "../errors.js";
import { messages } from "../messages.js";
import { booleanFlag, textFlag } from "../read.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const given = String(args["record"]);
  const path = resolve(io.cwd, given);
  const kind = await stat(path).catch(() => null);
  if (kind === null)
    throw new InputError(`record: "${given}" does not exist; give a record.json or a report folder`);
  const file = kind.isDirectory() ? join(path, "record.json") : path;
  const text = await readFile(file, "utf8").catch(() => {
    throw new InputError(`record: "${given}" holds no record.json; give a record.json or a report folder`);
  });
  const record = asInput(() => parseRecord(json(text, given)));
  const out = textFlag(args, "out");
  const folder = out === null ? dirname(file) : resolve(io.cwd, out);
  const { writeReport } = await import("../../report/index.js");
  await writeReport(record, folder, { images: booleanFlag(args, "images") });
  io.stdout.write(`${join(folder, "index.html")}\n`);
  io.stderr.write(messages.next(`open ${join(folder, "index.html")}`));
  return EXIT.done;
}

function json(text: string, given: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw new InputError(`record: "${given}" is not JSON (${why}); give a record.json or a report folder`);
  }
}

/** `tolerand report RECORD`: redraws a report from a record, without running anything. */
import { dirname, join, resolve } from "node:path";
import { EXIT, type Arguments, type Io } from "../command.js";
import { messages } from "../messages.js";
import { booleanFlag, textFlag } from "../read.js";
import { readRecord } from "../read-record.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const given = String(args["record"]);
  const { record, file } = await readRecord(given, io);
  const out = textFlag(args, "out");
  const folder = out === null ? dirname(file) : resolve(io.cwd, out);
  const { writeReport } = await import("../../report/index.js");
  await writeReport(record, folder, { images: booleanFlag(args, "images") });
  io.stdout.write(`${join(folder, "index.html")}\n`);
  io.stderr.write(messages.next(`open ${join(folder, "index.html")}`));
  return EXIT.done;
}

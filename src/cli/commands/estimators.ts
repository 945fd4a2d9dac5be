/** `tolerand estimators`: what there is. */
import { estimatorIds, estimatorOf } from "../../estimators/registry.js";
import { jsonText } from "../../record/json.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { booleanFlag } from "../read.js";

export function run(args: Arguments, io: Io): Promise<number> {
  const rows = estimatorIds.map((id) => {
    const { title, citation } = estimatorOf(id);
    return { id, title, citation };
  });
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(rows, 2)}\n`);
  else
    for (const { id, title, citation } of rows)
      io.stdout.write(`${id.padEnd(16)}${title}\n${"".padEnd(16)}${citation}\n`);
  return Promise.resolve(EXIT.done);
}

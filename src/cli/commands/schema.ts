/** `tolerand schema`: JSON Schema of what a user writes and of what the program writes. */
import { problemJsonSchema } from "../../problem/schema.js";
import { jsonText } from "../../record/json.js";
import { recordJsonSchema } from "../../record/schema.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { booleanFlag } from "../read.js";

export function run(args: Arguments, io: Io): Promise<number> {
  const schema = booleanFlag(args, "record") ? recordJsonSchema() : problemJsonSchema();
  io.stdout.write(`${jsonText(schema, 2)}\n`);
  return Promise.resolve(EXIT.done);
}

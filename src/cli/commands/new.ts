/** `tolerand new NAME`: a commented file that runs as it is, a problem or a source. */
import { relative, resolve } from "node:path";
import { parse } from "yaml";
import type { SourceSpec } from "../../problem/contract.js";
import { problemTemplate, writeNew } from "../../problem/template.js";
import { parseSource } from "../../sources/choice.js";
import { sourceTemplate } from "../../sources/template.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { asInput } from "../errors.js";
import { textFlag } from "../read.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const source = textFlag(args, "kind") === "source";
  const written = await writeNew(resolve(io.cwd, String(args["name"])), (name, path) =>
    source ? checkedSource(name, relative(io.cwd, path)) : problemTemplate(name),
  );
  const path = relative(io.cwd, written);
  io.stdout.write(`${path}\n`);
  const next = source
    ? `tolerand points @${path}, then tolerand study tour --source @${path}`
    : `tolerand check ${path}, then tolerand study ${path}`;
  io.stderr.write(`Next: ${next}\n`);
  return EXIT.done;
}

/** The template, once its name is known to be one that a source may have. */
function checkedSource(name: string, path: string): string {
  const text = sourceTemplate(name, path);
  asInput(() => parseSource(parse(text) as SourceSpec));
  return text;
}

/** `tolerand inspect SOURCE...`: the structure of sources, without running an integrand. */
import { existsSync } from "node:fs";
import { join, resolve } from "node:path";
import { jsonText } from "../../record/json.js";
import { plainText, textTable } from "../../report/text-table.js";
import { parseSource, type SourceChoice } from "../../sources/choice.js";
import type { InspectionRequest, Part } from "../../structure/contract.js";
import { inspectionJson, inspectSource, type Inspection } from "../../structure/inspection.js";
import { isDigitalNet, netOfSource } from "../../structure/net.js";
import { pairTValues } from "../../structure/t-value.js";
import { sliceOf, worstVector } from "../../structure/slice.js";
import { recordSource } from "../../study/spec.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { InputError, asInput } from "../errors.js";
import { inspectionRequest } from "../inspect-flags.js";
import { messages } from "../messages.js";
import { booleanFlag, textFlag, textFlags } from "../read.js";
import { sourceFromText } from "../study-flags.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const choices = textFlags(args, "sources").map((text) =>
    asInput(() => parseSource(sourceFromText(text, io))),
  );
  const request = inspectionRequest(args, io);
  const out = textFlag(args, "out");
  const folder = out === null ? null : resolve(io.cwd, out);
  if (folder !== null && existsSync(join(folder, "record.json")))
    throw new InputError(messages.studyFolder(folder));
  const inspections: Inspection[] = [];
  for (const choice of choices) inspections.push(await inspect(choice, request));
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(inspections.map(inspectionJson), 2)}\n`);
  else io.stdout.write(inspections.map(words).join("\n\n"));
  if (folder !== null) await writePage(inspections, folder, io);
  return EXIT.done;
}

/** The report, with pictures of points along the planes of each worst dimension. */
async function writePage(inspections: readonly Inspection[], folder: string, io: Io): Promise<void> {
  const { writeInspection } = await import("../../report/index.js");
  const inspected = inspections.map((inspection) => {
    const { choice, findings } = inspection;
    const vector = worstVector(inspection);
    const slice = vector === null ? null : sliceOf(choice, vector, findings.dual?.latticePoints ?? null);
    return { source: recordSource(choice), inspection, slice, pairs: pairsOf(inspection) };
  });
  try {
    await writeInspection(inspected, folder, io.commandLine);
  } catch (error) {
    if (error instanceof Error && "syscall" in error)
      throw new InputError(messages.cannotWrite(folder, error.message));
    throw error;
  }
  io.stderr.write(messages.next(`open ${folder}/index.html`));
}

/** t of every pair of a net's coordinates, which the tables only sum up. */
function pairsOf({ choice: { source }, findings: { net } }: Inspection): Uint8Array | null {
  const pairs = net?.netPairs ?? null;
  if (pairs === null || !isDigitalNet(source)) return null;
  return pairTValues(netOfSource(source, pairs.dimension, pairs.base ** pairs.digits)).values;
}

async function inspect(choice: SourceChoice, request: InspectionRequest): Promise<Inspection> {
  let inspection: Inspection;
  try {
    inspection = await inspectSource(choice, request);
  } catch (error) {
    if (error instanceof RangeError || error instanceof TypeError) throw new InputError(error.message);
    throw error;
  }
  if (inspection.parts.length === 0)
    throw new InputError(messages.nothingToInspect(choice.id, inspection.missing));
  return inspection;
}

function words({ choice, parts, missing }: Inspection): string {
  const { source } = choice;
  const head = `${choice.id}   ${source.title}`;
  const blocks = [plainText(head), ...parts.map(partText)];
  if (missing.length > 0) blocks.push(`Not computed\n${missing.map((why) => `  ${why}\n`).join("")}`);
  return blocks.join("\n\n").replace(/\n*$/, "\n");
}

/** Characters of a line of prose. */
const WIDTH = 110;

function partText({ title, lines, table, notes }: Part): string {
  const rows = table === null ? [] : textTable(table.columns, table.rows);
  return [title, ...lines.flatMap(wrapped), ...rows, ...notes.flatMap(wrapped)]
    .map((line, i) => (i === 0 ? line : `  ${line}`))
    .join("\n");
}

function wrapped(text: string): string[] {
  const lines: string[] = [];
  let line = "";
  for (const word of plainText(text).split(" ")) {
    if (line !== "" && line.length + 1 + word.length > WIDTH) {
      lines.push(line);
      line = word;
    } else line = line === "" ? word : `${line} ${word}`;
  }
  return [...lines, line];
}

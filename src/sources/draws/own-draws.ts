/**
 * Draws from outside, as a mapping in a problem file or inline on the command line:
 *
 *     { name: house, draws: { file: draws.bin, format: u32le } }
 *     { name: house, draws: { program: [./house, --fast], format: u64le }, tuples: strided 2 }
 *
 * Paths are relative to the problem file, on the command line to the working folder.
 */
import { z } from "zod";
import type { Source } from "../contract.js";
import { refuse } from "../own-recurrence.js";
import { parseBits, parseSeeding, parseTuples, type seedingSchema, type stateSchema } from "../own-usage.js";
import type { Seeding } from "../seeding.js";
import { DRAW_FORMATS, FORMATS, type DrawFormat } from "./formats.js";
import { fileOrigin, programOrigin } from "./origin.js";
import { drawsSource } from "./source.js";

/** `folder` is where paths begin; the loader of problem files sets it. */
export const drawsSchema = z.strictObject({
  file: z.string().min(1).optional(),
  program: z.array(z.string().min(1)).min(1).max(64).optional(),
  format: z.enum(DRAW_FORMATS),
  folder: z.string().min(1).optional(),
});

export interface OwnDraws {
  readonly name: string;
  readonly draws: z.infer<typeof drawsSchema>;
  readonly tuples?: string | undefined;
  readonly endpoint?: "middle" | "left" | undefined;
  readonly bits?: string | undefined;
  readonly float32?: boolean | undefined;
  readonly seeding?: z.infer<typeof seedingSchema> | undefined;
  readonly state?: z.infer<typeof stateSchema> | undefined;
}

/** The source of draws that a mapping describes. Throws a RangeError for what does not go together. */
export function ownDraws(mapping: OwnDraws): Source {
  const { name, draws, tuples, endpoint, bits, float32 = false } = mapping;
  const { file, program, format, folder = "." } = draws;
  const kind = parseTuples(tuples);
  if (kind.kind !== "strided") {
    refuse("tuples", `"${tuples}"`, '"successive" or "strided k", as draws from outside are one stream');
  }
  checkReals(format, endpoint, bits);
  const seeding = parseSeeding(mapping);
  const usage = {
    step: kind.step,
    endpoint: endpoint ?? "middle",
    bits: bits === undefined ? null : parseBits(bits, FORMATS[format].bits),
    float32,
    seeding,
  };
  const options = { id: name, format, folder, step: kind.step };
  if (program !== undefined && file === undefined) {
    checkSeed(seeding);
    return drawsSource(name, format, programOrigin(program, seeding, options), usage);
  }
  if (file !== undefined && program === undefined) {
    if (seeding.kind !== "uniform-state") {
      refuse(
        seeding.kind === "state" ? "state" : "seeding",
        seeding.kind === "state" ? `"${seeding.text}"` : '"published"',
        "none for draws from a file, whose replicates are its consecutive stretches",
      );
    }
    return drawsSource(name, format, fileOrigin(file, options), usage);
  }
  return refuse("draws", file === undefined ? "neither" : "both", '"file" or "program"');
}

function checkReals(format: DrawFormat, endpoint: string | undefined, bits: string | undefined): void {
  if (FORMATS[format].kind === "integer") return;
  const why = `none for format ${format}, whose draws are taken as they are`;
  if (endpoint !== undefined) refuse("endpoint", `"${endpoint}"`, why);
  if (bits !== undefined) refuse("bits", `"${bits}"`, why);
}

/** A seed goes into an environment variable: any text without line breaks will do for one given state. */
function checkSeed(seeding: Seeding): void {
  if (seeding.kind === "state" && !/^[\x20-\x7e]{1,4096}$/.test(seeding.text)) {
    refuse("state", JSON.stringify(seeding.text.slice(0, 60)), "a text of at most 4096 plain characters");
  }
}

/** `tolerand points SOURCE`: points of a source, or the integers that it publishes, as text or as binary numbers. */
import type { Arguments, Io, Output } from "../command.js";
import { EXIT } from "../command.js";
import { InputError, asInput } from "../errors.js";
import { booleanFlag, textFlag, textOrFile, wholeFlag } from "../read.js";
import { sourceFromText } from "../study-flags.js";
import { instantiateKernels } from "../../kernels/instance.js";
import { DEFAULT_SETTINGS } from "../../problem/defaults.js";
import { parseSource, type SourceChoice } from "../../sources/choice.js";
import type { IntegerSource, PointStream, Seekable, Source } from "../../sources/contract.js";
import {
  FORMATS,
  isDrawFormat,
  writeIntegers,
  writeReals,
  type DrawFormat,
} from "../../sources/draws/formats.js";
import { makeKey, type Key } from "../../sources/key.js";
import { checkLeave } from "../../study/programs.js";

const BLOCK = 512;
const DEFAULT_POINTS = 16;

interface Request {
  readonly choice: SourceChoice;
  readonly points: number;
  readonly first: number;
  readonly key: Key | null;
  readonly state: string | null;
  readonly allowPrograms: boolean;
}

/** How points are written: a point on a line, or draw after draw. */
type RealFormat = "f64le" | "f32le" | "text";

export async function run(args: Arguments, io: Io): Promise<number> {
  const choice = asInput(() => parseSource(sourceFromText(String(args["source"]), io)));
  const seed = wholeFlag(args, "seed", 0) ?? DEFAULT_SETTINGS.seed;
  const stateText = textFlag(args, "state");
  const keyParts = { seed, purpose: "points", problem: "", source: choice.id, replicate: 0 } as const;
  const points = wholeFlag(args, "points", 1) ?? DEFAULT_POINTS;
  const first = wholeFlag(args, "first", 0) ?? 0;
  const total = first + points;
  const request: Request = {
    choice,
    points,
    first,
    key: choice.deterministic
      ? null
      : makeKey(choice.source.nesting === "per-size" ? { ...keyParts, n: total } : keyParts),
    allowPrograms: booleanFlag(args, "allow-programs"),
    state: stateText === null ? null : textOrFile(stateText, "state", io).trim(),
  };
  const format = textFlag(args, "format") ?? "csv";
  asInput(() => {
    checkLeave([choice], request.allowPrograms);
  });
  if (format === "integers") await printIntegers(request, null, io.stdout);
  else if (!isDrawFormat(format)) await writePoints(request, dimensionOf(args), "csv", io);
  else if (FORMATS[format].kind === "integer") await printIntegers(request, format, io.stdout);
  else await writePoints(request, dimensionOf(args), format as RealFormat, io);
  return EXIT.done;
}

function dimensionOf(args: Arguments): number {
  return wholeFlag(args, "dimension", 1) ?? 1;
}

async function writePoints(
  request: Request,
  dimension: number,
  format: RealFormat | "csv",
  { stdout, stderr }: Io,
): Promise<void> {
  const { choice, points, first, key, state, allowPrograms } = request;
  const kernels = instantiateKernels();
  const n = first + points;
  if (choice.source.nesting === "per-size" && choice.source.nearestSize(n) !== n) {
    const near = choice.source.nearestSize(n);
    throw new InputError(
      `--points: ${choice.id} is built for one size, and ${n} points are not one; ${near} are`,
    );
  }
  const pointer = kernels.arena.allocate(BLOCK * dimension * 8);
  const stream = asInput(() => {
    const opened = choice.open(
      { dimension, n, key, allowPrograms, ...(state === null ? {} : { state }) },
      kernels,
    );
    skip(opened, first, pointer);
    return opened;
  });
  let ones = 0;
  for (let done = 0; done < points; done += BLOCK) {
    const count = Math.min(BLOCK, points - done);
    asInput(() => {
      stream.fill(pointer, BLOCK, count);
    });
    const block = kernels.f64(pointer, BLOCK * dimension);
    const rows = new Float64Array(count * dimension);
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < dimension; j++) rows[i * dimension + j] = block[j * BLOCK + i] as number;
    }
    if (format === "f32le") ones += rows.filter((u) => Math.fround(u) === 1).length;
    await write(stdout, format === "csv" ? csv(rows, dimension) : writeReals(rows, format));
  }
  stream.close?.();
  if (ones > 0) {
    stderr.write(
      `note: ${ones} of ${points * dimension} numbers are 1 in single precision, and not below it\n`,
    );
  }
}

/** Goes on to point `first`: at once where the source can, else by making the points before it. */
function skip(stream: PointStream & Partial<Seekable>, first: number, pointer: number): void {
  if (first === 0) return;
  if (stream.seek !== undefined) {
    stream.seek(first);
    return;
  }
  for (let done = 0; done < first; done += BLOCK) stream.fill(pointer, BLOCK, Math.min(BLOCK, first - done));
}

/** Shortest decimals that read back as the same doubles. */
function csv(rows: Float64Array, dimension: number): string {
  let text = "";
  for (let i = 0; i < rows.length; i += dimension) text += `${rows.subarray(i, i + dimension).join(",")}\n`;
  return text;
}

function hasIntegers(source: Source): source is IntegerSource {
  return "openIntegers" in source;
}

/** The source's own integers: as decimals (format null), or as words. */
async function printIntegers(request: Request, format: DrawFormat | null, out: Output): Promise<void> {
  const { choice, points, first, key, state } = request;
  const { source } = choice;
  if (!hasIntegers(source)) {
    throw new InputError(
      `--format: ${choice.id} has no integers of its own, found "${format ?? "integers"}"; take csv, f64le, f32le or text`,
    );
  }
  const stream = asInput(() => source.openIntegers({ key, ...(state === null ? {} : { state }) }));
  for (let i = 0; i < first; i++) stream.next();
  for (let done = 0; done < points; done += BLOCK) {
    const words = Array.from({ length: Math.min(BLOCK, points - done) }, () => stream.next());
    await write(out, format === null ? `${words.join("\n")}\n` : binary(words, format, choice.id));
  }
}

function binary(words: readonly bigint[], format: DrawFormat, id: string): Uint8Array {
  const bytes = writeIntegers(words, format);
  if (bytes !== null) return bytes;
  const wide = words.find((word) => word >= 2n ** 32n) ?? 0n;
  throw new InputError(
    `--format: the integers of ${id} do not fit 32 bits (${wide} came); take u64le, u64be or integers`,
  );
}

/** Writes with back pressure: memory stays flat however slow the reader is. */
async function write(out: Output, chunk: string | Uint8Array): Promise<void> {
  if (out.write(chunk) !== false || out.once === undefined) return;
  const once = out.once.bind(out);
  await new Promise<void>((resolve) => {
    once("drain", resolve);
  });
}

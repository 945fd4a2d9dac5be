/** `tolerand points SOURCE`: points of a source, or the integers that it publishes, as text or as binary numbers. */
import type { Arguments, Io, Output } from "../command.js";
import { EXIT } from "../command.js";
import { InputError, asInput } from "../errors.js";
import { textFlag, textOrFile, wholeFlag } from "../read.js";
import { sourceFromText } from "../study-flags.js";
import { instantiateKernels } from "../../kernels/instance.js";
import { DEFAULT_SETTINGS } from "../../problem/defaults.js";
import { parseSource, type SourceChoice } from "../../sources/choice.js";
import type { IntegerSource, PointStream, Seekable, Source } from "../../sources/contract.js";
import { makeKey, type Key } from "../../sources/key.js";

const BLOCK = 512;
const DEFAULT_POINTS = 16;

interface Request {
  readonly choice: SourceChoice;
  readonly points: number;
  readonly first: number;
  readonly key: Key | null;
  readonly state: string | null;
}

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
    state: stateText === null ? null : textOrFile(stateText, "state", io).trim(),
  };
  const format = textFlag(args, "format") ?? "csv";
  if (format === "csv" || format === "f64le")
    await writePoints(request, dimensionOf(args), format, io.stdout);
  else await writeIntegers(request, format, io.stdout);
  return EXIT.done;
}

function dimensionOf(args: Arguments): number {
  return wholeFlag(args, "dimension", 1) ?? 1;
}

async function writePoints(request: Request, dimension: number, format: string, out: Output): Promise<void> {
  const { choice, points, first, key, state } = request;
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
    const opened = choice.open({ dimension, n, key, ...(state === null ? {} : { state }) }, kernels);
    skip(opened, first, pointer);
    return opened;
  });
  for (let done = 0; done < points; done += BLOCK) {
    const count = Math.min(BLOCK, points - done);
    stream.fill(pointer, BLOCK, count);
    const block = kernels.f64(pointer, BLOCK * dimension);
    const rows = new Float64Array(count * dimension);
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < dimension; j++) rows[i * dimension + j] = block[j * BLOCK + i] as number;
    }
    await write(out, format === "csv" ? csv(rows, dimension) : new Uint8Array(rows.buffer));
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

async function writeIntegers(request: Request, format: string, out: Output): Promise<void> {
  const { choice, points, first, key, state } = request;
  const { source } = choice;
  if (!hasIntegers(source)) {
    throw new InputError(
      `--format: ${choice.id} has no integers of its own, found "${format}"; take csv or f64le`,
    );
  }
  const stream = asInput(() => source.openIntegers({ key, ...(state === null ? {} : { state }) }));
  for (let i = 0; i < first; i++) stream.next();
  for (let done = 0; done < points; done += BLOCK) {
    const words = Array.from({ length: Math.min(BLOCK, points - done) }, () => stream.next());
    await write(
      out,
      format === "integers" ? `${words.join("\n")}\n` : binary(words, format === "u64le" ? 8 : 4, choice.id),
    );
  }
}

function binary(words: readonly bigint[], size: 4 | 8, id: string): Uint8Array {
  const limit = 1n << BigInt(8 * size);
  const wide = words.find((word) => word >= limit);
  if (wide !== undefined) {
    throw new InputError(
      `--format: the integers of ${id} do not fit 32 bits (${wide} came); take u64le or integers`,
    );
  }
  return size === 8
    ? new Uint8Array(BigUint64Array.from(words).buffer)
    : new Uint8Array(Uint32Array.from(words, Number).buffer);
}

/** Writes with back pressure: memory stays flat however slow the reader is. */
async function write(out: Output, chunk: string | Uint8Array): Promise<void> {
  if (out.write(chunk) !== false || out.once === undefined) return;
  const once = out.once.bind(out);
  await new Promise<void>((resolve) => {
    once("drain", resolve);
  });
}

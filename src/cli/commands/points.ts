/** `tolerand points SOURCE`: points of a source, or the integers that it publishes, as text or as binary numbers. */
import type { Arguments, Io, Output } from "../command.js";
import { EXIT } from "../command.js";
import { InputError, asInput } from "../errors.js";
import { booleanFlag, textFlag, textOrFile, wholeFlag } from "../read.js";
import { loadStream, saveStream } from "../stream-state.js";
import { sourceFromText } from "../study-flags.js";
import { instantiateKernels } from "../../kernels/instance.js";
import { DEFAULT_SETTINGS } from "../../problem/defaults.js";
import { parseSource, type SourceChoice } from "../../sources/choice.js";
import type { IntegerSource, OpenStream, PointStream, Seekable, Source } from "../../sources/contract.js";
import {
  FORMATS,
  isDrawFormat,
  writeIntegers,
  writeReals,
  type DrawFormat,
} from "../../sources/draws/formats.js";
import { makeKey, type Key } from "../../sources/key.js";
import { planStream, streamKey } from "../../sources/streams.js";
import { checkLeave } from "../../study/programs.js";

const BLOCK = 512;
const DEFAULT_POINTS = 16;

interface Request {
  readonly choice: SourceChoice;
  readonly points: number;
  readonly first: number;
  readonly key: Key | null;
  readonly dimension: number;
  readonly seed: number;
  readonly state: string | null;
  /** Outputs to pass over from the start, for one of several streams. */
  readonly jump: bigint | null;
  /** A saved state to go on from. */
  readonly saved: unknown;
  /** Where the state is saved at the end. */
  readonly save: string | null;
  readonly allowPrograms: boolean;
}

/** How points are written: a point on a line, or draw after draw. */
type RealFormat = "f64le" | "f32le" | "text";

export async function run(args: Arguments, io: Io): Promise<number> {
  const choice = asInput(() => parseSource(sourceFromText(String(args["source"]), io)));
  const format = textFlag(args, "format") ?? "csv";
  const integers = format === "integers" || (isDrawFormat(format) && FORMATS[format].kind === "integer");
  const request = requestOf(args, choice, integers, io);
  asInput(() => {
    checkLeave([choice], request.allowPrograms);
  });
  if (integers) await printIntegers(request, format === "integers" ? null : format, io.stdout);
  else await writePoints(request, format as RealFormat | "csv", io);
  return EXIT.done;
}

/** Everything that the flags say, checked together. */
function requestOf(args: Arguments, choice: SourceChoice, integers: boolean, io: Io): Request {
  const points = wholeFlag(args, "points", 1) ?? DEFAULT_POINTS;
  const first = wholeFlag(args, "first", 0) ?? 0;
  const stateText = textFlag(args, "state");
  const state = stateText === null ? null : textOrFile(stateText, "state", io).trim();
  const [from, save] = [textFlag(args, "from-state"), textFlag(args, "save-state")];
  const flag = from === null ? "save-state" : "from-state";
  if (integers && (from !== null || save !== null))
    throw new InputError(`--${flag}: states go with points, found integers; take csv, f64le, f32le or text`);
  const asked = { dimension: wholeFlag(args, "dimension", 1), seed: wholeFlag(args, "seed", 0) };
  const saved = from === null ? null : loadStream(from, { source: choice.spec, ...asked }, io);
  const dimension = saved?.dimension ?? asked.dimension ?? 1;
  const seed = saved?.seed ?? asked.seed ?? DEFAULT_SETTINGS.seed;
  const keyParts = { seed, purpose: "points", problem: "", source: choice.id, replicate: 0 } as const;
  const perSize = choice.source.nesting === "per-size";
  if (perSize && (from !== null || save !== null))
    throw new InputError(`--${flag}: ${choice.id} is built for one size and cannot go on behind it`);
  const key = choice.deterministic ? null : makeKey(perSize ? { ...keyParts, n: first + points } : keyParts);
  const request = { choice, points, first, dimension, seed, state, save, saved: saved?.state ?? null };
  const opening = { ...request, key, jump: null, allowPrograms: booleanFlag(args, "allow-programs") };
  const stream = textFlag(args, "stream");
  if (stream === null) return opening;
  const outputs = BigInt(first + points) * BigInt(integers ? 1 : dimension);
  const { index, count } = streamOf(stream);
  const plan = asInput(() =>
    planStream({ source: choice.source, index, count, outputs, state: state !== null || key === null }),
  );
  io.stderr.write(`${plan.note}\n`);
  if (plan.jump !== null || key === null) return { ...opening, jump: plan.jump };
  return { ...opening, key: streamKey(key, index, count) };
}

/** "3/8": the third of eight. */
function streamOf(text: string): { index: number; count: number } {
  const [index = NaN, count = NaN] = /^\d{1,9}\/\d{1,9}$/.test(text) ? text.split("/").map(Number) : [];
  if (index >= 1 && index <= count) return { index, count };
  throw new InputError(`--stream: expected a stream and their number such as 3/8, found "${text}"`);
}

function checkSize({ choice, first, points }: Request): void {
  const n = first + points;
  const near = choice.source.nearestSize(n);
  if (choice.source.nesting === "sequence" || near === n) return;
  throw new InputError(
    `--points: ${choice.id} is built for one size, and ${n} points are not one; ${near} are`,
  );
}

/** What opens a stream, of points or of integers: a key or a state, and a jump from there. */
function startOf({ key, state, jump }: Request) {
  return { key, ...(state === null ? {} : { state }), ...(jump === null ? {} : { jump }) };
}

async function writePoints(request: Request, format: RealFormat | "csv", io: Io): Promise<void> {
  const { choice, points, first, dimension, allowPrograms, save, saved } = request;
  checkSize(request);
  const kernels = instantiateKernels();
  const pointer = kernels.arena.allocate(BLOCK * dimension * 8);
  const { stream, keeper } = asInput(() => {
    const n = first + points;
    const opened = choice.open({ dimension, n, allowPrograms, ...startOf(request) }, kernels);
    const keeps = saved !== null || save !== null;
    const keeper = keeps
      ? new StateKeeper(choice, opened, saved === null ? "save-state" : "from-state")
      : null;
    if (saved !== null) keeper?.restore(saved);
    skip(saved === null ? opened : { dimension, fill: opened.fill.bind(opened) }, first, pointer);
    return { stream: opened, keeper };
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
    await write(io.stdout, format === "csv" ? csv(rows, dimension) : writeReals(rows, format));
  }
  if (save !== null) {
    const state = keeper?.save(first + points);
    saveStream(save, { source: choice.spec, dimension, seed: request.seed, state }, io);
  }
  stream.close?.();
  if (ones > 0) {
    const total = points * dimension;
    io.stderr.write(`note: ${ones} of ${total} numbers are 1 in single precision, and not below it\n`);
  }
}

/** Keeps a stream's state: its own, or, for points that any index gives, the index of the next one. */
class StateKeeper {
  readonly #choice: SourceChoice;
  readonly #stream: OpenStream;
  /** Index of the point at which the stream was opened or restored. */
  #start = 0;

  constructor(choice: SourceChoice, stream: OpenStream, flag: string) {
    if (stream.save === undefined && stream.seek === undefined)
      throw new InputError(`--${flag}: ${choice.id} has no state that can be kept`);
    this.#choice = choice;
    this.#stream = stream;
  }

  restore(saved: unknown): void {
    if (this.#stream.restore !== undefined) {
      this.#stream.restore(JSON.stringify(saved));
      return;
    }
    const index = typeof saved === "object" && saved !== null && "index" in saved ? saved.index : null;
    if (typeof index !== "number" || !(Number.isSafeInteger(index) && index >= 0)) {
      throw new RangeError(`state: expected the index of a point of source "${this.#choice.id}"`);
    }
    this.#start = index;
    this.#stream.seek?.(index);
  }

  /** The state behind `points` points from there. */
  save(points: number): unknown {
    if (this.#stream.save !== undefined) return JSON.parse(this.#stream.save()) as unknown;
    return { index: this.#start + points };
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
  const { choice, points, first } = request;
  const { source } = choice;
  if (!hasIntegers(source)) {
    throw new InputError(
      `--format: ${choice.id} has no integers of its own, found "${format ?? "integers"}"; take csv, f64le, f32le or text`,
    );
  }
  const stream = asInput(() => source.openIntegers(startOf(request)));
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

/** From bytes to draws: words in kernel memory, in order, each checked; an error names the byte offset. */
import type { ByteStream } from "./bytes.js";
import { FORMATS, swapBytes, type DrawFormat } from "./formats.js";

export interface DrawReader {
  /** Bytes of the words that draws become. */
  readonly wordBytes: 4 | 8;
  /** The next draws, as many as fit: words of `wordBytes`, integers as they are, reals as doubles. */
  read(words: Uint8Array): void;
  /** Passes over draws. */
  skip(draws: number): void;
  close(): void;
}

/** Integers of 32 bits stay so; all else has 8 bytes. */
function wordBytesOf(format: DrawFormat): 4 | 8 {
  const { kind, bytes } = FORMATS[format];
  return kind === "integer" && bytes === 4 ? 4 : 8;
}

export interface ReaderContext {
  readonly format: DrawFormat;
  readonly bytes: ByteStream;
  /** Byte offset at which the stream begins. */
  readonly start: number;
  /** For messages: 'source "house", replicate 3'. */
  readonly name: () => string;
}

export function makeReader(context: ReaderContext): DrawReader {
  return FORMATS[context.format].kind === "text" ? new TextReader(context) : new BinaryReader(context);
}

function ended({ name, bytes }: ReaderContext, offset: number, missing: string): RangeError {
  return new RangeError(
    `${name()}: ${bytes.ending()} at byte offset ${offset}, where ${missing} wanted; give more draws, or take fewer replicates or points (--replicates, --sizes)`,
  );
}

function outside({ name }: ReaderContext, offset: number, found: string): RangeError {
  return new RangeError(
    `${name()}: expected numbers of at least 0 and below 1, found ${found} at byte offset ${offset}`,
  );
}

const SCRATCH_BYTES = 65536;

class BinaryReader implements DrawReader {
  readonly wordBytes: 4 | 8;
  readonly #context: ReaderContext;
  readonly #scratch = new Uint8Array(SCRATCH_BYTES);
  /** Byte offset of the next byte. */
  #offset: number;

  constructor(context: ReaderContext) {
    this.#context = context;
    this.#offset = context.start;
    this.wordBytes = wordBytesOf(context.format);
  }

  read(words: Uint8Array): void {
    const { format } = this.#context;
    const { kind, bytes, bigEndian } = FORMATS[format];
    const first = this.#offset;
    if (kind === "integer") {
      this.#fill(words);
      if (bigEndian) swapBytes(words, bytes);
      return;
    }
    const doubles = new Float64Array(words.buffer, words.byteOffset, words.byteLength / 8);
    if (bytes === 8) this.#fill(words);
    else this.#widen(doubles);
    const wrong = doubles.findIndex((u) => !(u >= 0 && u < 1));
    if (wrong >= 0) throw outside(this.#context, first + wrong * bytes, String(doubles[wrong]));
  }

  skip(draws: number): void {
    for (let left = draws * FORMATS[this.#context.format].bytes; left > 0;) {
      const size = Math.min(left, SCRATCH_BYTES);
      this.#fill(this.#scratch.subarray(0, size));
      left -= size;
    }
  }

  close(): void {
    this.#context.bytes.close();
  }

  #widen(doubles: Float64Array): void {
    const size = SCRATCH_BYTES / 4;
    for (let k = 0; k < doubles.length; k += size) {
      const count = Math.min(size, doubles.length - k);
      this.#fill(this.#scratch.subarray(0, count * 4));
      doubles.set(new Float32Array(this.#scratch.buffer, 0, count), k);
    }
  }

  #fill(target: Uint8Array): void {
    for (let at = 0; at < target.length;) {
      const count = this.#context.bytes.read(target, at, target.length - at);
      if (count === 0) throw ended(this.#context, this.#offset, `${target.length - at} more bytes are`);
      at += count;
      this.#offset += count;
    }
  }
}

/** Longest number as text; a double needs at most 24 characters, and what is longer is no number. */
const LONGEST_TOKEN = 400;

class TextReader implements DrawReader {
  readonly wordBytes = 8;
  readonly #context: ReaderContext;
  readonly #buffer = Buffer.alloc(SCRATCH_BYTES);
  #begin = 0;
  #end = 0;
  /** Byte offset of the buffer's first byte. */
  #offset: number;
  #done = false;

  constructor(context: ReaderContext) {
    this.#context = context;
    this.#offset = context.start;
  }

  read(words: Uint8Array): void {
    const doubles = new Float64Array(words.buffer, words.byteOffset, words.byteLength / 8);
    for (let k = 0; k < doubles.length; k++) doubles[k] = this.#next(doubles.length - k);
  }

  skip(draws: number): void {
    for (let k = 0; k < draws; k++) this.#next(draws - k);
  }

  close(): void {
    this.#context.bytes.close();
  }

  #next(missing: number): number {
    while (this.#begin < this.#end || this.#refill()) {
      if (!isSeparator(this.#buffer[this.#begin] ?? 0)) break;
      this.#begin++;
    }
    let length = 0;
    for (;;) {
      if (this.#begin + length >= this.#end && !this.#refill()) break;
      if (isSeparator(this.#buffer[this.#begin + length] ?? 0) || length > LONGEST_TOKEN) break;
      length++;
    }
    const offset = this.#offset + this.#begin;
    if (length === 0) throw ended(this.#context, offset, `${missing} more numbers are`);
    const token = this.#buffer.toString("latin1", this.#begin, this.#begin + length);
    this.#begin += length;
    const value = DECIMAL.test(token) ? Number(token) : NaN;
    if (!(value >= 0 && value < 1)) throw outside(this.#context, offset, JSON.stringify(token.slice(0, 40)));
    return value;
  }

  /** More bytes behind those that are left; false at the end. */
  #refill(): boolean {
    if (this.#done) return false;
    this.#buffer.copyWithin(0, this.#begin, this.#end);
    this.#offset += this.#begin;
    this.#end -= this.#begin;
    this.#begin = 0;
    const count = this.#context.bytes.read(this.#buffer, this.#end, this.#buffer.length - this.#end);
    this.#end += count;
    this.#done = count === 0;
    return count > 0;
  }
}

const DECIMAL = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;

/** Space, tab, line feed, carriage return, comma, semicolon. */
export function isSeparator(byte: number): boolean {
  return byte === 32 || byte === 9 || byte === 10 || byte === 13 || byte === 44 || byte === 59;
}

/**
 * The forms in which draws travel between programs, one table for reading and for writing: integers of 32 or 64 bits,
 * doubles and floats (IEEE 754) in either or little byte order, and decimal text. Integers are all of 0...2^b - 1; reals
 * lie in [0, 1).
 */

export const DRAW_FORMATS = ["u32le", "u32be", "u64le", "u64be", "f64le", "f32le", "text"] as const;
export type DrawFormat = (typeof DRAW_FORMATS)[number];

export interface FormatForm {
  readonly kind: "integer" | "real" | "text";
  /** Bytes of one draw; of a text, the fewest: a digit and what ends it. */
  readonly bytes: 2 | 4 | 8;
  readonly bigEndian: boolean;
  /** Bits that a draw carries at most. */
  readonly bits: number;
  readonly title: string;
}

export const FORMATS: Readonly<Record<DrawFormat, FormatForm>> = {
  u32le: form("integer", 4, false, 32, "unsigned integers of 32 bits, least significant byte first"),
  u32be: form("integer", 4, true, 32, "unsigned integers of 32 bits, most significant byte first"),
  u64le: form("integer", 8, false, 64, "unsigned integers of 64 bits, least significant byte first"),
  u64be: form("integer", 8, true, 64, "unsigned integers of 64 bits, most significant byte first"),
  f64le: form("real", 8, false, 53, "doubles in [0, 1), least significant byte first"),
  f32le: form("real", 4, false, 24, "floats in [0, 1), least significant byte first"),
  text: form("text", 2, false, 53, "decimal numbers in [0, 1) with spaces, commas or new lines between"),
};

function form(
  kind: FormatForm["kind"],
  bytes: FormatForm["bytes"],
  bigEndian: boolean,
  bits: number,
  title: string,
): FormatForm {
  return { kind, bytes, bigEndian, bits, title };
}

export function isDrawFormat(text: unknown): text is DrawFormat {
  return (DRAW_FORMATS as readonly unknown[]).includes(text);
}

/** Reverses the bytes of each word of `size` bytes, in place. */
export function swapBytes(bytes: Uint8Array, size: number): void {
  const view = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (size === 8) view.swap64();
  else view.swap32();
}

/** Integers as the format has them; null where one is too wide for it. */
export function writeIntegers(words: readonly bigint[], format: DrawFormat): Uint8Array | null {
  const { bytes, bigEndian } = FORMATS[format];
  const limit = 1n << BigInt(8 * bytes);
  if (words.some((word) => word >= limit)) return null;
  const out =
    bytes === 8
      ? new Uint8Array(BigUint64Array.from(words).buffer)
      : new Uint8Array(Uint32Array.from(words, Number).buffer);
  if (bigEndian) swapBytes(out, bytes);
  return out;
}

/** Reals as the format has them; text has one on a line, the shortest decimals that read back as the same double. */
export function writeReals(values: Float64Array, format: "f64le" | "f32le" | "text"): Uint8Array | string {
  if (format === "text") return `${values.join("\n")}\n`;
  return format === "f64le"
    ? new Uint8Array(values.buffer)
    : new Uint8Array(Float32Array.from(values).buffer);
}

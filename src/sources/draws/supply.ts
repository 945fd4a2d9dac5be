/** How many draws a file holds: by its size, or for text by counting its numbers. */
import { closeSync, openSync, readSync } from "node:fs";
import { FORMATS, type DrawFormat } from "./formats.js";
import { isSeparator } from "./reader.js";

const counted = new Map<string, number>();

/** Throws a RangeError where the file ends in the middle of a draw. */
export function drawsIn(path: string, given: string, size: number, format: DrawFormat): number {
  const { kind, bytes } = FORMATS[format];
  if (kind === "text") {
    const key = `${size} ${path}`;
    const known = counted.get(key) ?? countNumbers(path);
    counted.set(key, known);
    return known;
  }
  if (size % bytes === 0) return size / bytes;
  throw new RangeError(
    `source.draws.file: expected a multiple of ${bytes} bytes for format ${format}, found ${size} in "${given}"; the last draw is cut at byte offset ${size - (size % bytes)}`,
  );
}

/** One pass over the file, some seconds for 10 GB. */
function countNumbers(path: string): number {
  const buffer = new Uint8Array(1 << 20);
  const descriptor = openSync(path, "r");
  try {
    let numbers = 0;
    let between = true;
    for (let count = 1; count > 0;) {
      count = readSync(descriptor, buffer, 0, buffer.length, null);
      for (let k = 0; k < count; k++) {
        const separator = isSeparator(buffer[k] as number);
        if (between && !separator) numbers++;
        between = separator;
      }
    }
    return numbers;
  } finally {
    closeSync(descriptor);
  }
}

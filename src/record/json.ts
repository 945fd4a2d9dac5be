/**
 * JSON as the program writes and hashes it: non-finite numbers as the strings "NaN", "Infinity" and "-Infinity" (a plain
 * JSON.stringify makes them null, which means absent), bigints as decimal strings.
 */
import { createHash } from "node:crypto";

function plain(value: unknown, sorted: boolean): unknown {
  if (typeof value === "number" && !Number.isFinite(value)) return String(value);
  if (typeof value === "bigint") return value.toString();
  if (Array.isArray(value)) return value.map((part) => plain(part, sorted));
  if (value !== null && typeof value === "object") {
    const entries = Object.entries(value).filter(([, v]) => v !== undefined);
    if (sorted) entries.sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
    return Object.fromEntries(entries.map(([k, v]) => [k, plain(v, sorted)]));
  }
  return value;
}

/** The text that is hashed: keys sorted, no spaces. */
export function canonicalJson(value: unknown): string {
  return JSON.stringify(plain(value, true));
}

/** The text that is written: keys in the order they were given, `indent` spaces for reading. */
export function jsonText(value: unknown, indent = 0): string {
  return JSON.stringify(plain(value, false), null, indent);
}

/** SHA-256 (FIPS 180-4) of the canonical text, in hexadecimal. */
export function digestOf(value: unknown): string {
  return createHash("sha256").update(canonicalJson(value)).digest("hex");
}

/** A number read back from a record: a number, or one of the three strings for non-finite ones. */
export function numberFrom(value: unknown): number {
  if (typeof value === "number") return value;
  if (value === "NaN" || value === "Infinity" || value === "-Infinity") return Number(value);
  throw new TypeError(`record: expected a number, found ${JSON.stringify(value)}`);
}

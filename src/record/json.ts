/** Canonical JSON: keys in sorted order, non-finite numbers as strings, so that equal data has equal bytes. */
import { createHash } from "node:crypto";

function plain(value: unknown): unknown {
  if (typeof value === "number" && !Number.isFinite(value)) return String(value);
  if (typeof value === "bigint") return value.toString();
  if (Array.isArray(value)) return value.map(plain);
  if (value !== null && typeof value === "object") {
    const entries = Object.entries(value).filter(([, v]) => v !== undefined);
    entries.sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
    return Object.fromEntries(entries.map(([k, v]) => [k, plain(v)]));
  }
  return value;
}

/** The canonical text of `value`; `indent` spaces for reading, none for hashing. */
export function canonicalJson(value: unknown, indent = 0): string {
  return JSON.stringify(plain(value), null, indent);
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

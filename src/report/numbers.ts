/**
 * Numbers as a reader meets them, beside those of findings/format.ts (only the digits that an interval supports): given
 * numbers as they were given, signed ones, and a dash for what is not known.
 */
import { formatValue } from "../findings/format.js";

/** A given number (a tolerance, a constant) as it is, up to `digits` significant digits and no idle zeros. */
export function plainNumber(value: number, digits = 10): string {
  if (!Number.isFinite(value)) return formatValue(value);
  const [, whole = "", rest = ""] = /^-?(\d+)(.*)$/.exec(String(Number(value.toPrecision(digits)))) ?? [];
  const sign = value < 0 ? "\u2212" : "";
  return sign + whole.replace(/\B(?=(\d{3})+$)/g, ",") + rest.replace("e+", "e");
}

/** A value to the digits of its uncertainty, its sign always shown. */
export function signed(value: number, uncertainty: number | null): string {
  const text = formatValue(value, uncertainty);
  return value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
}

/** A value to the digits that its interval supports (a 95 % interval is about four standard errors wide). */
export function withInterval(value: number, interval: readonly [number, number] | null): string {
  if (value === 0) return "0";
  return formatValue(value, interval === null ? null : (interval[1] - interval[0]) / 4);
}

/** A known value in words, or a dash. */
export function orDash(value: number | null | undefined, words: (value: number) => string): string {
  return typeof value === "number" ? words(value) : "–";
}

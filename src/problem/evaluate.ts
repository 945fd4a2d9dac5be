/**
 * Numbers of a problem file: digits, powers of whole numbers, or formulas of constants. Digits and powers are read
 * here; only a real formula wakes the formula language (0.8 s to load).
 */
import type { Constant } from "./contract.js";

const DIGITS = /^[-+]?(\d+\.?\d*|\.\d+)(e[-+]?\d+)?$/i;
const POWER = /^(\d{1,9})\^(\d{1,3})$/;

/** The value of digits or of a power such as 2^16; null for any other text. */
export function plainNumber(text: string): number | null {
  const trimmed = text.trim();
  if (DIGITS.test(trimmed)) return Number(trimmed);
  const power = POWER.exec(trimmed);
  if (power === null) return null;
  const value = BigInt(power[1] ?? "") ** BigInt(power[2] ?? "");
  return value <= BigInt(Number.MAX_SAFE_INTEGER) ? Number(value) : null;
}

/**
 * The value of `text`, a formula of numbers and `constants`. Throws FormulaError where the language refuses it.
 */
export async function numberOf(text: string, constants: Readonly<Record<string, Constant>>): Promise<number> {
  const plain = plainNumber(text);
  if (plain !== null) return plain;
  const { evaluateConstant } = await import("../formula/index.js");
  return evaluateConstant(text, constants);
}

/**
 * Numbers of a problem file: digits, powers of whole numbers, or formulas of constants. Digits and powers are read
 * here; only a real formula wakes the formula language (0.8 s to load).
 */
import { FormulaError } from "../formula/contract.js";
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
  // Stands in until the formula language offers its own evaluation of constants.
  const math = await import("mathjs");
  const scope: Record<string, unknown> = { ...constants };
  const each = (f: (x: number) => number) => {
    const go = (x: unknown): unknown =>
      typeof x === "number" ? f(x) : Array.isArray(x) ? x.map(go) : math.isMatrix(x) ? go(x.valueOf()) : NaN;
    return go;
  };
  for (const name of ["exp", "sin", "cos", "atan", "expm1", "log", "sqrt"] as const)
    scope[name] = each((x) => Math[name](x));
  scope["erf"] = each((x) => math.erf(x));
  scope["normalCdf"] = each((x) => (1 + math.erf(x / Math.SQRT2)) / 2);
  scope["normalPdf"] = each((x) => Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI));
  try {
    const result: unknown = math.parse(text).evaluate(scope);
    return Number(math.isResultSet(result) ? result.valueOf().at(-1) : result);
  } catch (error) {
    throw new FormulaError(error instanceof Error ? error.message : String(error), { line: 1, column: 1 });
  }
}

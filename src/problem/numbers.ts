/** Numbers of a problem file, written as numbers or as formulas of its constants, held against their ranges. */
import { FormulaError } from "../formula/contract.js";
import type { Constant } from "./contract.js";
import type { Path } from "./document.js";
import { show } from "./errors.js";
import { numberOf, plainNumber } from "./evaluate.js";
import type { Findings } from "./findings.js";
import type { ProblemFile } from "./schema.js";

export type Constants = Readonly<Record<string, Constant>>;
export type Raw = string | number;

/** A number that must lie in a range: the test, and the words for it. */
export interface Range {
  readonly what: string;
  readonly holds: (x: number) => boolean;
}

export const POSITIVE: Range = { what: "a number above 0", holds: (x) => x > 0 };
export const NOT_NEGATIVE: Range = { what: "a number of 0 or more", holds: (x) => x >= 0 };
export const FINITE: Range = { what: "a finite number", holds: () => true };

export function wholeFrom(least: number, most: number, mostText = String(most)): Range {
  return {
    what: `a whole number from ${least} to ${mostText}`,
    holds: (x) => Number.isInteger(x) && x >= least && x <= most,
  };
}

/** Turns numbers and formulas of one file into numbers, noting what cannot be read. */
export class NumberReader {
  readonly #findings: Findings;
  constants: Constants = {};
  /** False once the constants are broken: formulas are then left alone, their errors would only repeat it. */
  formulas = true;

  constructor(findings: Findings) {
    this.#findings = findings;
  }

  /** The number at `path`, or null after a finding. */
  async read(raw: Raw, path: Path, range: Range): Promise<number | null> {
    let value: number;
    try {
      if (typeof raw === "string" && !this.formulas && plainNumber(raw) === null) return null;
      value = typeof raw === "number" ? raw : await numberOf(raw, this.constants);
    } catch (error) {
      if (!(error instanceof FormulaError)) throw error;
      this.#findings.addFormula(path, error);
      return null;
    }
    if (Number.isFinite(value) && range.holds(value)) return value;
    const text = typeof raw === "string" ? ` (from ${show(raw)})` : "";
    this.#findings.add(path, `expected ${range.what}, found ${value}${text}`);
    return null;
  }
}

export async function readConstants(
  file: ProblemFile["constants"],
  numbers: NumberReader,
  findings: Findings,
): Promise<Constants> {
  const constants: Record<string, Constant> = {};
  numbers.constants = constants;
  let broken = false;
  const one = async (raw: Raw, path: Path): Promise<number> => {
    const value = await numbers.read(raw, path, FINITE);
    broken ||= value === null;
    return value ?? NaN;
  };
  const vector = async (raw: readonly Raw[], path: Path): Promise<number[]> => {
    const values: number[] = [];
    for (const [i, item] of raw.entries()) values.push(await one(item, [...path, i]));
    return values;
  };
  const isMatrix = (raw: readonly (Raw | readonly Raw[])[]): raw is readonly (readonly Raw[])[] =>
    Array.isArray(raw[0]);
  for (const [name, raw] of Object.entries(file ?? {})) {
    const path = ["constants", name];
    if (!Array.isArray(raw)) constants[name] = await one(raw, path);
    else if (!isMatrix(raw)) constants[name] = await vector(raw, path);
    else {
      const rows: number[][] = [];
      for (const [i, row] of raw.entries()) rows.push(await vector(row, [...path, i]));
      constants[name] = rows;
      const ragged = rows.findIndex((row) => row.length !== rows[0]?.length);
      if (ragged > 0) {
        const lengths = `${rows[0]?.length ?? 0} and ${rows[ragged]?.length ?? 0}`;
        findings.add(
          [...path, ragged],
          `expected rows of one length, found ${lengths} numbers; complete the row`,
        );
      }
    }
  }
  if (broken) numbers.formulas = false;
  return constants;
}

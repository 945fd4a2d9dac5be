/** What a line of the budget is made from, and what it is: the contract of the files of this folder. */
import type { Problem } from "../../problem/contract.js";
import type { BiasTest, BudgetLine, RecordSource } from "../../record/types.js";
import type { Context } from "../cells.js";
import type { KnownReference } from "../reference.js";
import type { Series } from "../series.js";
import type { Estimated, Spread } from "../spread.js";

export interface LineCase {
  readonly series: Series;
  readonly problem: Problem;
  readonly source: RecordSource | undefined;
  readonly reference: KnownReference | undefined;
  readonly test: BiasTest | undefined;
  readonly context: Context;
  /** Points of the run that the budget is about. */
  readonly n: number;
  readonly confidence: number;
  readonly spread: Spread | null;
  /** The replicate deviation at n. */
  readonly sigma: Estimated;
}

export interface Line extends BudgetLine {
  /** Lower limit of what it adds to the total: above 0 where it is known to be there. */
  readonly lower: number;
}

/** Lines without which there is no verdict. */
export const ESSENTIAL: ReadonlySet<string> = new Set(["sampling", "source structure", "reference"]);

export type LineMaker = (given: LineCase) => readonly Line[];

/** A line that was not assessed, and that a verdict can do without. */
export function notAssessed(
  line: string,
  kind: BudgetLine["kind"],
  why: string,
  remedy: string | null,
): Line {
  return {
    line,
    kind,
    value: null,
    interval: null,
    basis: `not assessed: ${why}`,
    remedy,
    lower: 0,
  };
}

/** Cells of one problem x source x estimator x output, in order of n. */
import type { Cell } from "../record/types.js";

export interface SeriesName {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly output: string;
}

export interface Series extends SeriesName {
  /** At least one cell, n ascending. */
  readonly cells: readonly Cell[];
  /** The cell with the largest n. */
  readonly last: Cell;
}

/** Text that tells series apart, also those of tests and budgets. */
export function seriesKey(name: SeriesName): string {
  return JSON.stringify([name.problem, name.source, name.estimator, name.output]);
}

/** The four names alone, for a row of the record. */
export function namesOf({ problem, source, estimator, output }: SeriesName): SeriesName {
  return { problem, source, estimator, output };
}

/** Series in the order in which their first cells stand. */
export function seriesOf(cells: readonly Cell[]): Series[] {
  const groups = new Map<string, Cell[]>();
  for (const cell of cells) {
    const key = seriesKey(cell);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [cell]);
    else group.push(cell);
  }
  return [...groups.values()].flatMap((group) => {
    group.sort((a, b) => a.n - b.n);
    const last = group.at(-1);
    return last === undefined ? [] : [{ ...namesOf(last), cells: group, last }];
  });
}

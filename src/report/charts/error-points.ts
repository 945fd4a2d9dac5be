/** Errors against n as a chart needs them: which can stand on a log axis, what they say, and their numbers. */
import { formatCount, formatInterval, formatValue, orDash, withInterval } from "../../findings/format.js";
import type { Cell } from "../../record/types.js";
import type { Row, Subject } from "../view.js";
import { type ChartTable, counted, listed } from "./chart.js";

/** A measured error that can stand on a log axis. */
export interface Point {
  readonly row: Row;
  readonly n: number;
  readonly rmse: number;
  readonly low: number | null;
  readonly high: number | null;
}

/** Errors below this share of the reference are rounding, not sampling: 2^-50, four units in the last place. */
const ROUNDING = 2 ** -50;

/** RMSE, or for a deterministic source the size of its one error. */
function errorOf(row: Row, cell: Cell): number | null {
  if (cell.rmse !== null || !row.view.source.deterministic || cell.bias === null) return cell.rmse;
  return Math.abs(cell.bias);
}

/** The points of a chart, and how many cells are exact or have no finite error. */
export function drawable(rows: readonly Row[]): { points: Point[]; exact: number; missing: number } {
  const points: Point[] = [];
  let [exact, missing] = [0, 0];
  for (const row of rows) {
    for (const cell of row.cells) {
      const rmse = errorOf(row, cell);
      if (rmse === null || !Number.isFinite(rmse)) missing++;
      else if (rmse <= ROUNDING * Math.abs(cell.reference ?? 0)) exact++;
      else {
        const [low, high] = cell.rmseInterval ?? [null, null];
        points.push({ row, n: cell.n, rmse, low: low !== null && low > 0 ? low : null, high });
      }
    }
  }
  return { points, exact, missing };
}

/** Who errs least at the largest n: a source with an error bar, or those that are exact to rounding there. */
function leader(subject: Subject, points: readonly Point[]): string | null {
  const judged = subject.rows.filter((row) => !row.view.source.deterministic);
  const exact = judged.filter(
    (row) =>
      row.last !== null &&
      row.last.rmse !== null &&
      !points.some((p) => p.row === row && p.n === row.last?.n),
  );
  if (exact.length > 0) {
    return `${listed(exact.map((row) => row.label))} ${exact.length === 1 ? "is" : "are"} exact to rounding`;
  }
  const ends = judged.flatMap((row) => points.filter((p) => p.row === row).slice(-1));
  const best = [...ends].sort((x, y) => x.rmse - y.rmse)[0];
  if (best === undefined) return null;
  return `${best.row.label} errs least, by ${formatValue(best.rmse)} at ${formatCount(best.n)} points`;
}

/** The finding of the chart, as its title. */
export function finding(subject: Subject, points: readonly Point[]): string {
  const lead = leader(subject, points);
  if (lead === null) return "No source has an error bar on this problem.";
  const never = subject.rows.filter((row) => row.convergence?.never === true);
  const judged = subject.rows.filter((row) => row.budget !== null && row.budget.verdict !== "none");
  const within = judged.filter((row) => row.budget?.verdict === "within");
  if (never.length > 0) {
    const names = listed(never.map((row) => row.label));
    return `${lead}; ${names} never ${never.length === 1 ? "comes" : "come"} within the tolerance.`;
  }
  if (judged.length === 0) return `${lead}.`;
  if (within.length === judged.length) return `${lead}; every source judged ends within the tolerance.`;
  return `${lead}; ${within.length} of ${judged.length} sources judged end within the tolerance.`;
}

/** The numbers behind the chart. */
export function table(subject: Subject): ChartTable {
  const columns = [
    { title: "Source", align: "left" },
    { title: "n", align: "right" },
    { title: "RMSE", align: "right" },
    { title: "95 % interval", align: "right" },
    { title: "Standard deviation over replicates", align: "right" },
    { title: "Replicates", align: "right" },
  ] as const;
  const rows = subject.rows.flatMap((row) =>
    row.cells.map((cell) => [
      row.label,
      formatCount(cell.n),
      orDash(errorOf(row, cell), (rmse) => withInterval(rmse, cell.rmseInterval)),
      cell.rmseInterval === null ? "–" : formatInterval(cell.rmseInterval),
      orDash(cell.replicateDeviation, formatValue),
      formatCount(cell.replicates),
    ]),
  );
  return { columns, rows };
}

/** What is not drawn, or drawn with a caution. */
export function notes(exact: number, missing: number, rows: readonly Row[]): string[] {
  const heavy = rows.filter((row) => row.cells.some((cell) => cell.heavyTailed)).map((row) => row.label);
  return [
    ...(exact > 0
      ? [
          `${counted(exact, "exact result")} (error 0, or within rounding) cannot stand on the log axis and ${exact === 1 ? "is" : "are"} not drawn.`,
        ]
      : []),
    ...(missing > 0
      ? [`${counted(missing, "cell")} without a finite error ${missing === 1 ? "is" : "are"} not drawn.`]
      : []),
    ...(heavy.length > 0
      ? [`Heavy-tailed errors, so the RMSE is a lower bound only: ${listed(heavy, 6)}.`]
      : []),
  ];
}

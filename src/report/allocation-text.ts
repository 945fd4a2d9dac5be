/** An allocation in words: points for each problem of a weighted sum, beside equal sizes, with the saving. */
import type { Allocation } from "../findings/allocation.js";
import type { AllocationPlan } from "../findings/allocation-plan.js";
import { formatCount, formatPercent, formatSeconds, formatValue } from "../findings/format.js";
import { textTable, type TextColumn } from "./text-table.js";

/** The columns of an allocation's table. */
export const ALLOCATION_COLUMNS: readonly TextColumn[] = [
  { title: "problem", align: "left" },
  { title: "weight", align: "right" },
  { title: "source", align: "left" },
  { title: "points", align: "right" },
  { title: "equal points", align: "right" },
  { title: "deviation in the sum", align: "right" },
  { title: "cost", align: "right" },
];

export function allocationText(plan: AllocationPlan): string {
  const held = `tolerance \u00b1${formatValue(plan.tolerance)} at ${formatPercent(plan.confidence)}`;
  const lines = [`Weighted sum of the suite   ${held}`];
  if (plan.cheapest === null) lines.push(`  No allocation: ${plan.reason ?? "not known"}.`);
  else lines.push(...tableOf(plan.cheapest, plan.equal), `  ${sentenceOf(plan, plan.cheapest)}`);
  if (plan.seconds !== null) {
    const title = `${formatSeconds(plan.seconds)} in all`;
    if (plan.affordable === null) lines.push("", `  ${title}: not enough for the smallest sizes.`);
    else {
      lines.push("", `  ${title} buys a total of ${formatValue(plan.affordable.total)} on the sum:`);
      lines.push(...tableOf(plan.affordable, null));
    }
  }
  return `${lines.join("\n")}\n`;
}

function tableOf(allocation: Allocation, equal: Allocation | null): string[] {
  return textTable(ALLOCATION_COLUMNS, allocationRows(allocation, equal)).map((line) => `  ${line}`);
}

/** The cells of an allocation's table, beside equal points where they are known. */
export function allocationRows(allocation: Allocation, equal: Allocation | null): string[][] {
  return allocation.rows.map((row, i) => [
    row.problem,
    String(row.weight),
    row.source,
    formatCount(row.n) + (row.extrapolated ? " (extrapolated)" : ""),
    equal === null ? "" : formatCount(equal.rows[i]?.n ?? NaN),
    formatValue(row.deviation),
    formatSeconds(row.seconds),
  ]);
}

/** The total and what allocation saves. */
export function sentenceOf(plan: AllocationPlan, cheapest: Allocation): string {
  const total = `Total ${formatValue(cheapest.total)} for ${formatSeconds(cheapest.seconds)}`;
  const bias = cheapest.bias > 0 ? `, of it ${formatValue(cheapest.bias)} known bias` : "";
  if (plan.equal === null || plan.saving === null) return `${total}${bias}.`;
  const saving = plan.saving > 0 ? `, a saving of ${formatPercent(Number(plan.saving.toFixed(2)))}` : "";
  return `${total}${bias}; equal points would cost ${formatSeconds(plan.equal.seconds)}${saving}.`;
}

// A budget's table adds up to its total to the last digit shown, whatever the size.
import { describe, expect, it } from "vitest";
import { budgetTable } from "../../src/report/budget-rows.js";
import type { Budget, BudgetLine } from "../../src/record/types.js";

const line = (name: string, kind: BudgetLine["kind"], value: number | null): BudgetLine => ({
  line: name,
  kind,
  value,
  interval: null,
  basis: "b",
  remedy: null,
});

function budgetOf(lines: readonly BudgetLine[], total: number): Budget {
  const none = { tolerance: 1, confidence: 0.99, totalInterval: null, headroom: null, largestLine: null };
  const names = { problem: "p", source: "s", estimator: "crude", output: "mean", n: 64 };
  return {
    ...names,
    ...none,
    lines,
    total,
    coverageFactor: 2,
    degrees: 31,
    verdict: "within",
    reason: null,
    inUse: false,
  };
}

/** Units of the last place of a text such as 0.0123 or 1.23e−7. */
function units(text: string): number {
  return Number(text.replace(/e.*$/, "").replace(".", ""));
}

describe("the table of a budget", () => {
  it.each([1, 1e-3, 1e-9, 4e4, 1e8])("adds up at a scale of %d", (scale) => {
    const lines = [
      line("sampling", "random", 0.3 * scale),
      line("step", "random", 0.4 * scale),
      line("source structure", "bias", (scale * 1) / 3),
      line("reference", "bias", (scale * 1) / 7),
      line("arithmetic", "bias", null),
      line("period and overlap", "probability", 0.5),
    ];
    // 2 sqrt(0.09 + 0.16) = 1.
    const table = budgetTable(budgetOf(lines, scale * (1 + 1 / 3 + 1 / 7)));
    const added = (table?.rows ?? []).filter(({ adds }) => adds !== "–").map(({ adds }) => units(adds));
    expect(added.reduce((sum, part) => sum + part, 0)).toBe(units(table?.total ?? ""));
    expect(units(table?.total ?? "")).toBeGreaterThanOrEqual(148 - 1);
    expect(table?.rows.map(({ adds }) => adds).slice(4)).toEqual(["–", "–"]);
    expect(table?.rows[4]?.size).toBe("not assessed");
  });

  it("is absent without a total", () => {
    expect(budgetTable({ ...budgetOf([], 0), total: null })).toBeNull();
  });
});

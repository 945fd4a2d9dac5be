/** A budget as rows of text whose parts add up to the total, to the last digit shown. */
import { addingUp, contributionsOf } from "../findings/budget/contributions.js";
import { formatPercent, formatValue } from "../findings/format.js";
import type { Budget, BudgetLine } from "../record/types.js";

export interface BudgetRow {
  readonly line: string;
  readonly kind: string;
  readonly size: string;
  /** What it adds to the total. */
  readonly adds: string;
  readonly basis: string;
  readonly remedy: string;
}

export interface BudgetTable {
  readonly rows: readonly BudgetRow[];
  readonly total: string;
  /** By what the random lines together are multiplied, and what that assumes. */
  readonly coverage: string;
}

const KINDS: Readonly<Record<BudgetLine["kind"], string>> = {
  bias: "bound of a bias",
  random: "standard deviation",
  probability: "probability, not spent",
};

/** null where the budget has no total. */
export function budgetTable({
  lines,
  total,
  coverageFactor,
  degrees,
  confidence,
}: Budget): BudgetTable | null {
  if (total === null || coverageFactor === null || !Number.isFinite(total)) return null;
  const contributions = contributionsOf(lines, coverageFactor);
  const write = writer(total);
  const shown = addingUp(contributions, write.places);
  return {
    rows: lines.map(({ line, kind, value, basis, remedy }, i) => ({
      line,
      kind: KINDS[kind],
      size: value === null ? "not assessed" : formatValue(value),
      adds: value === null || kind === "probability" ? "–" : write.text(shown.parts[i] ?? 0),
      basis,
      remedy: remedy ?? "–",
    })),
    total: write.text(shown.total),
    coverage:
      `k = ${coverageFactor.toFixed(2)} at ${formatPercent(confidence)}` +
      (degrees === null ? "" : ` (${Math.round(degrees)} degrees of freedom)`),
  };
}

/** Three digits of the total, and all parts at its places; with the total's exponent below 1e-4 and from 1e6 on. */
function writer(total: number): { places: number; text: (value: number) => string } {
  const exponent = total > 0 ? Math.floor(Math.log10(total)) : 0;
  const places = 2 - exponent;
  if (exponent >= -4 && exponent < 6) return { places, text: (value) => value.toFixed(Math.max(0, places)) };
  const sign = exponent < 0 ? "\u2212" : "";
  const scale = 10 ** exponent;
  return { places, text: (value) => `${(value / scale).toFixed(2)}e${sign}${Math.abs(exponent)}` };
}

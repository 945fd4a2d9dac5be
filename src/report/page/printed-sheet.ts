/** What stands on the printed sheet of a problem and not on the screen: one budget line by line, and what it does not say. */
import { budgetTable } from "../budget-rows.js";
import type { Subject } from "../view.js";
import { verdictRows } from "../verdict-row.js";
import { dataTable } from "./figure.js";
import { type Markup, html } from "./html.js";

/** Charts that the sheet has room for; the others are on the screen only. */
export function isPrinted(chart: string, { slug }: Pick<Subject, "slug">): boolean {
  return chart === `error-against-n-${slug}` || chart === `budget-${slug}`;
}

/** The budget of the source in use, or of the cheapest one; null where neither has a total. */
function chosenBudget(subject: Subject): { readonly title: string; readonly table: Markup } | null {
  const [cheapest] = verdictRows(subject);
  const { inUse } = subject;
  const budget = inUse ?? cheapest?.row.budget ?? null;
  const table = budget === null ? null : budgetTable(budget);
  if (table === null) return null;
  const columns = [
    { title: "Line", align: "left" },
    { title: "Size is", align: "left" },
    { title: "Size", align: "right" },
    { title: "Adds", align: "right" },
  ] as const;
  const rows = table.rows.map(({ line, kind, size, adds }) => [line, kind, size, adds]);
  const label = inUse === null ? (cheapest?.row.label ?? "") : `${inUse.source}, in use`;
  return {
    title: `Budget of ${label}: ${table.coverage}`,
    table: dataTable({ columns, rows: [...rows, ["total", "", "", table.total]] }),
  };
}

export function printedSheet(subject: Subject): Markup {
  const chosen = chosenBudget(subject);
  return html`<div class="printed">
    ${
      chosen !== null &&
      html`<h4>${chosen.title}</h4>
        ${chosen.table}`
    }
    <p class="aside">
      This sheet bounds the numerical error of the integral, not the model. It supports, and never replaces,
      the firm's own rules on model risk, the codes that apply where the result is used, and the judgement of
      those licensed to practise there. “No bias found” speaks of biases above the detectable one only. None
      of these sources is for cryptography. Other figures and the reasons are in the page itself.
    </p>
  </div>`;
}

/** Which inputs matter, in words: beside the chart of the same finding, or in place of it the reason why there is none. */
import { pairsTable, sensitivityLines } from "../../findings/sensitivity-words.js";
import type { Subject } from "../view.js";
import { dataTable } from "./figure.js";
import { type Markup, html } from "./html.js";
import { tied } from "./parts.js";

/** Pairs listed at most; the record holds all. */
const MOST_PAIRS = 10;

/** null where it was not asked. */
export function inputsBlock({
  sensitivity,
  problem,
}: Pick<Subject, "sensitivity" | "problem">): Markup | null {
  if (sensitivity === null) return null;
  if (sensitivity.measures === null)
    return html`<p class="aside">Inputs: ${tied(sensitivity.reason ?? "not known")}.</p>`;
  const pairs = pairsTable(sensitivity, MOST_PAIRS);
  return html`<h4>How the inputs act, and what that leaves to gain</h4>
    <ul>
      ${sensitivityLines(sensitivity, problem).map((line) => html`<li>${tied(line)}</li> `)}
    </ul>
    ${
      pairs.rows.length > 0 &&
      html`<details>
        <summary>Pairs that do something only together</summary>
        ${dataTable(pairs)}
      </details>`
    }`;
}

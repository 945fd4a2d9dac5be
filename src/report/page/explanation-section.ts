/** Why a bias is there: the finding, its figures, and what the structure of the other sources could still spoil. */
import {
  explanationHeadline,
  explanationLines,
  hazardText,
  structureText,
} from "../../findings/explanation-words.js";
import { resolutionTable, resolutionTitle } from "../../findings/resolution-words.js";
import { formatCount } from "../../findings/format.js";
import type { Chart } from "../charts/chart.js";
import type { ExplainedRow, Row, Subject } from "../view.js";
import { dataTable, figure } from "./figure.js";
import { type Markup, html } from "./html.js";
import { sourceName, tied } from "./parts.js";

function capital(text: string): string {
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}`;
}

/** The block of one explained bias. */
export async function explanationBlock(row: ExplainedRow, charts: readonly Chart[]): Promise<Markup> {
  const figures: Markup[] = [];
  for (const chart of charts) figures.push(await figure(chart));
  const { structure, resolution } = row.explanation;
  return html`<div class="why" id="why-${row.slug}">
    <h4>Why ${sourceName(row.row.view, row.row.label)} errs here</h4>
    <p>${tied(explanationHeadline(row.explanation))}</p>
    <ul>
      ${explanationLines(row.explanation).map((line) => html`<li>${tied(line)}</li> `)}
    </ul>
    ${
      structure !== null &&
      html`<p class="aside">
        ${capital(structureText(structure))}.${
          structure.kind !== "net" &&
          structure.kind !== "rank-1" &&
          " An estimate of any number of points, averaged over random starts, is the average over all of these points."
        }
      </p>`
    }
    ${figures}
    ${
      resolution !== null &&
      html`<details>
        <summary>${tied(sentence(resolutionTitle(resolution)))}</summary>
        ${dataTable(resolutionTable(resolution))}
      </details>`
    }
  </div>`;
}

function sentence(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** A link to the block, for a verdict that structure explains; null where there is none. */
export function whyLink(row: ExplainedRow | undefined): Markup | null {
  const alias = row?.explanation.aliases[0];
  if (row === undefined || alias === undefined || !row.explanation.explained) return null;
  const words = alias.planes === null ? "why" : `why: ${formatCount(alias.planes)} planes`;
  return html`<a href="#why-${row.slug}">${words.replaceAll(" ", "\u00a0")}</a>`;
}

/** What the structure of sources without a confirmed bias could still spoil; null where there is none. */
export function hazards(subject: Subject): Markup | null {
  const rows = subject.rows.flatMap((row): { row: Row; text: string }[] => {
    const { explanation } = row;
    if (explanation === null || explanation.predicted !== null) return [];
    const text = hazardText(explanation);
    return text === null ? [] : [{ row, text: `${explanation.reason ?? ""}; ${text}` }];
  });
  if (rows.length === 0) return null;
  return html`<details>
    <summary>What known structure could still spoil</summary>
    <ul>
      ${rows.map(({ row, text }) => html`<li>${sourceName(row.view, row.label)}: ${tied(text)}.</li> `)}
    </ul>
  </details>`;
}

/** A chart in the page: its finding, what is plotted, the drawing, how to read it, its numbers and its file. */
import type { Chart, ChartTable } from "../charts/chart.js";
import { drawForPage } from "../render.js";
import { escapeHtml, type Markup, html, raw } from "./html.js";
import { tied } from "./parts.js";

/**
 * A table of text cells; numbers to the right. HTML ends a cell where the next begins, so their end tags are left out: 250 KB
 * of the page of twenty problems by twenty sources.
 */
export function dataTable(table: ChartTable): Markup {
  const classOf = (j: number): string => (table.columns[j]?.align === "right" ? ` class="num"` : "");
  const kind = (j: number): Markup => raw(classOf(j));
  return html`<div class="scroll" role="group" aria-label="Table">
    <table>
      <thead>
        <tr>
          ${table.columns.map((column, j) => html`<th scope="col" ${kind(j)}>${column.title}</th>`)}
        </tr>
      </thead>
      <tbody>
        ${table.rows.map(
          (row) =>
            html`<tr>
              ${row.map((text, j) => raw(`<td${classOf(j)}>${escapeHtml(text)}`))}
            </tr> `,
        )}
      </tbody>
    </table>
  </div>`;
}

/** The figure of `chart`; one that is not printed is on the screen only. */
export async function figure(chart: Chart, printed = true): Promise<Markup> {
  const drawing = raw(await drawForPage(chart));
  return html`<figure class="${printed ? "wide" : "wide screen"}" id="${chart.name}">
    <h4>${tied(chart.title)}</h4>
    <p class="says">${chart.says}</p>
    <div class="scroll" role="group" aria-label="Figure: ${chart.title}">${drawing}</div>
    ${chart.notDrawn.map((note) => html`<p class="aside">${note}</p>`)}
    <figcaption>${tied(chart.caption)}</figcaption>
    <details>
      <summary>The numbers</summary>
      ${dataTable(chart.table)}
    </details>
    <p class="aside file">
      <a href="charts/${chart.name}.vl.json">${chart.name}.vl.json</a> (the chart as a Vega-Lite
      specification)
    </p>
  </figure> `;
}

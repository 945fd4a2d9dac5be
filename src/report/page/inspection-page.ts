/** The page of an inspection: what stands out in a line per source, figures over all sources, then source by source. */
import type { Part } from "../../structure/contract.js";
import { setText } from "../../structure/sections/text.js";
import type { Chart } from "../charts/chart.js";
import type { InspectedView } from "../inspection-view.js";
import { dataTable, figure } from "./figure.js";
import { type Markup, html } from "./html.js";
import { tied } from "./parts.js";
import { shell } from "./shell.js";

export interface InspectionCharts {
  readonly across: readonly Chart[];
  readonly bySource: ReadonlyMap<string, readonly Chart[]>;
}

export function inspectionTitle(items: readonly InspectedView[]): string {
  const [first] = items;
  if (first !== undefined && items.length === 1) return `Structure of ${first.inspection.choice.id}`;
  return `Structure of ${items.length} sources`;
}

/** The text of index.html; `command` repeats it. */
export async function inspectionPage(
  items: readonly InspectedView[],
  charts: InspectionCharts,
  command: string,
): Promise<string> {
  const title = inspectionTitle(items);
  const across: Markup[] = [];
  for (const chart of charts.across) across.push(await figure(chart));
  const sections: Markup[] = [];
  for (const item of items) sections.push(await sourceOf(item, charts.bySource.get(item.view.slug) ?? []));
  return shell({
    title,
    contents: html`<nav aria-label="Contents">
      <ol>
        <li><a href="#answer">What stands out</a></li>
        ${across.length > 0 && html`<li><a href="#across">By dimension and by bit</a></li> `}
        <li class="part">
          <a href="#sources">Source by source</a>
          <ol>
            ${items.map(({ view }) => html`<li><a href="#source-${view.slug}">${view.source.id}</a></li> `)}
          </ol>
        </li>
      </ol>
    </nav>`,
    main: html`<header><h1>${title}</h1></header>
      <section id="answer">
        <h2>What stands out</h2>
        <ul>
          ${items.map((item) => html`<li>${tied(standsOut(item))}</li> `)}
        </ul>
        <p class="soft">To repeat it: <code>${command}</code></p>
      </section>
      ${
        across.length > 0 &&
        html`<section id="across">
          <h2>By dimension and by bit</h2>
          ${across}
        </section>`
      }
      <section id="sources">
        <h2>Source by source</h2>
        ${sections}
      </section>`,
    after: null,
    script: null,
  });
}

/** One sentence on a source: its worst dimension or pair of coordinates, or how even its bits are. */
function standsOut({ inspection }: InspectedView): string {
  const { choice, findings, parts } = inspection;
  const { worstFigure, dual, order } = findings.dual ?? { worstFigure: null, dual: [], order: 1 };
  const worst = dual.find(({ dimension }) => dimension === worstFigure?.dimension && dimension > order - 1);
  if (worstFigure !== null && worst !== undefined) {
    const planes = `${worst.l1Complete ? "" : "at most "}${worst.hyperplanes}`;
    return `${choice.id}: tuples of ${order > 1 ? `more than ${order} outputs` : "outputs or coordinates"} lie on planes; worst in dimension ${worst.dimension}, where ${planes} planes hold them, ${worst.gap.toPrecision(3)} apart at the widest (S = ${worstFigure.figure.toPrecision(3)}).`;
  }
  const pairs = findings.net?.netPairs ?? null;
  const [pair] = pairs?.worst ?? [];
  if (pairs !== null && pair !== undefined) {
    return `${choice.id}: worst pair of coordinates ${setText(pair.indices)} of ${pairs.dimension}, counted from 0: t = ${pair.t} for ${pairs.base}^${pairs.digits} points.`;
  }
  const part = parts.find(({ title }) => title === "Equidistribution") ?? parts[0];
  return `${choice.id}: ${part === undefined ? "" : `${part.title.toLowerCase()}: ${part.lines[0] ?? part.notes[0] ?? ""}`}`;
}

async function sourceOf({ view, inspection }: InspectedView, charts: readonly Chart[]): Promise<Markup> {
  const figures: Markup[] = [];
  for (const chart of charts) figures.push(await figure(chart));
  const { source } = view;
  return html`<section class="item" id="source-${view.slug}">
    <h3>${source.id}</h3>
    <p>${source.title}. <span class="soft">${source.citation}.</span></p>
    ${figures} ${inspection.parts.map(partOf)}
    ${
      inspection.missing.length > 0 &&
      html`<h4>Not computed</h4>
        <ul>
          ${inspection.missing.map((why) => html`<li>${why}</li> `)}
        </ul>`
    }
  </section> `;
}

function partOf({ title, lines, table, notes }: Part): Markup {
  return html`<h4>${title}</h4>
    ${lines.map((line) => html`<p>${tied(line)}</p> `)} ${table !== null && dataTable(table)}
    ${notes.map((note) => html`<p class="aside">${tied(note)}</p> `)}`;
}

/** The page of a study: its contents, its sections, and what the script needs. */
import { type ChartSet } from "../charts/index.js";
import { formatCount } from "../../findings/format.js";
import type { View } from "../view.js";
import { answerSection } from "./answer.js";
import { figure } from "./figure.js";
import { type Markup, embeddedJson, html, raw } from "./html.js";
import { methodSection } from "./method.js";
import { problemSection } from "./problem-section.js";
import { PAGE_SCRIPT } from "./script.js";
import { sourceSection } from "./source-section.js";
import { shell } from "./shell.js";

function contents(view: View, across: boolean): Markup {
  return html`<nav aria-label="Contents">
    <ol>
      <li><a href="#answer">The answer</a></li>
      <li class="part">
        <a href="#problems">Problem by problem</a>
        <ol>
          ${view.subjects.map(
            (s, i) => html`<li data-p="${i}"><a href="#problem-${s.slug}">${s.title}</a></li> `,
          )}
        </ol>
      </li>
      <li class="part">
        <a href="#sources">Source by source</a>
        <ol>
          ${view.sources.map((s) => html`<li><a href="#source-${s.slug}">${s.source.id}</a></li> `)}
        </ol>
      </li>
      ${across && html`<li><a href="#across">Across all problems</a></li> `}
      <li><a href="#method">How this was done</a></li>
    </ol>
  </nav>`;
}

/** The title of a report: the one problem's, or how many there are. */
export function reportTitle(view: View): string {
  const [first] = view.subjects;
  if (first !== undefined && view.subjects.length === 1) return first.title;
  return `Error of integration on ${formatCount(view.subjects.length)} problems`;
}

/** The text of index.html. */
export async function page(view: View, charts: ChartSet): Promise<string> {
  const problems: Markup[] = [];
  for (const [i, subject] of view.subjects.entries()) {
    const explained = view.explained
      .filter((row) => row.subject === subject)
      .map((row) => ({ row, charts: charts.byExplanation.get(row.slug) ?? [] }));
    problems.push(await problemSection(subject, i, charts.bySubject.get(subject.slug) ?? [], explained));
  }
  const across: Markup[] = [];
  for (const chart of charts.across) across.push(await figure(chart));
  const facts = {
    sources: view.sources.map((s) => ({ id: s.source.id, anchor: `source-${s.slug}` })),
    problems: view.subjects.map((s) => ({ id: s.problem.id, title: s.title })),
  };
  const title = reportTitle(view);
  return shell({
    title,
    contents: contents(view, across.length > 0),
    main: html`<header>
        <h1>${title}</h1>
        <p class="soft">
          ${formatCount(view.sources.length)} sources of points, ${formatCount(view.record.cells.length)}
          measurements, seed ${view.record.spec.seed}.
          <a href="#provenance">How to repeat it</a>.
        </p>
      </header>
      ${answerSection(view)}
      <section id="problems" data-section>
        <h2>Problem by problem</h2>
        ${problems}
      </section>
      <section id="sources" data-section>
        <h2>Source by source</h2>
        ${view.sources.map((source) => sourceSection(view, source))}
      </section>
      ${
        across.length > 0 &&
        html`<section id="across" data-section>
          <h2>Across all problems</h2>
          ${across}
        </section>`
      }
      ${methodSection(view)}`,
    after: html`<p id="following" role="status" hidden>
        Following <strong id="following-name"></strong> through all figures.
        <a id="following-about" href="#sources">About this source</a>
        <button id="stop" type="button">Stop (Esc)</button>
      </p>
      <div id="tip" role="tooltip" hidden></div>
      ${raw(`<script type="application/json" id="facts">${embeddedJson(facts)}</script>`)}`,
    script: PAGE_SCRIPT,
  });
}

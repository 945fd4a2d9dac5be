/** The first section: one sentence per problem, and the verdicts of every problem and source. */
import { formatCount } from "../../findings/format.js";
import type { Subject, View } from "../view.js";
import { type Markup, html } from "./html.js";
import { sourceName, tied, verdictMark } from "./parts.js";

/** From this many sources on, column titles stand upright. */
const MANY = 9;

/** The n at which most sources of a subject are judged. */
function usualSize(subject: Subject): number {
  const counts = new Map<number, number>();
  for (const row of subject.rows) {
    const n = row.budget?.n ?? row.last?.n ?? 0;
    counts.set(n, (counts.get(n) ?? 0) + 1);
  }
  return [...counts].sort((a, b) => b[1] - a[1] || a[0] - b[0])[0]?.[0] ?? 0;
}

function verdictTable(view: View): Markup {
  const labels = new Map(view.subjects.flatMap((s) => s.rows.map((row) => [row.label, row.view] as const)));
  const columns = view.sources
    .flatMap((source) => [...labels].filter(([, owner]) => owner === source))
    .map(([label, owner]) => ({ label, owner }));
  const used = view.subjects.some((subject) => subject.inUse !== null);
  const rows = view.subjects.map((subject, i) => {
    const usual = usualSize(subject);
    const cells = columns.map(({ label }) => {
      const row = subject.rows.find((r) => r.label === label);
      if (row === undefined) return html`<td></td>`;
      const n = row.budget?.n ?? row.last?.n ?? 0;
      const apart = n > 1.5 * usual || n < usual / 1.5;
      const why = view.explained.find((one) => one.row === row && one.explanation.explained);
      return html`<td>
        ${verdictMark(row.budget?.verdict ?? "none")}${
          why !== undefined && html`<br /><a href="#why-${why.slug}">why</a>`
        }${apart && html`<br /><span class="soft">at ${formatCount(n)}</span>`}
      </td>`;
    });
    const inUse = subject.inUse;
    const own = !used
      ? null
      : inUse === null
        ? html`<td></td>`
        : html`<td>${verdictMark(inUse.verdict)}</td>`;
    return html`<tr data-p="${i}">
      <th scope="row"><a href="#problem-${subject.slug}">${subject.title}</a></th>
      ${own}${cells}
    </tr> `;
  });
  const many = columns.length >= MANY ? " many" : "";
  return html`<div class="scroll wide" role="group" aria-label="Verdicts">
    <table class="verdicts${many}">
      <thead>
        <tr>
          <th scope="col">Problem</th>
          ${used && html`<th scope="col" class="src"><span>in use</span></th>`}${columns.map(
            (c) => html`<th scope="col" class="src"><span>${sourceName(c.owner, c.label)}</span></th>`,
          )}
        </tr>
      </thead>
      <tbody>
        ${rows}
      </tbody>
    </table>
  </div>`;
}

function controls(view: View): Markup {
  return html`<div class="controls" id="controls" hidden>
    <label
      >Problems with the words <input id="filter" type="search" autocomplete="off" />
      <span id="shown" role="status"></span
    ></label>
    <label
      >Follow
      <select id="follow">
        <option value="">no source</option>
        ${view.sources.map((s) => html`<option value="${s.index}">${s.source.id}</option>`)}
      </select></label
    >
  </div>`;
}

/** The section. */
export function answerSection(view: View): Markup {
  const sentences = view.subjects.map((subject, i) => {
    const used = subject.inUseSentence;
    return html`<li data-p="${i}">
      <strong><a href="#problem-${subject.slug}">${subject.title}</a>.</strong> ${
        used !== null && html`${tied(used)} `
      }${tied(subject.answer)}
    </li> `;
  });
  const incomplete = view.record.environment.complete
    ? null
    : html`<p><strong>The run was interrupted.</strong> This report holds what was done until then.</p>`;
  return html`<section id="answer" data-section>
    <h2>The answer</h2>
    ${incomplete}
    <ul class="answers">
      ${sentences}
    </ul>
    ${controls(view)} ${verdictTable(view)}
    <p class="aside">
      ● within: the error, taken together, keeps the tolerance with the stated confidence. ◆ outside: it does
      not. ◐ undecided: the interval of the total straddles the tolerance. – none: no error bar, so no
      verdict. Each source is judged at its largest n; where that is not the n of the others in its row, it
      stands below.
    </p>
  </section>`;
}

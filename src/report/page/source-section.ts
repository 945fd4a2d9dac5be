/** The section of one source: what it is, what is known of it, and where it fails in this study. */
import { formatCount, formatValue, orDash, signed } from "../../findings/format.js";
import type { Verdict } from "../../record/types.js";
import { listed } from "../charts/chart.js";
import type { Row, SourceView, Subject, View } from "../view.js";
import { reachWords, totalWords } from "../verdict-row.js";
import { whyLink } from "./explanation-section.js";
import { type Markup, html } from "./html.js";
import { verdictMark } from "./parts.js";

interface Met {
  readonly subject: Subject;
  readonly row: Row;
}

function meetings(view: View, source: SourceView): Met[] {
  return view.subjects.flatMap((subject) =>
    subject.rows.filter((row) => row.view === source).map((row) => ({ subject, row })),
  );
}

function inSum(met: readonly Met[]): string {
  const titles = (verdict: Verdict): string[] =>
    met.filter(({ row }) => (row.budget?.verdict ?? "none") === verdict).map(({ subject }) => subject.title);
  const [outside, undecided, within] = [titles("outside"), titles("undecided"), titles("within")];
  const biased = met.filter(({ row }) => row.test?.confirmed === true).map(({ subject }) => subject.title);
  if (outside.length + undecided.length + within.length === 0)
    return "No verdict on any problem of this study.";
  const parts = [
    outside.length > 0 ? `Outside the tolerance on ${listed(outside)}` : "",
    biased.length > 0 ? `a bias is confirmed on ${listed(biased)}` : "",
    undecided.length > 0 ? `undecided on ${listed(undecided)}` : "",
    within.length > 0 ? `within on ${within.length === met.length ? "every problem" : listed(within)}` : "",
  ].filter((part) => part !== "");
  const text = parts.join("; ");
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}

function facts({ source, family }: SourceView): Markup {
  const period =
    source.period === null
      ? null
      : source.period.length <= 21
        ? wholeFigures(source.period)
        : `about ${formatValue(Number(source.period))}`;
  const randomised =
    source.randomisations.length > 0
      ? source.randomisations.join(", ")
      : source.deterministic
        ? "none: one deterministic row"
        : null;
  return html`<dl>
    <dt>Family</dt>
    <dd>
      ${family.title}, ${source.method}
      <span class="soft">(drawn as ${family.shapeWord}, ${family.dashWord})</span>
    </dd>
    ${
      randomised !== null &&
      html`<dt>Randomisation</dt>
        <dd>${randomised}</dd> `
    }${
      period !== null &&
      html`<dt>Period</dt>
        <dd>${period}</dd> `
    }
    <dt>Output bits</dt>
    <dd>${source.outputBits}</dd>
    <dt>Known structure</dt>
    <dd>${source.knownStructure ?? "none that is held against it"}</dd>
    <dt>Published in</dt>
    <dd>${source.citation}</dd>
  </dl>`;
}

function wholeFigures(digits: string): string {
  return digits.replace(/\B(?=(\d{3})+(?!\d))/g, ",");
}

/** The section of `source`. */
export function sourceSection(view: View, source: SourceView): Markup {
  const met = meetings(view, source);
  const rows = met.map(({ subject, row }) => {
    const tested = row.cells.find((cell) => cell.n === row.test?.n) ?? row.last;
    const bias = orDash(tested?.bias, (value) => signed(value, tested?.biasStandardError ?? null));
    const why = whyLink(view.explained.find((one) => one.row === row));
    const detectable = orDash(row.test?.detectableBias, formatValue);
    return html`<tr data-p="${view.subjects.indexOf(subject)}">
      <td>${verdictMark(row.budget?.verdict ?? "none")}</td>
      <th scope="row"><a href="#problem-${subject.slug}">${subject.title}</a></th>
      <td class="num">${formatCount(row.budget?.n ?? row.last?.n ?? 0)}</td>
      <td class="num">${totalWords(row.budget)}</td>
      <td class="num">
        ${bias}${row.test?.confirmed === true && " ◆ confirmed"}${why !== null && html`<br />${why}`}
      </td>
      <td class="num">${detectable}</td>
      <td class="num">${reachWords(row.convergence)}</td>
    </tr> `;
  });
  return html`<section class="item" id="source-${source.slug}" data-section>
    <h3>${source.source.id}</h3>
    <p>${source.source.title}. ${inSum(met)}</p>
    ${facts(source)}
    <div class="scroll wide" role="group" aria-label="${source.source.id} on each problem">
      <table>
        <thead>
          <tr>
            <th scope="col">Verdict</th>
            <th scope="col">Problem</th>
            <th scope="col" class="num">at n</th>
            <th scope="col" class="num">Total error</th>
            <th scope="col" class="num">Bias</th>
            <th scope="col" class="num">Detectable bias</th>
            <th scope="col" class="num">n to tolerance</th>
          </tr>
        </thead>
        <tbody>
          ${rows}
        </tbody>
      </table>
    </div>
  </section> `;
}

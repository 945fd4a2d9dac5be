/** The section of one problem: it stands alone, and prints on one page for an ordinary number of sources. */
import { budgetTable } from "../budget-rows.js";
import type { Input } from "../../problem/contract.js";
import type { Chart } from "../charts/chart.js";
import { jsonText } from "../../record/json.js";
import {
  formatCount,
  formatParameters,
  formatPValue,
  formatValue,
  plainNumber,
} from "../../findings/format.js";
import type { ExplainedRow, Subject } from "../view.js";
import { reachWords, referenceWords, toleranceWords, verdictRows } from "../verdict-row.js";
import { inputsBlock } from "./inputs-section.js";
import { explanationBlock, hazards, whyLink } from "./explanation-section.js";
import { dataTable, figure } from "./figure.js";
import { type Markup, html } from "./html.js";
import { isPrinted, printedSheet } from "./printed-sheet.js";
import { paragraphs, sourceName, tied, verdictMark } from "./parts.js";

function inputWords(input: Input): string {
  return `${input.name}: ${input.length === null ? "" : `${formatCount(input.length)} `}${input.distribution}${formatParameters(input.parameters)}`;
}

/** Constants longer than this are cut; the record holds them whole. */
const LONGEST_CONSTANT = 120;

function constantWords(name: string, value: unknown): string {
  const text = typeof value === "number" ? plainNumber(value, 17) : jsonText(value);
  return `${name} = ${text.length > LONGEST_CONSTANT ? `${text.slice(0, LONGEST_CONSTANT)}… (cut)` : text}`;
}

function referenceBasis(subject: Subject): Markup | null {
  const own = subject.problem.reference;
  if (own !== null) {
    const exact =
      own.uncertainty > 0
        ? `standard uncertainty ${formatValue(own.uncertainty)}`
        : "exact to double precision";
    return html`<br /><span class="soft">${own.basis.trim().replace(/\.$/, "")}; ${exact}</span>`;
  }
  const consensus = subject.consensus;
  if (consensus === null) return null;
  const members = consensus.members.map((m) => m.source).join(", ");
  const agreement = consensus.agreed ? "they agree" : "they do not agree";
  const error =
    consensus.standardError === null ? "" : `; standard error ${formatValue(consensus.standardError)}`;
  return html`<br /><span class="soft"
      >No reference was given; it stands on ${members}; ${agreement} (Cochran's Q ${formatValue(consensus.q)},
      p = ${formatPValue(consensus.pValue)})${error}</span
    >`;
}

function facts(subject: Subject): Markup {
  const { problem } = subject;
  const constants = Object.entries(problem.constants).map(([name, value]) => constantWords(name, value));
  return html`<dl>
    <dt>Inputs</dt>
    <dd>${problem.inputs.map(inputWords).join("; ")} (d = ${formatCount(problem.dimension)})</dd>
    ${
      constants.length > 0 &&
      html`<dt>Constants</dt>
        <dd>${constants.join("; ")}</dd> `
    }
    <dt>Integrand</dt>
    <dd><pre>${problem.integrand.trimEnd()}</pre></dd>
    <dt>Reference</dt>
    <dd>${referenceWords(subject)}${referenceBasis(subject)}</dd>
    <dt>Tolerance</dt>
    <dd>${toleranceWords(subject)}</dd>
  </dl>`;
}

function ranking(subject: Subject, explained: readonly ExplainedRow[]): Markup {
  const rows = verdictRows(subject).map((r) => {
    const why = whyLink(explained.find(({ row }) => row === r.row));
    return html`<tr data-s="${r.row.view.index}">
      <td>${verdictMark(r.row.budget?.verdict ?? "none")}</td>
      <th scope="row">${sourceName(r.row.view, r.row.label)}</th>
      <td class="num">${r.n}</td>
      <td class="num">${r.total}</td>
      <td>${r.largestLine}${why !== null && html`<br />${why}`}</td>
      <td class="num">${r.reach}</td>
      <td class="num">${r.cost}</td>
    </tr> `;
  });
  return html`<h4>Sources by cost to tolerance</h4>
    <div class="scroll wide" role="group" aria-label="Sources by cost to tolerance">
      <table>
        <thead>
          <tr>
            <th scope="col">Verdict</th>
            <th scope="col">Source</th>
            <th scope="col" class="num">at n</th>
            <th scope="col" class="num">Total error</th>
            <th scope="col">Largest line</th>
            <th scope="col" class="num">n to tolerance</th>
            <th scope="col" class="num">Cost</th>
          </tr>
        </thead>
        <tbody>
          ${rows}
        </tbody>
      </table>
    </div>
    <p class="aside">
      The total error adds the lines of the budget at the problem's confidence, in units of the quantity. An n
      to tolerance is read off the fitted curve; cost is the time of one thread for it.
    </p>`;
}

function budgets(subject: Subject): Markup {
  // Lines that are the same for all sources are explained once.
  const seen = new Set<string>();
  const once = (text: string): string => {
    if (text.length < 20 || !seen.has(text)) return (seen.add(text), text);
    return "as above";
  };
  const rows = subject.rows.flatMap((row) => {
    const table = row.budget === null ? null : budgetTable(row.budget);
    if (table === null) return [];
    return [
      ...table.rows.map(({ line, kind, size, adds, basis, remedy }) => [
        row.label,
        line,
        kind,
        size,
        adds,
        once(basis),
        once(remedy),
      ]),
      [row.label, "total", "", "", table.total, table.coverage, ""],
    ];
  });
  const columns = [
    { title: "Source", align: "left" },
    { title: "Line", align: "left" },
    { title: "Size is", align: "left" },
    { title: "Size", align: "right" },
    { title: "Adds", align: "right" },
    { title: "How it was found", align: "left" },
    { title: "What would reduce it", align: "left" },
  ] as const;
  return html`<details>
    <summary>What each total is made of</summary>
    <p class="aside">
      Bounds of biases add in full; standard deviations add in quadrature, times the coverage factor k
      (Student's t; it assumes normal errors), and are shown by their share. What is added sums to the total
      to the last digit shown; a line shown as zero is smaller than that digit.
    </p>
    ${dataTable({ columns, rows })}
  </details>`;
}

function remarks(subject: Subject): Markup[] {
  const broken = subject.rows.flatMap((row) => {
    const worst = [...row.cells].reverse().find((cell) => cell.nonFinite !== null);
    if (!worst?.nonFinite) return [];
    const { count, first } = worst.nonFinite;
    const inputs = first.inputs.slice(0, 6).map((v) => plainNumber(v, 6));
    const more = first.inputs.length > 6 ? ", …" : "";
    return [
      html`<p class="aside">
        ${row.label}: ${formatCount(count)} non-finite values at n = ${formatCount(worst.n)}; the first is
        ${first.value} in replicate ${first.replicate}, point ${first.index}, inputs
        (${inputs.join(", ")}${more}).
      </p>`,
    ];
  });
  const reasons = new Map<string, string[]>();
  for (const row of subject.rows) {
    const { budget } = row;
    if (budget === null || budget.reason === null) continue;
    const key = `${budget.verdict === "none" ? "no verdict" : budget.verdict} (${budget.reason})`;
    reasons.set(key, [...(reasons.get(key) ?? []), row.label]);
  }
  const why = [...reasons].map(
    ([reason, labels]) => html`<p class="aside">${labels.join(", ")}: ${reason}.</p>`,
  );
  return [...why, ...broken];
}

/** The section of `subject` with its charts. */
export async function problemSection(
  subject: Subject,
  at: number,
  charts: readonly Chart[],
  explained: readonly { readonly row: ExplainedRow; readonly charts: readonly Chart[] }[],
): Promise<Markup> {
  const figures: Markup[] = [];
  for (const chart of charts) figures.push(await figure(chart, isPrinted(chart.name, subject)));
  const reasons: Markup[] = [];
  for (const one of explained) reasons.push(await explanationBlock(one.row, one.charts));
  const used = subject.inUseSentence;
  const intervals = subject.rows.filter((row) => (row.convergence?.reach?.interval ?? null) !== null);
  const reach = intervals.map((row) => {
    const [low, high] = row.convergence?.reach?.interval ?? [0, 0];
    return [row.label, reachWords(row.convergence), `${formatCount(low)} to ${formatCount(high)}`];
  });
  const reachColumns = [
    { title: "Source", align: "left" },
    { title: "n to tolerance", align: "right" },
    { title: "95 % interval", align: "right" },
  ] as const;
  return html`<section class="item problem" id="problem-${subject.slug}" data-section data-p="${at}">
    <h3>${subject.title}</h3>
    <p>${used !== null && html`${tied(used)} `}${tied([subject.answer, ...subject.biases].join(" "))}</p>
    ${paragraphs(subject.problem.about)} ${facts(subject)}
    ${ranking(
      subject,
      explained.map(({ row }) => row),
    )}
    ${remarks(subject)} ${budgets(subject)}
    ${
      reach.length > 0 &&
      html`<details>
        <summary>n to tolerance with its interval</summary>
        ${dataTable({ columns: reachColumns, rows: reach })}
      </details>`
    }
    ${hazards(subject)} ${printedSheet(subject)} ${figures}
    <div class="screen">${inputsBlock(subject)} ${reasons}</div>
  </section> `;
}

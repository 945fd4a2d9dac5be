/** The page of a plan: what is recommended, then each problem with its table and chart, then the allocation. */
import type { AllocationPlan } from "../../findings/allocation-plan.js";
import { formatPercent, formatValue } from "../../findings/format.js";
import type { ProblemPlan } from "../../findings/plan.js";
import { ALLOCATION_COLUMNS, allocationRows, sentenceOf } from "../allocation-text.js";
import type { Chart } from "../charts/chart.js";
import { PLAN_COLUMNS, planRow, planTask, sentencesOf } from "../plan-text.js";
import { dataTable, figure } from "./figure.js";
import { type Markup, html } from "./html.js";
import { tied } from "./parts.js";
import { shell } from "./shell.js";

export interface PlanPageParts {
  readonly plans: readonly ProblemPlan[];
  readonly allocation: AllocationPlan | null;
  /** By problem id. */
  readonly charts: ReadonlyMap<string, Chart | null>;
  readonly across: Chart | null;
  readonly command: string;
}

/** The text of index.html. */
export async function planPage(parts: PlanPageParts): Promise<string> {
  const { plans, allocation, across, command } = parts;
  const [first] = plans;
  const title =
    first !== undefined && plans.length === 1 ? `Plan: ${first.title}` : `Plan for ${plans.length} problems`;
  const sections: Markup[] = [];
  for (const plan of plans) sections.push(await problemOf(plan, parts.charts.get(plan.problem) ?? null));
  const sum = allocation === null ? null : await sumOf(allocation, across);
  return shell({
    title,
    contents: html`<nav aria-label="Contents">
      <ol>
        <li><a href="#answer">What is recommended</a></li>
        <li class="part">
          <a href="#problems">Problem by problem</a>
          <ol>
            ${plans.map((plan) => html`<li><a href="#plan-of-${plan.problem}">${plan.title}</a></li> `)}
          </ol>
        </li>
        ${sum && html`<li><a href="#sum">The weighted sum</a></li> `}
        <li><a href="#method">How this was planned</a></li>
      </ol>
    </nav>`,
    main: html`<header><h1>${title}</h1></header>
      <section id="answer">
        <h2>What is recommended</h2>
        <ul>
          ${plans.map((plan) => html`<li>${plan.title}: ${tied(sentencesOf(plan)[0] ?? "")}</li> `)}
        </ul>
      </section>
      <section id="problems">
        <h2>Problem by problem</h2>
        ${sections}
      </section>
      ${sum}
      <section id="method">
        <h2>How this was planned</h2>
        <p>
          Every source was run at small sizes. The points of a plan are the smallest at which the upper end
          (95 %) of the error budget's total lies inside the tolerance; the interval begins where its lower
          end does. A bias that the runs could not exclude counts as a study of the planned points and
          replicates would leave it. Costs are those of one run on one thread of this machine, or of your own
          program where its seconds per point were given. Only sources held to be sound are recommended.
        </p>
        <p>A plan bounds the numerical error of the integral, not the model.</p>
        <p class="soft">To repeat it: <code>${command}</code></p>
      </section>`,
    after: null,
    script: null,
  });
}

async function problemOf(plan: ProblemPlan, chart: Chart | null): Promise<Markup> {
  const rows = plan.sources.map((one) => planRow(one, plan.recommended === one));
  return html`<section id="plan-of-${plan.problem}">
    <h3>${plan.title}</h3>
    <p class="soft">${planTask(plan).join(", ")}</p>
    ${sentencesOf(plan).map((sentence) => html`<p>${tied(sentence)}</p> `)}
    ${dataTable({ columns: PLAN_COLUMNS, rows })} ${chart !== null && (await figure(chart))}
  </section> `;
}

async function sumOf(plan: AllocationPlan, chart: Chart | null): Promise<Markup> {
  const held = `Tolerance \u00b1${formatValue(plan.tolerance)} at ${formatPercent(plan.confidence)} on the weighted sum.`;
  const { cheapest } = plan;
  return html`<section id="sum">
    <h2>The weighted sum</h2>
    <p>
      ${tied(held)}
      ${cheapest === null ? `No allocation: ${plan.reason ?? "not known"}.` : tied(sentenceOf(plan, cheapest))}
    </p>
    ${cheapest !== null && dataTable({ columns: ALLOCATION_COLUMNS, rows: allocationRows(cheapest, plan.equal) })}
    ${chart !== null && (await figure(chart))}
  </section> `;
}

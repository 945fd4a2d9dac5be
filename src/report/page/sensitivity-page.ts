/** The page of one problem's inputs: the finding, its chart, what it means, pairs, and how it was found. */
import { formatCount, formatPercent, formatValue } from "../../findings/format.js";
import { sensitivityHeadline, sharesTable } from "../../findings/sensitivity-words.js";
import type { Problem } from "../../problem/contract.js";
import type { Sensitivity } from "../../record/sensitivity.js";
import type { Chart } from "../charts/chart.js";
import { dataTable, figure } from "./figure.js";
import { type Markup, html } from "./html.js";
import { inputsBlock } from "./inputs-section.js";
import { paragraphs, tied } from "./parts.js";
import { shell } from "./shell.js";

export interface SensitivityPageParts {
  readonly problem: Problem;
  readonly sensitivity: Sensitivity;
  readonly chart: Chart | null;
  /** The command line that repeats it. */
  readonly command: string;
}

/** The text of index.html. */
export async function sensitivityPage(parts: SensitivityPageParts): Promise<string> {
  const { problem, sensitivity, chart, command } = parts;
  const title = `Which inputs matter: ${problem.title}`;
  const inputs = sensitivity.measures?.inputs ?? [];
  return shell({
    title,
    contents: html`<nav aria-label="Contents">
      <ol>
        <li><a href="#answer">Which inputs matter</a></li>
        <li><a href="#method">How this was found</a></li>
      </ol>
    </nav>`,
    main: html`<header><h1>${title}</h1></header>
      <section id="answer">
        <h2>Which inputs matter</h2>
        ${paragraphs(problem.about)}
        <pre>${problem.integrand.trimEnd()}</pre>
        ${chart === null ? html`<p>${tied(sensitivityHeadline(sensitivity))}.</p>` : await figure(chart)}
        ${inputs.length > 0 && html`<h4>By whole inputs</h4>`}
        ${inputs.length > 0 && dataTable(sharesTable(inputs, "Input", inputs.length))}
        ${chart !== null && inputsBlock({ problem, sensitivity })}
      </section>
      <section id="method">
        <h2>How this was found</h2>
        ${methodOf(sensitivity)}
        <p class="soft">To repeat it: <code>${command}</code></p>
      </section>`,
    after: null,
    script: null,
  });
}

function methodOf({ measures, confidence }: Sensitivity): Markup | null {
  if (measures === null) return null;
  const { replicates, points, source, evaluations, variance } = measures;
  return html`<p>
    Shares of the variance ${formatValue(variance)} by exchanging coordinates between two independent sets of
    points: total indices by Jansen (1999), the others by Saltelli and others (2010);
    ${formatCount(replicates)} replicates of ${formatCount(points)} points by ${source},
    ${formatCount(evaluations)} values in all. Intervals (${formatPercent(confidence)}) are Student's for a
    ratio of means over replicates. Mean dimension: Liu and Owen (2006); truncation and superposition
    dimension: Caflisch, Morokoff and Owen (1997). A kink or jump is told from the spread of scrambled-net
    estimates beside integrands of known smoothness; that is evidence, not proof.
  </p>`;
}

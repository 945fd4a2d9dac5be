/** The last section: how the study was done, what its words mean, what to beware of, and how to repeat it. */
import { formatCount, formatSeconds, formatPercent } from "../../findings/format.js";
import type { View } from "../view.js";
import { type Markup, html } from "./html.js";

function statistics(view: View): Markup {
  const { family, spec } = view.record;
  const replicates = [...new Set(Object.values(spec.replicates))]
    .sort((a, b) => a - b)
    .map((n) => formatCount(n));
  return html`<h3>Method</h3>
    <p>
      Each source gives an estimate of each integral at several numbers of points n, once in each of
      ${replicates.join(" or ")} independent replicates: other seeds for pseudo-random sources, other
      randomisations for quasi-random ones. A replicate's error is its estimate minus the reference. Where a
      problem gives no reference, the agreement of three sound sources of different families stands in for it,
      after a test of homogeneity (Cochran 1954).
    </p>
    <p>
      <strong>Bias</strong> is the mean error over replicates; its standard error joins the spread of the
      replicates and the uncertainty of the reference. It is tested once per problem and source, at the
      largest n: by Student's t, or by the exact binomial test where the integrand is a condition. All
      ${formatCount(family.tests)} tests of this study form one family, held at a false-alarm level of
      ${formatPercent(family.level)} by the step-down procedure of Holm (1979). A rejection is only a
      candidate; it is called a bias when it is found again on fresh keys with 256 replicates, the level being
      split between the two stages. Beside every “no bias found” stands the smallest bias that the test would
      have found with 80 % power.
    </p>
    <p>
      <strong>Spread</strong>: the replicates of a pseudo-random source should differ as those of independent
      points would. Their variance is held against the variance within the replicates, as in an analysis of
      variance (Fisher's F), in the same family and by the same two stages; a confirmed ratio other than 1 is
      a fault of structure that no average over seeds shows.
    </p>
    <p>
      <strong>RMSE</strong> is the root mean square error over replicates. Its interval is a jackknife of its
      logarithm (Tukey 1958; Miller 1974), at 95 %. <strong>Order</strong> is the weighted least-squares slope
      of log RMSE on log n, its interval a jackknife over replicates. The <strong>floor</strong> is the level
      below which the error does not fall; a source is said to reach a tolerance “never” only when the lower
      limit of its floor lies above it and the last three doublings of n show no decay. An n beyond four times
      the largest measured is marked as extrapolated.
    </p>
    <p>
      <strong>The budget</strong> sets the sampling error, the source's structure and the reference's
      uncertainty beside the tolerance at the problem's own confidence: bounds of bias add, random lines add
      in quadrature and are multiplied by the coverage factor. This is more cautious than the GUM (JCGM
      100:2008), which puts all in quadrature.
    </p>
    <p>
      <strong>Undecided</strong> means that the interval of the total straddles the tolerance, or that no test
      could be made: more replicates or more points would decide it. It is neither a pass nor a failure. A
      deterministic source gives one estimate per n, hence no error bar and no verdict.
    </p>
    <p class="aside">
      Sources cited: W. G. Cochran, Biometrics 10 (1954), 101–129. S. Holm, Scandinavian Journal of Statistics
      6 (1979), 65–70. R. G. Miller, Biometrika 61 (1974), 1–15. J. W. Tukey, Annals of Mathematical
      Statistics 29 (1958), 614. JCGM 100:2008, Guide to the expression of uncertainty in measurement. Each
      source of points is cited in its own section.
    </p>`;
}

const CAUTIONS = html`<h3>Cautions</h3>
  <ul>
    <li>
      What is bounded here is the numerical error of an integral. Whether the integral is the right model of
      the world is another matter, and this report says nothing about it.
    </li>
    <li>
      It supports, and never replaces, a firm's own rules on model risk, the codes that apply where the result
      is used, and the judgement of those licensed to practise there.
    </li>
    <li>None of these sources of points is for cryptography.</li>
    <li>
      A source that is within the tolerance on these problems may fail on others. “No bias found” is a
      statement about biases above the detectable one, no more.
    </li>
    <li>Cost was measured on one machine in one run.</li>
  </ul>`;

function provenance(view: View): Markup {
  const { environment, spec, specDigest, digest, warnings } = view.record;
  return html`<h3 id="provenance">Provenance</h3>
    <dl>
      <dt>Command</dt>
      <dd><pre>${environment.command}</pre></dd>
      <dt>Seed</dt>
      <dd>${spec.seed}</dd>
      <dt>Specification</dt>
      <dd>SHA-256 <code>${specDigest}</code></dd>
      <dt>Estimates</dt>
      <dd>
        SHA-256 <code>${digest}</code>
        <span class="soft"
          >(equal on every run of the same specification, whatever the machine's threads)</span
        >
      </dd>
      <dt>Program</dt>
      <dd>
        tolerand ${environment.program}, Node ${environment.node}, ${environment.platform},
        ${environment.threads} ${environment.threads === 1 ? "thread" : "threads"}
      </dd>
      <dt>Run</dt>
      <dd>
        ${environment.started} to ${environment.finished}
        (${formatSeconds(environment.seconds)})${!environment.complete && ", interrupted"}
      </dd>
      <dt>Data</dt>
      <dd><a href="record.json">record.json</a> holds every estimate; this report can be redrawn from it.</dd>
    </dl>
    ${
      warnings.length > 0 &&
      html`<h4>Warnings of the run</h4>
        <ul>
          ${warnings.map((text) => html`<li>${text}</li> `)}
        </ul>`
    }`;
}

/** The section. */
export function methodSection(view: View): Markup {
  return html`<section id="method" data-section>
    <h2>How this was done</h2>
    ${statistics(view)} ${CAUTIONS} ${provenance(view)}
  </section> `;
}

/** The charts of a report in the order of reading: some for every subject, some across all of them. */
import type { InspectedView } from "../inspection-view.js";
import type { InspectionCharts } from "../page/inspection-page.js";
import type { ExplainedRow, Subject, View } from "../view.js";
import { aliasChart } from "./aliases.js";
import { biasChart } from "./bias.js";
import { biasMap } from "./bias-map.js";
import { budgetChart } from "./budget.js";
import type { Chart } from "./chart.js";
import { costToTolerance } from "./cost-to-tolerance.js";
import { errorAgainstN } from "./error-against-n.js";
import { figureByDimension } from "./figure-by-dimension.js";
import { inputsChart } from "./inputs.js";
import { lowBits } from "./low-bits.js";
import { netPairCharts } from "./net-pairs.js";
import { orders } from "./orders.js";
import { pairGrid } from "./pair-grid.js";
import { planeComb } from "./plane-comb.js";
import { predictedBias } from "./predicted-bias.js";
import { slice } from "./slice.js";

/** Charts of one subject; null where there is nothing to draw. */
const SUBJECT_CHARTS: readonly ((view: View, subject: Subject) => Chart | null)[] = [
  errorAgainstN,
  budgetChart,
  biasChart,
  inputsChart,
];

/** Charts of one bias that the structure of its source was asked about. */
const EXPLAINED_CHARTS: readonly ((row: ExplainedRow) => Chart | null)[] = [planeComb, aliasChart];

/** Charts across all subjects. */
const ACROSS_CHARTS: readonly ((view: View) => Chart | null)[] = [
  biasMap,
  predictedBias,
  orders,
  costToTolerance,
];

/** All charts of a record: per subject and per explained bias (by slug), and across. */
export interface ChartSet {
  readonly bySubject: ReadonlyMap<string, readonly Chart[]>;
  readonly byExplanation: ReadonlyMap<string, readonly Chart[]>;
  readonly across: readonly Chart[];
}

function present(charts: readonly (Chart | null)[]): Chart[] {
  return charts.filter((chart) => chart !== null);
}

/** Builds every chart of `view`. */
export function chartsOf(view: View): ChartSet {
  return {
    bySubject: new Map(
      view.subjects.map((subject) => [
        subject.slug,
        [...present(SUBJECT_CHARTS.map((make) => make(view, subject))), ...netPairCharts(view, subject)],
      ]),
    ),
    byExplanation: new Map(
      view.explained.map((row) => [row.slug, present(EXPLAINED_CHARTS.map((make) => make(row)))]),
    ),
    across: present(ACROSS_CHARTS.map((make) => make(view))),
  };
}

export function everyChart(set: ChartSet): Chart[] {
  return [...[...set.bySubject.values()].flat(), ...[...set.byExplanation.values()].flat(), ...set.across];
}

const INSPECTION_CHARTS: readonly ((items: readonly InspectedView[]) => Chart | null)[] = [
  figureByDimension,
  lowBits,
];

/** Charts of an inspection: over all sources, and of each source by its anchor. */
export function inspectionCharts(items: readonly InspectedView[]): InspectionCharts {
  return {
    across: present(INSPECTION_CHARTS.map((make) => make(items))),
    bySource: new Map(items.map((item) => [item.view.slug, present([slice(item), gridOf(item)])])),
  };
}

function gridOf({ view, inspection, pairs }: InspectedView): Chart | null {
  const net = inspection.findings.net?.netPairs ?? null;
  if (net === null || pairs === null) return null;
  const { base, digits, dimension } = net;
  return pairGrid({ slug: view.slug, source: inspection.choice.id, base, digits, dimension, values: pairs });
}

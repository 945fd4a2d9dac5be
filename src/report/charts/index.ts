/** The charts of a report in the order of reading: some for every subject, some across all of them. */
import type { Subject, View } from "../view.js";
import { biasChart } from "./bias.js";
import { biasMap } from "./bias-map.js";
import type { Chart } from "./chart.js";
import { costToTolerance } from "./cost-to-tolerance.js";
import { errorAgainstN } from "./error-against-n.js";
import { orders } from "./orders.js";

/** Charts of one subject; null where there is nothing to draw. */
const SUBJECT_CHARTS: readonly ((view: View, subject: Subject) => Chart | null)[] = [
  errorAgainstN,
  biasChart,
];

/** Charts across all subjects. */
const ACROSS_CHARTS: readonly ((view: View) => Chart | null)[] = [biasMap, orders, costToTolerance];

/** All charts of a record: per subject (by slug), and across. */
export interface ChartSet {
  readonly bySubject: ReadonlyMap<string, readonly Chart[]>;
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
        present(SUBJECT_CHARTS.map((make) => make(view, subject))),
      ]),
    ),
    across: present(ACROSS_CHARTS.map((make) => make(view))),
  };
}

export function everyChart(set: ChartSet): Chart[] {
  return [...[...set.bySubject.values()].flat(), ...set.across];
}

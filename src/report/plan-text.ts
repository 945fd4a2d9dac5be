/** Plans in words: for each problem a table of sources by cost, the recommendation, and why others are not recommended. */
import { formatCount, formatPercent, formatSeconds, formatValue } from "../findings/format.js";
import type { PlanPoint, ProblemPlan, SourcePlan } from "../findings/plan.js";
import { plainText, textTable, type TextColumn } from "./text-table.js";

/** The columns of a plan's table; the first marks what is recommended. */
export const PLAN_COLUMNS: readonly TextColumn[] = [
  { title: " ", align: "left" },
  { title: "source", align: "left" },
  { title: "points", align: "right" },
  { title: "95 % interval", align: "right" },
  { title: "total there", align: "right" },
  { title: "cost", align: "right" },
  { title: "remark", align: "left" },
];

/** The whole text for a terminal. */
export function planText(plans: readonly ProblemPlan[]): string {
  return `${plans.map((plan) => blockOf(plan).join("\n")).join("\n\n")}\n`;
}

function blockOf(plan: ProblemPlan): string[] {
  const rows = plan.sources.map((one) => planRow(one, plan.recommended === one));
  return [
    [plainText(plan.title), ...planTask(plan)].join("   "),
    ...textTable(PLAN_COLUMNS, rows).map((line) => `  ${line}`),
    ...sentencesOf(plan).map((line) => `  ${line}`),
  ];
}

/** What is asked: dimension, tolerance, and the user's own seconds per point. */
export function planTask(plan: ProblemPlan): string[] {
  const held =
    plan.tolerance === null
      ? "tolerance not known"
      : `tolerance \u00b1${formatValue(plan.tolerance)} at ${formatPercent(plan.confidence)}`;
  const mine = plan.userSecondsPerPoint;
  return [`d ${plan.dimension}`, held, ...(mine === null ? [] : [`at your ${formatSeconds(mine)} a point`])];
}

/** The cells of one source. */
export function planRow(one: SourcePlan, recommended: boolean): string[] {
  const { point, interval } = one;
  const cost = one.userSeconds ?? one.seconds;
  return [
    recommended ? "\u2192" : " ",
    one.source,
    one.status === "planned" && point !== null
      ? formatCount(point.n)
      : one.status === "never"
        ? "never"
        : "not known",
    interval === null ? "" : `${formatCount(interval[0])} to ${formatCount(interval[1])}`,
    point === null ? "" : formatValue(point.total),
    cost === null ? "" : formatSeconds(cost),
    remarkOf(one),
  ];
}

function remarkOf(one: SourcePlan): string {
  const parts = [
    one.reason,
    one.extrapolated ? "extrapolated" : null,
    one.randomisations > 1 && one.point !== null
      ? `${one.randomisations} randomisations of ${formatCount(one.point.n / one.randomisations)}`
      : null,
    one.unsound === null ? null : `not recommended: ${one.unsound}`,
    one.affordable === null ? null : affordableText(one.affordable),
  ];
  return parts.filter((part) => part !== null).join("; ");
}

function affordableText({ n, total }: PlanPoint): string {
  return `the time buys ${formatCount(n)} points: ${formatValue(total)}`;
}

/** What is recommended, in whole sentences. */
export function sentencesOf({ recommended, sources, confidence }: ProblemPlan): string[] {
  if (recommended === null || recommended.point === null) {
    const planned = sources.some(({ status }) => status === "planned");
    return [
      planned
        ? "No recommendation: only sources with known structure or a bias come inside the tolerance."
        : "No recommendation: no source of this plan is known to come inside the tolerance.",
    ];
  }
  const { source, point, randomisations, replicates, extrapolated } = recommended;
  const how =
    randomisations === 1
      ? `one run of ${formatCount(point.n)} points`
      : `the mean of ${randomisations} randomisations of ${formatCount(point.n / randomisations)} points, ${formatCount(point.n)} in all`;
  const cost = recommended.userSeconds ?? recommended.seconds;
  const price = cost === null ? "" : `, ${formatSeconds(cost)} a run`;
  const far = extrapolated
    ? " The n is extrapolated: measure nearer to it with --sizes before relying on it."
    : "";
  return [
    `Recommended: ${source}, ${how}${price}: total ${formatValue(point.total)}, ` +
      `at most ${formatValue(point.interval[1])} (95 %), at ${formatPercent(confidence)}.${far}`,
    `To show it: a study of ${formatCount(point.n / randomisations)} points with ${replicates} replicates.`,
  ];
}

/** An allocation: seconds for each problem of a weighted sum, beside what equal points would cost. */
import type { AllocationPlan } from "../../findings/allocation-plan.js";
import { formatCount, formatPercent, formatSeconds } from "../../findings/format.js";
import { ALLOCATION_COLUMNS, allocationRows } from "../allocation-text.js";
import { PAGE } from "../look.js";
import type { View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  POWER_LABELS,
  counted,
  framed,
  powersOfTen,
} from "./chart.js";
import { pixelY, rowLabels, rulings } from "./rows-frame.js";

const [WIDTH, STEP] = [480, 36];
const MARGINS: Margins = { left: 270, right: 60, top: 14, bottom: 48 };

/** The chart; null where there is no allocation or nothing to hold it against. */
export function allocationChart(view: View, plan: AllocationPlan): Chart | null {
  const { cheapest, equal, saving } = plan;
  if (cheapest === null || equal === null) return null;
  const height = cheapest.rows.length * STEP;
  const title =
    saving !== null && saving > 0.005
      ? `Allocating points saves ${formatPercent(Number(saving.toFixed(2)))} of the cost of equal points`
      : "Allocating points saves nothing worth naming over equal points";
  const place = (i: number): number => (i + 0.5) * STEP;
  const labels = cheapest.rows.map((row, i): Datum => {
    const name = view.subjects.find(({ problem }) => problem.id === row.problem)?.title ?? row.problem;
    return { label: name, series: name, y: place(i) };
  });
  const data = (rows: typeof cheapest.rows): Datum[] =>
    rows.map((row, i) => ({
      y: place(i),
      points: row.n,
      about: `${row.problem}, weight ${row.weight}: ${formatCount(row.n)} points, ${formatSeconds(row.seconds)}`,
    }));
  const all = [...cheapest.rows, ...equal.rows].map(({ n }) => n);
  const domain = [Math.min(...all) / 2, Math.max(...all) * 2] as const;
  const x = {
    field: "points",
    type: "quantitative",
    title: "points (log scale)",
    scale: { type: "log", domain, nice: false },
    axis: { values: powersOfTen(...domain), labelExpr: POWER_LABELS, grid: true },
  };
  const y = pixelY(height);
  const description = { field: "about", type: "nominal" };
  const layer: Spec[] = [
    rulings(
      cheapest.rows.map((_, i) => (i + 1) * STEP),
      height,
    ),
    {
      data: {
        values: cheapest.rows.map((row, i) => ({
          y: place(i),
          points: row.n,
          other: equal.rows[i]?.n ?? row.n,
        })),
      },
      mark: { type: "rule", color: PAGE.soft.light, strokeWidth: 1, aria: false },
      encoding: { x, x2: { field: "other" }, y },
    },
    {
      data: { values: data(equal.rows) },
      mark: {
        type: "point",
        shape: "diamond",
        filled: false,
        fill: PAGE.paper.light,
        stroke: PAGE.soft.light,
        strokeWidth: 1.6,
        size: 80,
        opacity: 1,
      },
      encoding: { x, y, description },
    },
    {
      data: { values: data(cheapest.rows) },
      mark: {
        type: "point",
        shape: "circle",
        filled: true,
        color: PAGE.tolerance.light,
        size: 80,
        opacity: 1,
      },
      encoding: { x, y, description },
    },
    rowLabels(labels, height, MARGINS.left - 16, null),
  ];
  const says = `Points for each problem of the weighted sum: allocated (discs, ${formatSeconds(cheapest.seconds)} in all) and the same for all (hollow diamonds, ${formatSeconds(equal.seconds)}).`;
  return {
    name: "allocation",
    title: `${title}.`,
    says,
    caption:
      "Both keep the tolerance on the sum. A problem gets many points where its weight and deviation are large and a point costs little. " +
      "Sizes are rounded up to those valid for the source.",
    alt: `Dot plot of points for ${counted(cheapest.rows.length, "problem")}, allocated and equal. ${title}.`,
    notDrawn: [],
    table: { columns: ALLOCATION_COLUMNS, rows: allocationRows(cheapest, equal) },
    spec: framed({ title, says, alt: title, width: WIDTH, height, margins: MARGINS, layer }),
    marks: new Map(),
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

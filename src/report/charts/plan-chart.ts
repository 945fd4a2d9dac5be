/** A plan: what each source costs for every tolerance, the tolerance asked for, and the point chosen. */
import { formatCount, formatSeconds, formatValue } from "../../findings/format.js";
import type { PlanPoint, ProblemPlan, SourcePlan } from "../../findings/plan.js";
import { PAGE } from "../look.js";
import type { SourceView, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  POWER_LABELS,
  counted,
  familyKey,
  fitted,
  framed,
  listed,
  powersOfTen,
  sourceChannels,
  spread,
} from "./chart.js";

const [WIDTH, HEIGHT] = [600, 330];
const MARGINS: Margins = { left: 74, right: 150, top: 14, bottom: 48 };

interface Line {
  readonly plan: SourcePlan;
  readonly view: SourceView;
  /** Seconds or, where no price is known, points. */
  readonly price: number;
  readonly points: readonly PlanPoint[];
}

/** The chart of one problem's plan; null where no source has a curve or the tolerance is not known. */
export function planChart(view: View, plan: ProblemPlan): Chart | null {
  const { tolerance } = plan;
  const lines = plan.sources.flatMap((one): Line[] => {
    const source = view.sources.find((known) => known.source.id === one.source);
    const price = plan.userSecondsPerPoint ?? one.secondsPerPoint;
    const points = one.curve.filter(({ interval }) => interval[1] > 0);
    if (source === undefined || price === null || points.length < 2) return [];
    return [{ plan: one, view: source, price, points }];
  });
  if (tolerance === null || lines.length === 0) return null;
  const marks = new Marks();
  const { colour, dash, shape } = sourceChannels(lines.map((line) => line.view));
  const datum = ({ plan: one, view: source, price }: Line, point: PlanPoint): Datum => {
    const cost = point.n * price;
    const about = `${one.source}: ${formatCount(point.n)} points, ${formatSeconds(cost)}, total at most ${formatValue(point.interval[1])}`;
    return {
      source: source.index,
      series: marks.name(source, one.source),
      about: marks.values(source, about),
      tolerance: point.interval[1],
      cost,
      known: !one.extrapolated,
      measured: point.n <= one.largestMeasured,
    };
  };
  const data = lines.flatMap((line) => line.points.map((point) => datum(line, point)));
  const chosen = lines.flatMap((line) => (line.plan.point === null ? [] : [datum(line, line.plan.point)]));
  const values = (key: string): number[] => [...data, ...chosen].map((d) => Number(d[key]));
  const [left, right] = [
    Math.min(tolerance, ...values("tolerance")) / 1.3,
    Math.max(tolerance, ...values("tolerance")) * 1.3,
  ];
  const [bottom, top] = [Math.min(...values("cost")) / 1.5, Math.max(...values("cost")) * 1.5];
  const x = {
    field: "tolerance",
    type: "quantitative",
    title: "tolerance that is kept (log scale, tighter to the right)",
    scale: { type: "log", domain: [left, right], nice: false, reverse: true },
    axis: { values: powersOfTen(left, right), labelExpr: POWER_LABELS, grid: false },
  };
  const y = {
    field: "cost",
    type: "quantitative",
    title: "seconds of one thread (log scale)",
    scale: { type: "log", domain: [bottom, top], nice: false },
    axis: { values: powersOfTen(bottom, top), labelExpr: POWER_LABELS, titleX: -54 },
  };
  const ends = lines.map((line) => datum(line, line.points[line.points.length - 1] as PlanPoint));
  const pixel = (cost: number): number => (HEIGHT * Math.log(top / cost)) / Math.log(top / bottom);
  const places = spread(
    ends.map((d) => pixel(Number(d["cost"]))),
    16,
    4,
    HEIGHT - 4,
  );
  const labels = ends.map((d, i): Datum => ({
    ...d,
    at: top * (bottom / top) ** ((places[i] ?? 0) / HEIGHT),
    label: fitted(String(d["series"]), MARGINS.right - 20),
  }));
  // The part that was not measured begins at the last point that was.
  const beyond = lines.flatMap((line) => {
    const from = line.points.findLastIndex(({ n }) => n <= line.plan.largestMeasured);
    return line.points.slice(Math.max(0, from)).map((point) => datum(line, point));
  });
  const byName = { field: "series", type: "nominal" };
  const inOrder = { detail: byName, order: { field: "cost" }, description: byName };
  const layer: Spec[] = [
    {
      data: { values: [{ tolerance, label: `tolerance ${formatValue(tolerance)}` }] },
      mark: { type: "rule", color: PAGE.tolerance.light, strokeWidth: 1.4, aria: false },
      encoding: { x },
    },
    {
      data: { values: data.filter((d) => d["measured"]) },
      mark: { type: "line", strokeWidth: 1.6 },
      encoding: { x, y, color: colour, strokeDash: dash, ...inOrder },
    },
    {
      data: { values: beyond },
      mark: { type: "line", strokeWidth: 1.2, strokeDash: [1, 4] },
      encoding: { x, y, color: colour, ...inOrder },
    },
    ...[true, false].map((known) => ({
      data: { values: chosen.filter((d) => d["known"] === known) },
      mark: {
        type: "point",
        filled: known,
        size: 80,
        opacity: 1,
        ...(known ? {} : { fill: PAGE.paper.light }),
      },
      encoding: { x, y, color: colour, shape, description: { field: "about", type: "nominal" } },
    })),
    {
      data: { values: labels },
      mark: { type: "rule", strokeWidth: 0.8, opacity: 0.6 },
      encoding: { x, x2: { value: WIDTH + 12 }, y, y2: { field: "at" }, color: colour, description: byName },
    },
    {
      data: { values: labels },
      mark: { type: "text", align: "left", baseline: "middle" },
      encoding: {
        x: { value: WIDTH + 16 },
        y: { ...y, field: "at" },
        text: { field: "label", type: "nominal" },
        color: colour,
        description: byName,
      },
    },
  ];
  const title = finding(plan);
  const says =
    "Seconds of one run against the tolerance that it keeps, for every source; marks are the points planned.";
  const slug = view.subjects.find(({ problem }) => problem.id === plan.problem)?.slug ?? plan.problem;
  return {
    name: `plan-${slug}`,
    title,
    says,
    caption:
      "The upright line is the tolerance asked for; the tolerance that n points keep is the upper end (95 %) of the budget's total there. Lower is cheaper; a flatter line pays less for the next digit. " +
      "Dotted beyond the sizes measured; hollow marks are planned beyond four times the largest n measured. " +
      familyKey(view, true),
    alt: `Line chart of cost against tolerance for ${counted(lines.length, "source")}. ${title}`,
    notDrawn: plan.sources
      .filter((one) => !lines.some((line) => line.plan === one))
      .map((one) => `${one.source} not drawn: ${one.reason ?? "no cost is known"}.`),
    table: {
      columns: [
        { title: "Source", align: "left" },
        { title: "Points", align: "right" },
        { title: "Cost", align: "right" },
        { title: "Total", align: "right" },
        { title: "Total at most", align: "right" },
      ],
      rows: lines.flatMap(({ plan: one, price, points }) =>
        points.map(({ n, total, interval }) => [
          one.source,
          formatCount(n),
          formatSeconds(n * price),
          formatValue(total),
          formatValue(interval[1]),
        ]),
      ),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height: HEIGHT, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, HEIGHT + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

function finding({ recommended, sources }: ProblemPlan): string {
  const never = sources.filter(({ status }) => status === "never").map(({ source }) => source);
  const rest = never.length === 0 ? "." : `; never within it: ${listed(never)}.`;
  if (recommended === null || recommended.point === null)
    return `No sound source is known to keep the tolerance${rest}`;
  const cost = recommended.userSeconds ?? recommended.seconds;
  const price = cost === null ? "" : `, ${formatSeconds(cost)}`;
  return `The cheapest sound way to the tolerance is ${recommended.source} with ${formatCount(recommended.point.n)} points${price}${rest}`;
}

/** Cost to tolerance: seconds of one thread until one estimate keeps the tolerance, a row per problem, a mark per source. */
import { formatCount, formatSeconds } from "../../findings/format.js";
import { PAGE } from "../look.js";
import type { Row, Subject, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  counted,
  familyKey,
  fitted,
  framed,
  listed,
  powersOfTen,
  sourceChannels,
} from "./chart.js";
import { pixelY, rowLabels, rulings } from "./rows-frame.js";

const WIDTH = 520;
const STEP = 34;
const MARGINS: Margins = { left: 250, right: 170, top: 14, bottom: 48 };
/** Part of the plot left free for the label of the cheapest source. */
const LABEL_SHARE = 0.24;

interface Priced {
  readonly subject: Subject;
  readonly row: Row;
  readonly cost: number;
  readonly n: number;
  readonly extrapolated: boolean;
}

function roughly(n: number): string {
  return `≈ ${formatCount(n, true)}`;
}

function priced(view: View): Priced[] {
  return view.subjects.flatMap((subject) =>
    subject.rows.flatMap((row): Priced[] => {
      const c = row.convergence;
      if (
        c === null ||
        c.never ||
        c.reach === null ||
        c.cost === null ||
        !(c.cost > 0) ||
        !Number.isFinite(c.cost)
      )
        return [];
      return [{ subject, row, cost: c.cost, n: c.reach.n, extrapolated: c.reach.extrapolated }];
    }),
  );
}

function neverIn(subject: Subject): string[] {
  return subject.rows.filter((row) => row.convergence?.never === true).map((row) => row.label);
}

function cheapestOf(all: readonly Priced[], subject: Subject): Priced | undefined {
  return all.filter((p) => p.subject === subject).sort((a, b) => a.cost - b.cost)[0];
}

function finding(view: View, all: readonly Priced[]): string {
  const wins = new Map<string, number>();
  for (const subject of view.subjects) {
    const label = cheapestOf(all, subject)?.row.label;
    if (label !== undefined) wins.set(label, (wins.get(label) ?? 0) + 1);
  }
  const order = [...wins].sort((a, b) => b[1] - a[1]);
  const first = order[0];
  if (first === undefined) return "No source is known to reach a tolerance.";
  const never = new Map<string, number>();
  for (const label of view.subjects.flatMap(neverIn)) never.set(label, (never.get(label) ?? 0) + 1);
  const lost = [...never].sort((a, b) => b[1] - a[1]).map(([label, n]) => `${label} on ${n}`);
  const lead = `${first[0]} is the cheapest way to the tolerance on ${first[1]} of ${counted(view.subjects.length, "problem")}`;
  return lost.length === 0 ? `${lead}.` : `${lead}; never within it: ${listed(lost)}.`;
}

/** The chart over all subjects, or null where no cost is known. */
export function costToTolerance(view: View): Chart | null {
  const all = priced(view);
  if (all.length === 0) return null;
  const height = view.subjects.length * STEP;
  const costs = all.map((p) => p.cost);
  const [least, most] = [Math.min(...costs), Math.max(...costs)];
  const right = Math.max(most * 1.4, least * 12);
  const left = least / (right / least) ** (LABEL_SHARE / (1 - LABEL_SHARE));
  const marks = new Marks();
  const { colour, shape } = sourceChannels([...new Set(all.map((p) => p.row.view))]);
  const data = all.map((p): Datum => {
    const points = p.extrapolated ? `${roughly(p.n)} points, extrapolated` : `${roughly(p.n)} points`;
    const about = `${p.row.label} on ${p.subject.title}: ${formatSeconds(p.cost)} to tolerance (${points})`;
    return {
      source: p.row.view.index,
      series: marks.name(p.row.view, p.row.label),
      about: marks.values(p.row.view, about),
      y: (view.subjects.indexOf(p.subject) + 0.5) * STEP,
      cost: p.cost,
      extrapolated: p.extrapolated,
      label: fitted(p.row.label, WIDTH * LABEL_SHARE - 14),
      best: cheapestOf(all, p.subject) === p,
    };
  });
  const rowText = view.subjects.map((s, i): Datum => ({
    label: s.title,
    series: s.title,
    y: (i + 0.5) * STEP,
  }));
  const never = view.subjects.flatMap((s, i): Datum[] => {
    const labels = neverIn(s);
    return labels.length === 0
      ? []
      : [{ y: (i + 0.5) * STEP, label: fitted(`never: ${listed(labels, 2)}`, MARGINS.right - 16) }];
  });
  const x = {
    field: "cost",
    type: "quantitative",
    title: "seconds of one thread to tolerance (log scale)",
    scale: { type: "log", domain: [left, right], nice: false },
    axis: {
      values: powersOfTen(least / 1.001, right),
      grid: true,
      labelExpr:
        "datum.value < 0.001 ? format(datum.value * 1e6, '~g') + ' µs' : datum.value < 1 ? format(datum.value * 1e3, '~g') + ' ms' : format(datum.value, ',') + ' s'",
    },
  };
  const y = pixelY(height);
  const description = { field: "about", type: "nominal" };
  const byName = { field: "series", type: "nominal" };
  const layer: Spec[] = [
    rulings(
      view.subjects.map((_, i) => (i + 1) * STEP),
      height,
    ),
    ...[false, true].map((hollow) => ({
      data: { values: data.filter((d) => d["extrapolated"] === hollow) },
      mark: {
        type: "point",
        filled: !hollow,
        size: 60,
        opacity: 1,
        ...(hollow ? { fill: PAGE.paper.light } : {}),
      },
      encoding: { x, y, color: colour, shape, description },
    })),
    {
      data: { values: data.filter((d) => d["best"]) },
      mark: { type: "text", align: "right", baseline: "middle", dx: -9 },
      encoding: { x, y, text: { field: "label", type: "nominal" }, color: colour, description: byName },
    },
    rowLabels(rowText, height, MARGINS.left - 16, null),
    {
      data: { values: never },
      mark: {
        type: "text",
        align: "left",
        baseline: "middle",
        color: PAGE.ink.light,
        aria: false,
      },
      encoding: { x: { value: WIDTH + 12 }, y, text: { field: "label", type: "nominal" } },
    },
  ];
  const title = finding(view, all);
  const says =
    "Seconds of one thread until one estimate keeps the tolerance, per problem (rows); one mark per source.";
  const unknown =
    view.subjects.flatMap((s) => s.rows).length - all.length - view.subjects.flatMap(neverIn).length;
  return {
    name: "cost-to-tolerance",
    title,
    says,
    caption:
      "Further left is cheaper; the cheapest source of each problem is named. Cost is points times the seconds per point measured in this run, so it speaks of this machine. " +
      "Hollow marks are extrapolated beyond four times the largest n measured; sources that never reach the tolerance are named at the right. " +
      familyKey(view, false),
    alt: `Dot plot of cost to tolerance for ${counted(view.subjects.length, "problem")}. ${title}`,
    notDrawn:
      unknown > 0
        ? [`${counted(unknown, "pair")} of problem and source without a known cost not drawn.`]
        : [],
    table: {
      columns: [
        { title: "Problem", align: "left" },
        { title: "Source", align: "left" },
        { title: "n to tolerance", align: "right" },
        { title: "Cost", align: "right" },
      ],
      rows: all.map((p) => [
        p.subject.title,
        p.row.label,
        `${roughly(p.n)}${p.extrapolated ? ", extrapolated" : ""}`,
        formatSeconds(p.cost),
      ]),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

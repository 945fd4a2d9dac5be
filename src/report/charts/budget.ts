/** The budget of a subject: for each source the lines of its total, stacked on a linear axis against the tolerance. */
import { contributionsOf } from "../../findings/budget/contributions.js";
import { formatPercent, formatValue, plainNumber, withInterval } from "../../findings/format.js";
import { VERDICT_MARKS } from "../../findings/headline.js";
import type { Budget } from "../../record/types.js";
import { budgetTable } from "../budget-rows.js";
import { PAGE, TINTS } from "../look.js";
import { ranked, toleranceWords } from "../verdict-row.js";
import type { Row, Subject, View } from "../view.js";
import {
  type Chart,
  type Datum,
  type Margins,
  type Spec,
  Marks,
  counted,
  framed,
  listed,
  sourceChannels,
} from "./chart.js";
import { markedLine, pixelY, rowLabels, rulings } from "./rows-frame.js";

const WIDTH = 520;
const STEP = 30;
const BAR = 17;
/** Distance of the key from the lower end of the plot, in pixels, behind the axis and its title. */
const KEY = 60;
const MARGINS: Margins = { left: 190, right: 170, top: 26, bottom: 76 };

/** Bars end at so many tolerances; what is longer is cut and says so. */
const LONGEST = 3;

interface Group {
  readonly name: string;
  readonly fill: string;
  readonly text: string;
  holds(line: string, declared: ReadonlySet<string>): boolean;
}

const NUMERICS: ReadonlySet<string> = new Set(["source resolution", "transform", "arithmetic"]);

/** Parts in the order of stacking. */
const GROUPS: readonly Group[] = [
  { name: "sampling", fill: PAGE.soft.light, text: PAGE.paper.light, holds: (line) => line === "sampling" },
  {
    name: "source structure",
    fill: TINTS.above[2].light,
    text: PAGE.ink.light,
    holds: (line) => line === "source structure",
  },
  { name: "numerics", fill: TINTS.below[2].light, text: PAGE.ink.light, holds: (line) => NUMERICS.has(line) },
  {
    name: "reference",
    fill: TINTS.below[0].light,
    text: PAGE.ink.light,
    holds: (line) => line === "reference",
  },
  {
    name: "declared",
    fill: TINTS.above[0].light,
    text: PAGE.ink.light,
    holds: (line, declared) => declared.has(line),
  },
];

interface Found {
  readonly row: Row;
  readonly budget: Budget;
  readonly total: number;
  /** By group. */
  readonly parts: readonly number[];
}

function found(subject: Subject): Found[] {
  const declared = new Set((subject.problem.declared ?? []).map(({ line }) => line));
  return ranked(subject.rows).flatMap((row): Found[] => {
    const { budget } = row;
    const { total = null, coverageFactor = null } = budget ?? {};
    if (budget === null || total === null || coverageFactor === null || !Number.isFinite(total)) return [];
    const contributions = contributionsOf(budget.lines, coverageFactor);
    const parts = GROUPS.map((group) =>
      budget.lines.reduce(
        (sum, { line }, i) => sum + (group.holds(line, declared) ? (contributions[i] ?? 0) : 0),
        0,
      ),
    );
    return [{ row, budget, total, parts }];
  });
}

function finding(all: readonly Found[]): string {
  const inside = all.filter(({ budget }) => budget.verdict === "within").map(({ row }) => row.label);
  const largest = new Map<string, number>();
  for (const { parts } of all) {
    const name = GROUPS[parts.indexOf(Math.max(...parts))]?.name ?? "";
    largest.set(name, (largest.get(name) ?? 0) + 1);
  }
  const [first] = [...largest].sort((a, b) => b[1] - a[1]);
  const lead =
    inside.length === 0
      ? `No source keeps the tolerance at its largest n`
      : `${listed(inside)} ${inside.length === 1 ? "keeps" : "keep"} the tolerance at the largest n`;
  return first === undefined
    ? `${lead}.`
    : `${lead}; ${first[0]} is the largest part for ${first[1]} of ${counted(all.length, "source")}.`;
}

/** The names of the parts that occur, each beside a square of its colour, below the plot. */
function key(present: readonly Group[], height: number): Spec[] {
  let at = 0;
  return present.flatMap(({ name, fill }): Spec[] => {
    const x = at + 6;
    at += name.length * 6.6 + 38;
    const data = { values: [{ name }] };
    const y = { value: height + KEY };
    return [
      {
        data,
        mark: {
          type: "point",
          shape: "square",
          filled: true,
          size: 130,
          opacity: 1,
          color: fill,
          aria: false,
        },
        encoding: { x: { value: x }, y },
      },
      {
        data,
        mark: { type: "text", align: "left", baseline: "middle", color: PAGE.soft.light, aria: false },
        encoding: { x: { value: x + 12 }, y, text: { field: "name", type: "nominal" } },
      },
    ];
  });
}

/** The chart of one subject, or null where no total or no tolerance is known. */
export function budgetChart(_view: View, subject: Subject): Chart | null {
  const all = found(subject);
  const { tolerance } = subject;
  if (all.length === 0 || tolerance === null) return null;
  const height = all.length * STEP;
  const longest = Math.max(
    ...all.map(({ total, budget }) => Math.max(total, budget.totalInterval?.[1] ?? 0)),
  );
  const right = Math.min(Math.max(longest, tolerance) * 1.05, LONGEST * tolerance);
  const marks = new Marks();
  const { colour } = sourceChannels(all.map(({ row }) => row.view));
  const segments: Datum[] = [];
  const labels: Datum[] = [];
  const rows = all.map(({ row, budget, total, parts }, i): Datum => {
    const series = marks.name(row.view, row.label);
    const y = (i + 0.5) * STEP;
    let from = 0;
    for (const [g, part] of parts.entries()) {
      const group = GROUPS[g];
      const to = Math.min(right, from + part);
      if (group === undefined || !(part > 0) || !(to > from)) continue;
      const about = marks.values(
        row.view,
        `${row.label}: ${group.name} adds ${formatValue(part)} of ${formatValue(total)}`,
      );
      segments.push({
        source: row.view.index,
        about,
        group: group.name,
        from,
        to,
        top: y - BAR / 2,
        bottom: y + BAR / 2,
      });
      const pixels = ((to - from) / right) * WIDTH;
      if (pixels > group.name.length * 6.6 + 10)
        labels.push({ series, group: group.name, label: group.name, at: (from + to) / 2, y });
      from += part;
    }
    const [low, high] = budget.totalInterval ?? [total, total];
    const cut = total > right ? " →" : "";
    return {
      source: row.view.index,
      series,
      label: row.label,
      y,
      low: Math.min(low, right),
      high: Math.min(high, right),
      side: `${VERDICT_MARKS[budget.verdict]} ${budget.verdict}, ${withInterval(total, budget.totalInterval)}${cut}`,
    };
  });
  const y = pixelY(height);
  const x = {
    field: "from",
    type: "quantitative",
    title: "total error at the problem's confidence, in units of the quantity",
    scale: { domain: [0, right], nice: false, zero: true },
    axis: { format: "~g", grid: true, tickCount: 6 },
  };
  const byName = { field: "series", type: "nominal" };
  const layer: Spec[] = [
    rulings(
      all.map((_, i) => (i + 1) * STEP),
      height,
    ),
    ...GROUPS.map(({ name, fill }) => ({
      data: { values: segments.filter((segment) => segment["group"] === name) },
      mark: { type: "rect", color: fill, stroke: PAGE.paper.light, strokeWidth: 1 },
      encoding: {
        x,
        x2: { field: "to" },
        y: pixelY(height, "top"),
        y2: { field: "bottom" },
        description: { field: "about", type: "nominal" },
      },
    })),
    ...GROUPS.map(({ name, text }) => ({
      data: { values: labels.filter((label) => label["group"] === name) },
      mark: { type: "text", align: "center", baseline: "middle", fontSize: 11, color: text },
      encoding: {
        x: { ...x, field: "at" },
        y,
        text: { field: "label", type: "nominal" },
        description: byName,
      },
    })),
    {
      data: { values: rows.filter((row) => row["low"] !== row["high"]) },
      mark: { type: "rule", strokeWidth: 1.6, color: PAGE.ink.light, yOffset: BAR / 2 + 3 },
      encoding: { x: { ...x, field: "low" }, x2: { field: "high" }, y, description: byName },
    },
    ...key(
      GROUPS.filter((_, g) => all.some(({ parts }) => (parts[g] ?? 0) > right / 500)),
      height,
    ),
    ...markedLine(x, tolerance, `tolerance ${plainNumber(tolerance, 4)}`, [1, 0]),
    rowLabels(rows, height, MARGINS.left - 16, colour),
    {
      data: { values: rows },
      mark: { type: "text", align: "left", baseline: "middle", color: PAGE.ink.light },
      encoding: {
        x: { value: WIDTH + 12 },
        y,
        text: { field: "side", type: "nominal" },
        description: byName,
      },
    },
  ];
  const title = finding(all);
  const says =
    "What each total is made of at the source's largest n: lines stacked from the left, in units of the quantity.";
  const missing = subject.rows.length - all.length;
  const cut = all.filter(({ total }) => total > right).length;
  return {
    name: `budget-${subject.slug}`,
    title,
    says,
    caption:
      `From the left: ${GROUPS.map(({ name }) => name).join(", ")} (numerics: source resolution, transform and arithmetic); parts too small for their name are in the table. ` +
      `Bounds of biases add; random lines count together at ${formatPercent(subject.confidence)} and are drawn by their share of the variance. ` +
      "The thin line under a bar is the 95 % interval of its total; a bar that ends left of the tolerance with its interval is inside.",
    alt: `Error budget of ${counted(all.length, "source")} on ${subject.title}, tolerance ${toleranceWords(subject)}. ${title}`,
    notDrawn: [
      ...(missing > 0 ? [`${counted(missing, "source")} without a total not drawn.`] : []),
      ...(cut > 0 ? [`${counted(cut, "bar")} cut at ${LONGEST} tolerances (→).`] : []),
    ],
    table: {
      columns: [
        { title: "Source", align: "left" },
        { title: "Line", align: "left" },
        { title: "Adds", align: "right" },
      ],
      rows: all.flatMap(({ row, budget }) => {
        const table = budgetTable(budget);
        if (table === null) return [];
        return [
          ...table.rows.filter(({ adds }) => adds !== "–").map(({ line, adds }) => [row.label, line, adds]),
          [row.label, "total", table.total],
        ];
      }),
    },
    spec: framed({
      title,
      says,
      alt: `${subject.title}: ${title}`,
      width: WIDTH,
      height,
      margins: MARGINS,
      layer,
    }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, height + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

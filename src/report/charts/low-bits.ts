/** Periods of the lowest bits of outputs, a line per source of a power-of-two modulus. */
import type { InspectedView } from "../inspection-view.js";
import { type Chart, type Margins, Marks, counted, familyKey, framed, listed } from "./chart.js";
import { lineLayers } from "./lines-frame.js";

const WIDTH = 560;
const HEIGHT = 280;
const MARGINS: Margins = { left: 60, right: 190, top: 14, bottom: 48 };

interface Line {
  readonly item: InspectedView;
  readonly periods: readonly bigint[];
}

function log2(period: bigint): number {
  const digits = period.toString(2);
  return (
    digits.length - 1 + Math.log2(Number(`0b${digits.slice(0, 53)}`) / 2 ** (Math.min(digits.length, 53) - 1))
  );
}

function finding(lines: readonly Line[]): string {
  const sentences = lines.map(({ item, periods }) => {
    const { id } = item.inspection.choice;
    const [lowest = 0n] = periods;
    if (lowest === 1n) return `the lowest bit of ${id} never changes`;
    return `the lowest bit of ${id} repeats every ${lowest} outputs`;
  });
  const text = listed(sentences, 3);
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}

/** Null where no source has a modulus that is a power of two. */
export function lowBits(items: readonly InspectedView[]): Chart | null {
  const lines = items.flatMap((item): Line[] => {
    const periods = item.inspection.findings.period?.lowBitPeriods ?? null;
    return periods === null ? [] : [{ item, periods }];
  });
  if (lines.length === 0) return null;
  const marks = new Marks();
  const most = Math.max(...lines.map(({ periods }) => periods.length));
  const top = Math.max(4, ...lines.flatMap(({ periods }) => periods.map(log2))) * 1.06;
  const layer = lineLayers(
    lines.flatMap(({ item, periods }) =>
      periods.map((period, k) => {
        const { id } = item.inspection.choice;
        const about = `${id}: its ${counted(k + 1, "lowest bit")} repeat${k === 0 ? "s" : ""} every ${period} outputs`;
        return { view: item.view, label: id, x: k + 1, y: log2(period), about };
      }),
    ),
    marks,
    {
      x: {
        title: "lowest bits of an output",
        scale: { domain: [0, most + 1], nice: false },
        axis: { format: "d", grid: false, tickMinStep: 1 },
      },
      y: {
        title: "log₂ of their period",
        scale: { domain: [-0.6, top], nice: false, zero: false },
        axis: { format: "d", tickMinStep: 1, titleX: -40 },
      },
      size: [WIDTH, HEIGHT],
      margins: MARGINS,
      pixel: (y) => (HEIGHT * (top - y)) / (top + 0.6),
      value: (at) => top - (at / HEIGHT) * (top + 0.6),
    },
  );
  const title = finding(lines);
  const says = "Period of the k lowest bits of the outputs, as a power of two, against k.";
  return {
    name: "low-bits",
    title,
    says,
    caption:
      "k bits of a power-of-two modulus repeat within 2^k outputs at the latest, whatever the period of the whole: numbers made of low bits (a remainder, a parity) have these short periods. " +
      familyKey({ sources: lines.map(({ item }) => item.view) }, true),
    alt: `Line chart of the periods of low bits of ${listed(lines.map(({ item }) => item.inspection.choice.id))}, up to ${most} bits. ${title}`,
    notDrawn: [],
    table: {
      columns: [
        { title: "Source", align: "left" },
        { title: "Lowest bits", align: "right" },
        { title: "Period", align: "right" },
      ],
      rows: lines.flatMap(({ item, periods }) =>
        periods.map((period, k) => [item.inspection.choice.id, String(k + 1), String(period)]),
      ),
    },
    spec: framed({ title, says, alt: title, width: WIDTH, height: HEIGHT, margins: MARGINS, layer }),
    marks: marks.map,
    size: [WIDTH + MARGINS.left + MARGINS.right, HEIGHT + MARGINS.top + MARGINS.bottom],
    margins: MARGINS,
  };
}

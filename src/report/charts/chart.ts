/** What every chart is: a finding as its title, a plain line, a caption, words for it, its numbers, and its spec. */
import type { SourceView, View } from "../view.js";
import { FAMILIES, FAMILY_ORDER, PAGE } from "../look.js";

/** A Vega-Lite specification as plain JSON; its validity is a matter of Vega-Lite's published JSON schema. */
export type Spec = Readonly<Record<string, unknown>>;

export type Datum = Readonly<Record<string, string | number | boolean>>;

export interface ChartTable {
  readonly columns: readonly { readonly title: string; readonly align: "left" | "right" }[];
  readonly rows: readonly (readonly string[])[];
}

export interface Chart {
  /** Stem of its file: letters, digits and hyphens. */
  readonly name: string;
  /** The finding, a sentence made from the data. */
  readonly title: string;
  /** What is plotted, in which units. */
  readonly says: string;
  /** How to read it. */
  readonly caption: string;
  /** Alternative text: what a reader who cannot see the chart needs from it. */
  readonly alt: string;
  /** What is not drawn, and why. */
  readonly notDrawn: readonly string[];
  readonly table: ChartTable;
  readonly spec: Spec;
  /** For each mark's description in the spec, what it stands for. */
  readonly marks: ReadonlyMap<string, Mark>;
  /** Width and height of the drawing in pixels, without its title. */
  readonly size: readonly [number, number];
  readonly margins: Margins;
}

/** What a mark's description stands for: its source, and whether it tells values or only the name. */
export interface Mark {
  readonly source: number;
  readonly values: boolean;
}

/** Collects which description belongs to which source while data are built. */
export class Marks {
  readonly map = new Map<string, Mark>();

  /** Notes that `text` is the name by which marks of `view` go, and returns it. */
  name(view: SourceView, text: string): string {
    this.map.set(text, { source: view.index, values: false });
    return text;
  }

  /** Notes that `text` tells the values of a mark of `view`, and returns it. */
  values(view: SourceView, text: string): string {
    this.map.set(text, { source: view.index, values: true });
    return text;
  }
}

/** Room around the plot, in pixels. */
export interface Margins {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

const FONT = "system-ui, 'Segoe UI', 'Helvetica Neue', Arial, sans-serif";

/** Lines of at most `limit` characters, broken at spaces. */
function wrapped(text: string, limit: number): string[] {
  const lines: string[] = [];
  let line = "";
  for (const word of text.split(" ")) {
    if (line !== "" && line.length + 1 + word.length > limit) {
      lines.push(line);
      line = word;
    } else {
      line = line === "" ? word : `${line} ${word}`;
    }
  }
  return [...lines, line];
}

export interface FrameParts {
  readonly title: string;
  readonly says: string;
  readonly alt: string;
  readonly width: number;
  readonly height: number;
  readonly margins: Margins;
  readonly layer: readonly Spec[];
}

/** The whole specification: title and plain line above, layers within fixed margins. */
export function framed(parts: FrameParts): Spec {
  const { margins, width } = parts;
  const limit = Math.floor((width + margins.left + margins.right - 20) / 8.1);
  const text = wrapped(parts.title, limit);
  const subtitle = wrapped(parts.says, Math.floor(limit * 1.15));
  const head = text.length * 19 + subtitle.length * 16 + 18;
  return {
    $schema: "https://vega.github.io/schema/vega-lite/v6.json",
    description: parts.alt,
    background: PAGE.paper.light,
    width,
    height: parts.height,
    autosize: { type: "none" },
    padding: { left: margins.left, right: margins.right, bottom: margins.bottom, top: margins.top + head },
    title: { text, subtitle, anchor: "start", dx: 8 - margins.left, frame: "group", offset: margins.top },
    layer: parts.layer,
    config: {
      font: FONT,
      view: { stroke: null },
      title: {
        fontSize: 15,
        fontWeight: 600,
        color: PAGE.ink.light,
        subtitleColor: PAGE.soft.light,
        subtitleFontSize: 12.5,
        subtitlePadding: 6,
        lineHeight: 19,
        subtitleLineHeight: 16,
      },
      axis: {
        labelColor: PAGE.soft.light,
        labelFontSize: 12,
        titleColor: PAGE.ink.light,
        titleFontSize: 12,
        titleFontWeight: "normal",
        titlePadding: 8,
        gridColor: PAGE.grid.light,
        domainColor: PAGE.rule.light,
        tickColor: PAGE.rule.light,
      },
      text: { fontSize: 12 },
    },
  };
}

/** The same specification without its title, for a page that sets the title as text. */
export function untitled(spec: Spec, margins: Margins): Spec {
  const { title: _title, ...rest } = spec;
  return { ...rest, padding: margins };
}

/**
 * Moves `wanted` positions apart until neighbours are at least `gap` apart, as little as a single pass each way allows,
 * inside [low, high] where there is room.
 */
export function spread(wanted: readonly number[], gap: number, low: number, high: number): number[] {
  const order = wanted.map((_, i) => i).sort((a, b) => (wanted[a] ?? 0) - (wanted[b] ?? 0) || a - b);
  const out = [...wanted];
  let floor = low;
  for (const i of order) {
    out[i] = Math.max(out[i] ?? 0, floor);
    floor = (out[i] ?? 0) + gap;
  }
  let ceiling = high;
  for (const i of order.reverse()) {
    out[i] = Math.min(out[i] ?? 0, ceiling);
    ceiling = (out[i] ?? 0) - gap;
  }
  return out;
}

/** Powers of ten from the one at or below `low` to the one at or above `high`, thinned to at most `limit`. */
export function powersOfTen(low: number, high: number, limit = 9): number[] {
  const [first, last] = [Math.ceil(Math.log10(low) - 1e-9), Math.floor(Math.log10(high) + 1e-9)];
  const step = Math.max(1, Math.ceil((last - first + 1) / limit));
  const out: number[] = [];
  for (let e = first; e <= last; e += step) out.push(Number(`1e${e}`));
  return out;
}

/** The looks of the families that occur, in words: `Triangles and solid lines: pseudo-random.` */
export function familyKey(view: Pick<View, "sources">, lines: boolean): string {
  const present = FAMILY_ORDER.filter((family) => view.sources.some((s) => s.source.family === family));
  const parts = present.map((family) => {
    const look = FAMILIES[family];
    return `${look.title.toLowerCase()}: ${look.shapeWord}${lines ? `, ${look.dashWord}` : ""}`;
  });
  return `Families keep one look throughout (${parts.join("; ")}).`;
}

/** A list in words: `a`, `a and b`, `a, b and c`; beyond `limit`, `a, b, c and 4 more`. */
export function listed(items: readonly string[], limit = 4): string {
  if (items.length <= 1) return items[0] ?? "";
  if (items.length <= limit) return `${items.slice(0, -1).join(", ")} and ${items[items.length - 1] ?? ""}`;
  return `${items.slice(0, limit - 1).join(", ")} and ${items.length - limit + 1} more`;
}

/** `1 source`, `3 sources`. */
export function counted(n: number, one: string, many = `${one}s`): string {
  return `${n} ${n === 1 ? one : many}`;
}

/** The three channels by which a source is told apart, without legends. */
export function sourceChannels(views: readonly SourceView[]): {
  readonly colour: Spec;
  readonly dash: Spec;
  readonly shape: Spec;
} {
  const domain = views.map((view) => view.index);
  const channel = (pick: (view: SourceView) => unknown): Spec => ({
    field: "source",
    type: "nominal",
    scale: { domain, range: views.map(pick) },
    legend: null,
  });
  return {
    colour: channel((view) => view.ink.light),
    dash: channel((view) => view.family.dash),
    shape: channel((view) => view.family.shape),
  };
}

/** Labels of powers of ten as a Vega expression: 0.001 and above in full, smaller ones as 1e-4. */
export const POWER_LABELS =
  "abs(datum.value) < 0.0009 && datum.value != 0 ? format(datum.value, '.0e') : format(datum.value, ',~g')";

/** Width of an average letter at 12 pixels, for cutting labels; Vega without a canvas can only guess widths, too wide. */
const LETTER = 6.6;

/** A label that fits into `pixels`, cut with an ellipsis. */
export function fitted(label: string, pixels: number): string {
  const most = Math.max(3, Math.floor(pixels / LETTER));
  const letters = [...label];
  return letters.length <= most
    ? label
    : `${letters
        .slice(0, most - 1)
        .join("")
        .trimEnd()}…`;
}

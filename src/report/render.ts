/**
 * Charts to SVG: Vega-Lite compiles the spec, Vega draws it without a browser, its expressions run in Vega's own
 * interpreter, so nothing is evaluated as code. Both packages are heavy and are imported only here, when first used.
 */
import type { Loader, LoggerInterface } from "vega";
import type { TopLevelSpec } from "vega-lite";
import { type Chart, type Spec, untitled } from "./charts/chart.js";
import { PAGE, allInks } from "./look.js";
import { escapeHtml } from "./page/html.js";

export interface Drawing {
  readonly svg: string;
  /** What Vega-Lite or Vega complained of; nothing for a sound chart. */
  readonly warnings: readonly string[];
}

function collector(into: string[]): LoggerInterface {
  const note = (...parts: readonly unknown[]): LoggerInterface => {
    into.push(parts.map(String).join(" "));
    return logger;
  };
  const silent = (): LoggerInterface => logger;
  const level = ((value?: number) => (value === undefined ? 2 : logger)) as LoggerInterface["level"];
  const logger: LoggerInterface = { level, error: note, warn: note, info: silent, debug: silent };
  return logger;
}

/** Charts carry their data; anything that asks for a file or an address is refused. */
function refusingLoader(): Loader {
  const refuse = (uri: string): Promise<never> =>
    Promise.reject(new Error(`chart: loads nothing, asked for ${uri}`));
  return { load: refuse, sanitize: refuse, http: refuse, file: refuse };
}

/** Draws a specification. */
export async function drawSpec(spec: Spec): Promise<Drawing> {
  const [vega, lite, { expressionInterpreter }] = await Promise.all([
    import("vega"),
    import("vega-lite"),
    import("vega-interpreter"),
  ]);
  const warnings: string[] = [];
  const logger = collector(warnings);
  const compiled = lite.compile(spec as unknown as TopLevelSpec, { logger }).spec;
  const runtime = vega.parse(compiled, undefined, { ast: true });
  const view = new vega.View(runtime, {
    renderer: "none",
    expr: expressionInterpreter,
    loader: refusingLoader(),
    logger,
  });
  try {
    await view.runAsync();
    return { svg: await view.toSVG(), warnings };
  } finally {
    view.finalize();
  }
}

const ENTITIES: Record<string, string> = { amp: "&", lt: "<", gt: ">", quot: '"', apos: "'" };

function decoded(text: string): string {
  return text.replace(
    /&(?:#x([0-9a-fA-F]+)|#(\d+)|(\w+));/g,
    (whole, hex?: string, decimal?: string, name?: string) => {
      if (hex !== undefined) return String.fromCodePoint(parseInt(hex, 16));
      if (decimal !== undefined) return String.fromCodePoint(Number(decimal));
      return ENTITIES[name ?? ""] ?? whole;
    },
  );
}

/** Light colours by their custom property. */
function themed(svg: string): string {
  const names = new Map(allInks().map((ink) => [ink.light, ink.variable]));
  return svg.replace(/"(#[0-9a-f]{6})"/g, (whole, hex: string) => {
    const name = names.get(hex);
    return name === undefined ? whole : `"var(${name})"`;
  });
}

/**
 * Coordinates to a tenth of a pixel (points and lines are some 2 pixels wide), no attributes that repeat a default, no
 * width of a stroke that is not drawn (groups set neither): 150 KB of the page of twenty problems by twenty sources.
 */
function slim(svg: string): string {
  return svg
    .replace(/<(?:path|line|rect|text)[^>]*>/g, (tag) =>
      tag.includes(' stroke="')
        ? tag.replace(' stroke-width="1"', "")
        : tag.replace(/ stroke-width="[^"]*"/, ""),
    )
    .replace(/ (?:transform|d|x2|y2)="[^"]*"/g, (attribute) =>
      attribute.replace(/-?\d+\.\d+(?:e-\d+)?/g, (number) =>
        String(Math.round(Number(number) * 10) / 10 + 0),
      ),
    )
    .replace(
      / (?:stroke-dasharray="1,0"|font-size="12px"|text-anchor="start"|[xy]2="0"|transform="translate\(0,0\)")/g,
      "",
    );
}

/**
 * The drawing as it stands in the page: without its title (set as text there), with custom properties for colours, with
 * each mark carrying its source's number (`data-s`) and, where it has one, its exact values in words (`data-tip`).
 */
export async function drawForPage(chart: Chart): Promise<string> {
  const { svg } = await drawSpec(untitled(chart.spec, chart.margins));
  const labelled = slim(svg)
    .replace(/^<svg[^>]*>(<rect[^>]*\/>)?/, "")
    .replace(/<path class="(?:background|foreground)"[^>]*\/>/g, "")
    .replace(
      / (?:role|aria-roledescription|aria-hidden|pointer-events|class|font-family|opacity)="([^"]*)"/g,
      (whole, value) => (whole.startsWith(" opacity") && value !== "1" ? whole : ""),
    )
    .replace(/ aria-label="([^"]*)"/g, (_, label: string) => {
      const text = decoded(label);
      const mark = chart.marks.get(text);
      if (mark === undefined) return "";
      return ` data-s="${mark.source}"${mark.values ? ` data-tip="${escapeHtml(text)}"` : ""}`;
    });
  const [width, height] = chart.size;
  const open = `<svg class="chart" viewBox="0 0 ${width} ${height}" width="${width}" height="${height}" role="img" aria-label="${escapeHtml(chart.alt)}">`;
  return open + themed(labelled);
}

/** The drawing as a file of its own, in the light scheme, with its title. */
export async function drawForFile(chart: Chart): Promise<string> {
  const { svg } = await drawSpec(chart.spec);
  if (!svg.includes(PAGE.paper.light)) throw new Error(`chart ${chart.name}: drawn without its background`);
  return `<?xml version="1.0" encoding="UTF-8"?>\n${svg}\n`;
}

/** Charts: valid by Vega-Lite's published JSON schema, without warnings, the same bytes again, and honest. */
import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { Ajv } from "ajv";
import { describe, expect, it } from "vitest";
import { jsonText } from "../../src/record/json.js";
import type { StudyRecord } from "../../src/record/types.js";
import { type Chart, type Datum, spread } from "../../src/report/charts/chart.js";
import { chartsOf, everyChart } from "../../src/report/charts/index.js";
import { drawForPage, drawSpec } from "../../src/report/render.js";
import { viewRecord } from "../../src/report/view.js";
import { LARGE, sampleRecord } from "./sample-record.js";

// The schema as vega-lite 6.4 publishes it, from its own package.
const schemaFile = createRequire(import.meta.url).resolve("vega-lite/vega-lite-schema.json");
const validate = new Ajv({ strict: false, allErrors: true, validateFormats: false }).compile(
  JSON.parse(readFileSync(schemaFile, "utf8")) as object,
);

function charts(record: StudyRecord): Chart[] {
  return everyChart(chartsOf(viewRecord(record)));
}

function dataOf(chart: Chart): Datum[] {
  const layers = chart.spec["layer"] as readonly { data?: { values: Datum[] } }[];
  return layers.flatMap((layer) => layer.data?.values ?? []);
}

const sample = sampleRecord();
const all = charts(sample);

function named(name: string): Chart {
  const chart = all.find((one) => one.name === name);
  if (chart === undefined) throw new Error(`no chart ${name}`);
  return chart;
}

describe.each(all.map((chart) => [chart.name, chart] as const))("%s", (_, chart) => {
  it("is valid by the published schema", () => {
    expect(validate(chart.spec), JSON.stringify(validate.errors?.slice(0, 3))).toBe(true);
  });

  it("is drawn without a warning", async () => {
    const { svg, warnings } = await drawSpec(chart.spec);
    expect(warnings).toEqual([]);
    expect(svg).toContain("<svg");
  });

  it("says a finding, what is plotted, how to read it, and has an alternative text and its numbers", () => {
    expect(chart.title).toMatch(/^\S.*\.$/s);
    expect(chart.says).toMatch(/\.$/);
    expect(chart.caption.length).toBeGreaterThan(40);
    expect(chart.alt).toContain(chart.title);
    expect(chart.table.rows.length).toBeGreaterThan(0);
    for (const row of chart.table.rows) expect(row.length).toBe(chart.table.columns.length);
    expect(`${chart.title} ${chart.says} ${chart.alt} ${chart.table.rows.flat().join(" ")}`).not.toMatch(
      /NaN|undefined|Infinity/,
    );
  });

  it("holds no number that is not finite", () => {
    for (const datum of dataOf(chart)) {
      for (const value of Object.values(datum)) {
        if (typeof value === "number") expect(Number.isFinite(value)).toBe(true);
      }
    }
  });
});

describe("charts", () => {
  it("are the same bytes when made again from a copy", () => {
    const copy = structuredClone(sample);
    expect(charts(copy).map((chart) => jsonText(chart.spec))).toEqual(
      all.map((chart) => jsonText(chart.spec)),
    );
  });

  it("are drawn to the same bytes again", async () => {
    expect(await drawForPage(named("orders"))).toBe(await drawForPage(named("orders")));
  });

  it("refuse a specification that would load something", async () => {
    const spec = { data: { url: "https://example.org/x.json" }, mark: "point", encoding: {} };
    const { warnings } = await drawSpec(spec);
    expect(warnings.join(" ")).toContain("loads nothing");
  });

  it("stay below 5,000 rows each at twenty problems by twenty sources", () => {
    for (const chart of charts(sampleRecord(LARGE))) {
      const layers = chart.spec["layer"] as readonly { data?: { values: Datum[] } }[];
      const rows = new Set(layers.flatMap((layer) => layer.data?.values ?? []));
      expect(rows.size, chart.name).toBeLessThanOrEqual(5000);
    }
  });
});

describe("error against n", () => {
  it("leaves exact zeros off the log axis and counts them", () => {
    const chart = named("error-against-n-weakest");
    expect(chart.notDrawn.join(" ")).toContain("9 exact results (error 0, or within rounding)");
    expect(dataOf(chart).some((datum) => datum["rmse"] === 0)).toBe(false);
    // They are in the table all the same.
    expect(chart.table.rows.filter((row) => row[0] === "lattice+shift+tent").map((row) => row[2])).toContain(
      "0",
    );
  });

  it("counts cells without a finite error", () => {
    expect(named("error-against-n-guarantee").notDrawn.join(" ")).toContain("9 cells without a finite error");
  });

  it("shows the one error of a deterministic source, without an error bar", () => {
    const halton = dataOf(named("error-against-n-ridge")).filter(
      (d) => d["series"] === "halton" && "about" in d,
    );
    expect(halton.length).toBeGreaterThan(0);
    for (const datum of halton) expect(datum["about"]).toContain("no error bar");
    expect(named("error-against-n-ridge").title).not.toContain("halton");
  });

  it("says that a source is exact rather than that another errs least", () => {
    expect(named("error-against-n-weakest").title).toMatch(/^lattice\+shift\+tent is exact to rounding/);
  });

  it("draws lines through measured points only", () => {
    const chart = named("error-against-n-ridge");
    const sizes = new Set(sample.cells.map((cell) => cell.n));
    for (const datum of dataOf(chart))
      if (datum["about"] !== undefined) expect(sizes.has(datum["n"] as number)).toBe(true);
  });

  it("names the tolerance and warns of heavy tails", () => {
    expect(jsonText(named("error-against-n-ridge").spec)).toContain("tolerance 0.01");
    expect(named("error-against-n-floor").notDrawn.join(" ")).toContain("Heavy-tailed errors");
  });

  it("has a title that follows the data", () => {
    expect(named("error-against-n-ridge").title).toMatch(
      /^sobol\+owen errs least, by .* randu and house never come/,
    );
    const better = structuredClone(sample) as unknown as {
      cells: { source: string; problem: string; rmse: number | null }[];
    };
    for (const cell of better.cells)
      if (cell.source === "philox4x32" && cell.problem === "ridge") cell.rmse = 1e-12;
    const again = charts(better as unknown as StudyRecord).find(
      (chart) => chart.name === "error-against-n-ridge",
    );
    expect(again?.title).toMatch(/^philox4x32 errs least/);
  });

  it("draws nothing where nothing is known", () => {
    const empty = structuredClone(sample) as unknown as { cells: { rmse: number | null }[] };
    for (const cell of empty.cells) Object.assign(cell, { rmse: null, bias: null });
    const names = charts(empty as unknown as StudyRecord).map((chart) => chart.name);
    expect(names.some((name) => name.startsWith("error-against-n"))).toBe(false);
  });
});

describe("bias map", () => {
  it("marks confirmed biases by shape, and only those", () => {
    const cells = dataOf(named("bias-map")).filter((datum) => typeof datum["text"] === "string");
    const marked = new Set(cells.filter((d) => (d["text"] as string).startsWith("◆")).map((d) => d["about"]));
    expect(marked.size).toBe(sample.tests.filter((test) => test.confirmed).length);
    for (const about of marked) expect(about).toContain("confirmed on fresh keys");
  });
});

describe("cost to tolerance", () => {
  it("leaves out sources that never reach it, and names them", () => {
    const chart = named("cost-to-tolerance");
    expect(chart.title).toContain("never within it: randu on 2");
    expect(chart.table.rows.some((row) => row[0] === "Gaussian ridge" && row[1] === "randu")).toBe(false);
    expect(jsonText(chart.spec)).toContain("never: randu and house");
  });
});

describe("labels", () => {
  it("are kept apart inside the drawing", () => {
    const places = spread([100, 101, 102, 300, 299, 5], 14, 4, 376);
    const sorted = [...places].sort((a, b) => a - b);
    for (let i = 1; i < sorted.length; i++)
      expect((sorted[i] ?? 0) - (sorted[i - 1] ?? 0)).toBeGreaterThanOrEqual(14);
    expect(sorted[0]).toBeGreaterThanOrEqual(4);
    expect(sorted[sorted.length - 1]).toBeLessThanOrEqual(376);
  });
});

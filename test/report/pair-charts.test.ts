/** The charts of pairs of a net: valid by Vega-Lite's published schema, drawn without warnings, titles that follow the data. */
import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { Ajv } from "ajv";
import { describe, expect, it } from "vitest";
import { pairGrid, type PairGridData } from "../../src/report/charts/pair-grid.js";
import { pairMap, type PairMapData, type PairPoint } from "../../src/report/charts/pair-map.js";
import { drawForPage, drawSpec } from "../../src/report/render.js";
import { sobol } from "../../src/sources/sobol.js";
import { netOfSource } from "../../src/structure/net.js";
import { pairTValues } from "../../src/structure/t-value.js";

const schemaFile = createRequire(import.meta.url).resolve("vega-lite/vega-lite-schema.json");
const validate = new Ajv({ strict: false, allErrors: true, validateFormats: false }).compile(
  JSON.parse(readFileSync(schemaFile, "utf8")) as object,
);

function gridOf(dimension: number, digits = 10): PairGridData {
  const pairs = pairTValues(netOfSource(sobol, dimension, 2 ** digits));
  return { slug: "sobol", source: "sobol", base: 2, digits, dimension, values: pairs.values };
}

function mapOf(of: (i: number, j: number) => Partial<PairPoint>): PairMapData {
  const { dimension, digits, values } = { ...gridOf(12), dimension: 12 };
  const pairs: PairPoint[] = [];
  for (let j = 1; j < dimension; j++) {
    for (let i = 0; i < j; i++) {
      const t = values[(j * (j - 1)) / 2 + i] ?? 0;
      pairs.push({ indices: [i, j], names: null, t, dependence: 0.001, interval: null, ...of(i, j) });
    }
  }
  return { slug: "season", source: "sobol", problem: "Season guarantee", base: 2, digits, pairs };
}

const interval = { low: 0.03, high: 0.06, level: 0.99 };
const heavy = mapOf((i, j) => (i + j === 12 ? { dependence: 0.045, interval, t: i } : {}));
const charts = [
  ["map", pairMap(heavy)],
  ["map without dependence", pairMap(mapOf(() => ({})))],
  ["grid of 12", pairGrid(gridOf(12))],
  ["grid of 130", pairGrid(gridOf(130))],
] as const;

describe.each(charts)("%s", (_, chart) => {
  it("is valid, is drawn without a warning, and says what it shows", async () => {
    expect(validate(chart?.spec), JSON.stringify(validate.errors?.slice(0, 3))).toBe(true);
    const { svg, warnings } = await drawSpec(chart?.spec ?? {});
    expect(warnings).toEqual([]);
    expect(svg).toContain("<svg");
    if (chart !== null) expect(await drawForPage(chart)).toContain("<svg");
    expect(chart?.title).toMatch(/^\S.*\.$/s);
    expect(chart?.alt).toContain(chart?.title);
    for (const row of chart?.table.rows ?? []) expect(row.length).toBe(chart?.table.columns.length);
    expect(`${chart?.title} ${chart?.alt} ${chart?.caption}`).not.toMatch(/NaN|undefined|Infinity/);
  });
});

describe("pair map", () => {
  it("names the worst of the pairs that matter", () => {
    expect(pairMap(heavy)?.title).toBe(
      "Of 5 pairs that matter to Season guarantee, sobol covers x[6], x[8], 4.5 % of the variance, worst: t = 5 of 10.",
    );
  });

  it("says that bad pairs do not matter where no pair brings 1 % of the variance", () => {
    expect(pairMap(mapOf(() => ({})))?.title).toMatch(/^No pair of coordinates brings 1 % of the variance/);
  });

  it("does not count a pair whose interval holds 0", () => {
    const unsure = mapOf(() => ({ dependence: 0.02, interval: { low: -0.01, high: 0.05, level: 0.99 } }));
    expect(pairMap(unsure)?.title).toMatch(/^No pair/);
  });

  it("has nothing to draw without pairs", () => {
    expect(pairMap({ ...heavy, pairs: [] })).toBeNull();
    expect(pairGrid({ ...gridOf(2), dimension: 1, values: [] })).toBeNull();
  });
});

describe("pair grid", () => {
  it("draws 100 coordinates at most, and says so", () => {
    const chart = pairGrid(gridOf(130));
    expect(chart?.notDrawn[0]).toBe(
      "Only the first 100 of 130 coordinates are drawn; the sentence is about all of them.",
    );
    expect(chart?.table.rows.reduce((sum, [, count]) => sum + Number(count?.replace(",", "")), 0)).toBe(
      (130 * 129) / 2,
    );
  });
});

/** The report of an inspection: its charts valid by Vega-Lite's published schema and drawn without warnings, its page whole. */
import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { Ajv } from "ajv";
import { beforeAll, describe, expect, it } from "vitest";
import type { Chart } from "../../src/report/charts/chart.js";
import { inspectionCharts } from "../../src/report/charts/index.js";
import { viewInspections, type Inspected } from "../../src/report/inspection-view.js";
import { drawSpec } from "../../src/report/render.js";
import { inspectionTexts } from "../../src/report/write.js";
import { parseSource } from "../../src/sources/choice.js";
import { inspectSource } from "../../src/structure/inspection.js";
import { sliceOf, worstVector } from "../../src/structure/slice.js";
import { recordSource } from "../../src/study/spec.js";

const schemaFile = createRequire(import.meta.url).resolve("vega-lite/vega-lite-schema.json");
const validate = new Ajv({ strict: false, allErrors: true, validateFormats: false }).compile(
  JSON.parse(readFileSync(schemaFile, "utf8")) as object,
);

const OWN = { name: "house", congruential: { modulus: "2^35", multiplier: 8193, increment: 1 } };

let inspected: Inspected[];
let charts: Chart[];
let texts: Map<string, string>;
let page: string;

beforeAll(async () => {
  const request = {
    dimensions: [2, 3, 4, 5],
    dimensionsGiven: false,
    points: null,
    streams: 1,
    state: null,
    indices: null,
    span: 4,
  };
  inspected = [];
  for (const spec of ["randu", "minstd-16807", "lattice", "taus88", OWN]) {
    const choice = parseSource(spec);
    const inspection = await inspectSource(choice, request);
    const vector = worstVector(inspection);
    const points = inspection.findings.dual?.latticePoints ?? null;
    const slice = vector === null ? null : sliceOf(choice, vector, points);
    inspected.push({ source: recordSource(choice), inspection, slice, pairs: null });
  }
  const set = inspectionCharts(viewInspections(inspected));
  charts = [...set.across, ...[...set.bySource.values()].flat()];
  texts = await inspectionTexts(inspected, "tolerand inspect randu --note '<b>'");
  page = texts.get("index.html") ?? "";
});

describe("charts of an inspection", () => {
  it("are there for what there is to see", () => {
    expect(charts.map(({ name }) => name)).toEqual([
      "figure-by-dimension",
      "low-bits",
      "slice-randu",
      // 16,807 planes of pairs lie closer than a picture shows, but some points fall between twelve of them
      "slice-minstd-16807",
      "slice-lattice",
      "slice-house",
    ]);
  });

  it("are valid by the published schema, drawn without a warning, and say what they show", async () => {
    for (const chart of charts) {
      expect(validate(chart.spec), `${chart.name} ${JSON.stringify(validate.errors?.slice(0, 3))}`).toBe(
        true,
      );
      const { svg, warnings } = await drawSpec(chart.spec);
      expect([chart.name, warnings]).toEqual([chart.name, []]);
      expect(svg).toContain("<svg");
      expect(chart.title).toMatch(/^\S.*\.$/s);
      expect(chart.caption.length).toBeGreaterThan(40);
      expect(chart.table.rows.every((row) => row.length === chart.table.columns.length)).toBe(true);
      expect(JSON.stringify([chart.title, chart.says, chart.alt, chart.table])).not.toMatch(
        /NaN|undefined|Infinity/,
      );
    }
  });

  it("name what stands out", () => {
    expect(charts[0]?.title).toBe(
      "randu falls to S = 0.0075 in dimension 3 and house falls to S = 0.0087 in dimension 4; the others stay at 0.3375 or above.",
    );
    expect(charts[1]?.title).toBe(
      "The lowest bit of randu never changes and the lowest bit of house repeats every 2 outputs.",
    );
  });

  it("show RANDU's points on planes, and none of a sound source's", () => {
    const [randu] = inspected;
    const off = (points: readonly (readonly [number, number])[] = []): number =>
      points.filter(([value]) => Math.abs(value - Math.round(value)) > 0.01).length;
    expect(randu?.slice?.vector).toEqual([9n, -6n, 1n]);
    expect(randu?.slice?.points).toHaveLength(500);
    expect(off(randu?.slice?.points)).toBe(0);
    // chance leaves 98 % away from whole numbers: fewer than 450 of 500 has a probability below 1e-20
    expect(off(randu?.slice?.sound)).toBeGreaterThan(450);
  });
});

describe("the page of an inspection", () => {
  it("opens with what stands out, and has a section per source", () => {
    expect(page).toContain("<h1>Structure of 5 sources</h1>");
    expect(page).toMatch(/randu: tuples .* worst in dimension 3, where 15 planes hold them/);
    expect(page).toContain(
      "taus88: equidistribution: Maximally equidistributed: no gap for any of its 32 bits.",
    );
    for (const id of ["randu", "minstd-16807", "lattice", "taus88", "house"]) {
      expect(page).toContain(`id="source-${id}"`);
    }
    expect(page).toContain("--note &#39;&lt;b&gt;&#39;");
  });

  it("loads nothing, runs nothing, and leads only to places and files that it has", () => {
    expect(page).not.toMatch(/<script|<link|<img|https?:\/\/(?!www\.w3\.org)/);
    expect(page).toContain("script-src &#39;none&#39;");
    const ids = [...page.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id);
    expect(new Set(ids).size).toBe(ids.length);
    for (const [, target] of page.matchAll(/ href="#([^"]+)"/g)) expect(ids).toContain(target);
    for (const [, file] of page.matchAll(/ href="(charts\/[^"]+)"/g))
      expect(texts.has(file ?? "")).toBe(true);
  });

  it("keeps the data beside it", () => {
    const data = JSON.parse(texts.get("inspection.json") ?? "") as readonly { readonly source: string }[];
    expect(data.map(({ source }) => source)).toEqual(["randu", "minstd-16807", "lattice", "taus88", "house"]);
  });
});

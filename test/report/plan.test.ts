/** The report of a plan: charts valid by Vega-Lite's published JSON schema and drawn without warnings, a page that escapes. */
import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { Ajv } from "ajv";
import { describe, expect, it } from "vitest";
import { allocationOf } from "../../src/findings/allocation-plan.js";
import { assembleRecord } from "../../src/findings/assemble.js";
import { planOf, type PlanOptions } from "../../src/findings/plan.js";
import { planTexts } from "../../src/report/write.js";
import { drawSpec } from "../../src/report/render.js";
import { planText } from "../../src/report/plan-text.js";
import { makeAssembly, makeProblem, makeSeries, makeSource } from "../findings/make.js";

const schemaFile = createRequire(import.meta.url).resolve("vega-lite/vega-lite-schema.json");
const validate = new Ajv({ strict: false, allErrors: true, validateFormats: false }).compile(
  JSON.parse(readFileSync(schemaFile, "utf8")) as object,
);

const OPTIONS: PlanOptions = {
  secondsPerPoint: null,
  randomisations: 1,
  seconds: 1,
  nearestSize: (_, n) => n,
};
const problems = [makeProblem("p", { title: "A <b>bold</b> title" }), makeProblem("q")];
const cells = ["p", "q"].flatMap((problem) => [
  ...makeSeries({ problem, noise: problem === "p" ? 4 : 0.2 }),
  ...makeSeries({ problem, source: "sobol+owen", order: 1, noise: 4 }),
]);
const sources = [
  makeSource("philox4x32"),
  makeSource("sobol+owen", { family: "quasi-random", randomisations: ["owen"] }),
];
const record = assembleRecord(makeAssembly(cells, { problems, sources }));
const plans = planOf(record, OPTIONS);
const allocation = allocationOf(
  record,
  { weights: { p: 3, q: -1 }, tolerance: 0.1, confidence: 0.99 },
  OPTIONS,
);
const texts = await planTexts({ record, plans, allocation, command: "tolerand plan p q" });

describe("a plan's report", () => {
  it("has a chart for each problem and one of the allocation, valid and without warnings", async () => {
    const names = [...texts.keys()].filter((name) => name.endsWith(".vl.json"));
    expect(names).toEqual(["charts/plan-p.vl.json", "charts/plan-q.vl.json", "charts/allocation.vl.json"]);
    for (const name of names) {
      const spec = JSON.parse(texts.get(name) ?? "") as Record<string, unknown>;
      expect(validate(spec), `${name} ${JSON.stringify(validate.errors?.slice(0, 3))}`).toBe(true);
      expect((await drawSpec(spec)).warnings).toEqual([]);
    }
  });

  it("tells the recommendation, the scope and the command, and takes titles as text", () => {
    const page = texts.get("index.html") ?? "";
    expect(page).toContain("Recommended: ");
    expect(page).toContain("A plan bounds the numerical error of the integral, not the model.");
    expect(page).toContain("tolerand plan p q");
    expect(page).toContain("A &lt;b&gt;bold&lt;/b&gt; title");
    expect(page).not.toContain("<b>bold</b>");
    expect(page).not.toMatch(/NaN|undefined|Infinity/);
  });

  it("marks in the text what is recommended and what the time buys", () => {
    const text = planText(plans);
    expect(text).toMatch(/→ {2}sobol\+owen/);
    expect(text).toMatch(/the time buys [\d,]+ points: /);
  });
});

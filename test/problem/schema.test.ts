import { readFile, readdir } from "node:fs/promises";
import { Ajv2020 } from "ajv/dist/2020.js";
import { expect, test } from "vitest";
import { shippedFolder, shippedSuites } from "../../src/problem/catalogue.js";
import { parseYaml, readText } from "../../src/problem/document.js";
import { problemJsonSchema, suiteJsonSchema } from "../../src/problem/schema.js";
import { problemTemplate } from "../../src/problem/template.js";
import { join } from "node:path";
import { keyTable } from "./key-table.js";
import { problemIn } from "./text.js";

test("the tables of docs/problem-file.md are those of the schema", async () => {
  const text = await readFile(new URL("../../docs/problem-file.md", import.meta.url), "utf8");
  // The formatter pads the cells of a table; only their contents count.
  const squeeze = (table: string) => table.replaceAll(/ +/g, " ").replaceAll(/-{3,}/g, "---").trim();
  for (const [name, schema] of [
    ["problem", problemJsonSchema()],
    ["suite", suiteJsonSchema()],
  ] as const) {
    const table = text.split(`<!-- ${name} keys -->`)[1]?.split("<!-- end -->")[0] ?? "";
    expect(squeeze(table), `table of ${name} keys`).toBe(squeeze(keyTable(schema)));
  }
});

test("the example of docs/problem-file.md is a problem", async () => {
  const text = await readFile(new URL("../../docs/problem-file.md", import.meta.url), "utf8");
  const examples = [...text.matchAll(/```yaml\n(.*?)```/gs)].map((match) => match[1] ?? "");
  expect(examples).toHaveLength(1);
  expect((await problemIn(examples[0] ?? "")).dimension).toBe(64);
});

test("the published schema is valid and accepts every shipped file and the template", async () => {
  const ajv = new Ajv2020({ strict: false });
  const problem = ajv.compile(problemJsonSchema());
  const suite = ajv.compile(suiteJsonSchema());
  for (const name of await shippedSuites()) {
    for (const file of await readdir(shippedFolder(name))) {
      const { value } = parseYaml(file, await readText(join(shippedFolder(name), file)));
      const validate = file === "suite.yaml" ? suite : problem;
      expect(validate(value), `${name}/${file}: ${ajv.errorsText(validate.errors)}`).toBe(true);
    }
  }
  expect(problem(parseYaml("new.yaml", problemTemplate("new")).value)).toBe(true);
});

test("the published schema refuses what the program refuses", () => {
  const validate = new Ajv2020({ strict: false }).compile(problemJsonSchema());
  const good = { inputs: { x: { distribution: "uniform" } }, integrand: "x", tolerance: { absolute: 1 } };
  expect(validate(good)).toBe(true);
  expect(validate({ ...good, tolerence: 1 })).toBe(false);
  expect(validate({ ...good, integrand: 5 })).toBe(false);
  expect(validate({ ...good, inputs: { x: { distribution: "normall" } } })).toBe(false);
  expect(validate({ ...good, inputs: { x: { distribution: "weibull", shape: 2 } } })).toBe(true);
  expect(validate({ ...good, inputs: { x: { distribution: "weibull", shap: 2 } } })).toBe(false);
  expect(validate({ ...good, inputs: { "2x": { distribution: "normal" } } })).toBe(false);
  expect(validate({ integrand: "x", tolerance: {} })).toBe(false);
});

/** The language table: every kernel it names exists, every function compiles, the reference page is up to date. */
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { format, resolveConfig } from "prettier";
import { describe, expect, test } from "vitest";
import { FUNCTIONS, compileFormula, languageTables } from "../../src/formula/index.js";
import { KernelModule } from "../../src/formula/emit/module.js";
import { kernelBytes } from "../../src/kernels/instance.js";
import { KERNELS, isKernelName, kernelExport } from "../../src/formula/primitives.js";
import { vectorScope } from "./run.js";

const module = new KernelModule(kernelBytes());

test.each(Object.keys(KERNELS).filter(isKernelName))(
  "kernel %s is in the module with its arguments",
  (name) => {
    const { type } = module.functionOf(kernelExport(name));
    expect(type.parameters).toHaveLength(KERNELS[name]);
    expect(type.results).toHaveLength(1);
  },
);

describe.each(Object.entries(FUNCTIONS))("%s", (name, { arguments: [least, most], shape }) => {
  const argument = shape === "elementwise" ? "x[1]" : "x";
  const call = (count: number): string =>
    `sum([sum(${name}(${new Array(count).fill(argument).join(", ")}) * [1, 1])])`;

  test("compiles", async () => {
    const formula = await compileFormula(
      shape === "vector" ? `sum(${name}(x))` : `${name}(${new Array(least).fill(argument).join(", ")})`,
      vectorScope("x", 3),
    );
    expect(WebAssembly.validate(formula.moduleBytes)).toBe(true);
  });

  test("refuses a wrong number of arguments", async () => {
    const wrong = most === Infinity ? 0 : most + 1;
    await expect(compileFormula(call(wrong), vectorScope("x", 3))).rejects.toThrow(`${name} takes`);
  });
});

test("docs/formula.md holds the tables of the registry (else run tools/language-page.mjs)", async () => {
  const page = readFileSync(new URL("../../docs/formula.md", import.meta.url), "utf8");
  const options = await resolveConfig(fileURLToPath(new URL("../../docs/formula.md", import.meta.url)));
  expect(page.endsWith(await format(languageTables(), { ...options, parser: "markdown" }))).toBe(true);
});

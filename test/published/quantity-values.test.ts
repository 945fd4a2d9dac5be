/**
 * Exact values of the suite `quantities` against values found by another way: quadrature and root finding on densities and
 * distribution functions with mpmath 1.3 at 30 digits (data/quantity-values.py), and a study of it against the references.
 */
import { beforeAll, expect, test } from "vitest";
import { loadPaths } from "../../src/problem/load.js";
import type { LoadedProblem } from "../../src/problem/load.js";
import { readFile } from "node:fs/promises";
import { runSpec } from "../study/fixtures.js";
import { buildSpec } from "../../src/study/settings.js";

let problems: readonly LoadedProblem[] = [];
let values: Readonly<Record<string, string>> = {};
beforeAll(async () => {
  ({ problems } = await loadPaths(["quantities"]));
  const url = new URL("data/quantity-values.json", import.meta.url);
  ({ values } = JSON.parse(await readFile(url, "utf8")) as { values: typeof values });
});

test("references agree with independent values", () => {
  expect(problems.map(({ problem }) => problem.id).sort()).toEqual(Object.keys(values).sort());
  for (const { problem } of problems) {
    const relative = (problem.reference?.value ?? NaN) / Number(values[problem.id]) - 1;
    expect(Math.abs(relative), problem.id).toBeLessThan(1e-13);
  }
});

test("a study finds no bias beyond that of finite n, and names each quantity", async () => {
  const settings = { sources: ["philox4x32", "sobol+owen"], sizes: [1024, 4096], replicates: 32 };
  const record = await runSpec(buildSpec(problems, settings).spec);
  const names = new Set(record.budgets.map((budget) => budget.output));
  expect([...names].sort()).toEqual(
    [
      "probability",
      "quantile 0.05",
      "quantile 0.99",
      "ratio",
      "shortfall 0.95",
      "shortfall 0.975",
      "variance",
    ].sort(),
  );
  expect(record.tests.filter((one) => one.confirmed)).toEqual([]);
  for (const cell of record.cells) {
    const [low, high] = cell.finiteBias ?? [0, 0];
    // Six standard errors of 32 replicates: Student's t beyond that once in a million.
    const error = 6 * (cell.biasStandardError ?? NaN);
    expect(cell.bias, `${cell.problem} ${cell.source}`).toBeGreaterThan(low - error);
    expect(cell.bias, `${cell.problem} ${cell.source}`).toBeLessThan(high + error);
  }
});

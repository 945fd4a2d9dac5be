/**
 * Exact values of the shipped problems against values found by another way: quadrature with mpmath at 40 digits
 * (data/problem-values.py says how for each). Shipped digits and closed forms must agree to 2e-13 relative, the
 * rounding of a few dozen operations in double precision, and of a difference from 1 in mooring-lines (measured: 6e-14
 * there, below 2e-14 elsewhere).
 */
import { readFile } from "node:fs/promises";
import { beforeAll, expect, test } from "vitest";
import { loadPaths } from "../../src/problem/load.js";
import type { LoadedProblem } from "../../src/problem/load.js";

let problems: readonly LoadedProblem[] = [];
let values: Readonly<Record<string, { value: string; how: string }>> = {};
beforeAll(async () => {
  problems = (await loadPaths(["classic", "inputs", "planes", "tidal", "tour"])).problems;
  const url = new URL("data/problem-values.json", import.meta.url);
  ({ values } = JSON.parse(await readFile(url, "utf8")) as { values: typeof values });
});

test("every shipped problem with a reference has an independent value, and every value a problem", () => {
  const withReference = problems.filter(({ problem }) => problem.reference !== null);
  expect(withReference.map(({ problem }) => problem.id).sort()).toEqual(Object.keys(values).sort());
  expect(withReference.length).toBeGreaterThan(30);
});

test("they agree", () => {
  for (const { problem } of problems) {
    if (problem.reference === null) continue;
    const exact = Number(values[problem.id]?.value);
    const relative = Math.abs(problem.reference.value / exact - 1);
    expect(relative, problem.id).toBeLessThan(2e-13);
  }
});

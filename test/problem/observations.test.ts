/** Empirical inputs from a CSV column: the values, and what is said of files that do not serve. */
import { mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import { loadProblem } from "../../src/problem/load.js";
import { fileWith } from "./text.js";

let folder = "";
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), "observations-"));
  await writeFile(join(folder, "tides.csv"), "month,height\n1,2.5\n2,1.25\n3,2.5\n");
  await writeFile(join(folder, "broken.csv"), "height\n1\nhigh\n");
});
afterAll(() => rm(folder, { recursive: true }));

async function load(input: string) {
  const file = join(folder, "case.yaml");
  await writeFile(file, fileWith({ inputs: `{ x: { distribution: ${input} } }`, integrand: "x" }));
  return loadProblem(file);
}

test("a column is read in its order", async () => {
  const { problem } = await load("empirical, file: tides.csv, column: height");
  expect(problem.inputs[0]?.parameters).toEqual({ values: [2.5, 1.25, 2.5] });
});

test.each([
  ["empirical, file: tides.csv", "expected a column of tides.csv (month, height), found nothing"],
  [
    "empirical, file: tides.csv, column: depth",
    'expected a column of tides.csv (month, height), found "depth"',
  ],
  [
    "empirical, file: broken.csv",
    'expected numbers in column "height", found "high" on line 3 of broken.csv',
  ],
  [
    "empirical, file: ../x.csv",
    'expected a path in the folder of the problem file, found "../x.csv", which leaves it',
  ],
  ["empirical, file: none.csv", "cannot be opened (ENOENT)"],
  ["empirical, column: height", "file is missing"],
  ["empirical", "values is missing"],
  ["empirical, file: tides.csv, values: [1]", "expected values or file, found both"],
  ["normal, file: tides.csv", 'unknown key "file" in inputs.x'],
])("%s", async (input, message) => {
  await expect(load(input)).rejects.toThrow(message);
});

/** Studies of problems whose inputs are not plain uniforms or normals: every kind runs, is judged and can be read back. */
import { expect, it } from "vitest";
import { loadPaths } from "../../src/problem/load.js";
import { parseRecord } from "../../src/record/schema.js";
import { runSpec, specOf } from "./fixtures.js";

it("the suite of inputs: within five standard errors, with a budget, and the same when read back", async () => {
  const { problems } = await loadPaths(["inputs"]);
  const all = problems.map(({ problem }) => problem);
  const record = await runSpec(specOf(all, { sizes: [64, 1024], replicates: 16, sources: ["philox4x32"] }));
  expect(parseRecord(JSON.parse(JSON.stringify(record))).problems).toEqual(record.problems);
  for (const { id, reference } of all) {
    const cell = record.cells.find((one) => one.problem === id && one.n === 1024);
    // t with 15 degrees of freedom beyond 5.5: 6e-5 both ways, below 1e-3 over the suite
    expect(Math.abs((cell?.mean ?? NaN) - (reference?.value ?? NaN)), id).toBeLessThan(
      5.5 * (cell?.biasStandardError ?? NaN),
    );
    const line = record.budgets
      .find((one) => one.problem === id)
      ?.lines.find((one) => one.line === "transform");
    expect(line?.value, id).not.toBeNull();
  }
  const value = (id: string): number =>
    record.budgets.find((one) => one.problem === id)?.lines.find(({ line }) => line === "transform")?.value ??
    NaN;
  // E|t| = 1 moved by the stated 1e-12, and a sum over a discrete law moved by its gamma alone
  expect(value("rough-seas")).toBeGreaterThan(0.8e-12);
  expect(value("rough-seas")).toBeLessThan(1.3e-12);
  expect(value("storm-repairs") / 48.75).toBeLessThan(1.3e-12);
});

// `--sources all`: every source with an error bar goes through a study as any other.
import { expect, it } from "vitest";
import { settingsFromFlags } from "../../src/cli/study-flags.js";
import { comparableSources } from "../../src/sources/choice.js";
import { listSources } from "../../src/sources/registry.js";
import { fakeIo } from "../cli/io.js";
import { problem, runSpec, specOf } from "./fixtures.js";

it("stands for every repeatable source, a quasi-random one with each of its randomisations", () => {
  const all = comparableSources();
  expect(settingsFromFlags({ sources: "all" }, fakeIo()).sources).toEqual(all);
  expect(settingsFromFlags({ sources: "all,sobol" }, fakeIo()).sources).toEqual([...all, "sobol"]);
  for (const { id, repeatable, randomisations } of listSources()) {
    const alone = randomisations.filter((name) => name !== "tent").map((name) => `${id}+${name}`);
    const expected = repeatable === false ? [] : randomisations.length === 0 ? [id] : alone;
    const found = all.filter((name) => name === id || expected.includes(name));
    expect(found.sort()).toEqual([...expected].sort());
  }
  expect(all).toContain("latin-hypercube");
  expect(all).not.toContain("sobol");
  expect(all).not.toContain("system");
});

it("runs through, and finds no bias in the mean of a sum", async () => {
  const sources = comparableSources();
  const sum = problem("sum", "mean(x)", { dimension: 2 });
  const record = await runSpec(specOf([sum], { sources, sizes: [64, 256], replicates: 8 }));
  expect(record.sources.map(({ id }) => id)).toEqual(sources);
  // per-size sources may map both sizes to their own; each has a test at its largest
  expect(record.tests).toHaveLength(sources.length);
  expect(record.tests.filter(({ confirmed }) => confirmed)).toEqual([]);
  expect(record.cells.filter(({ nonFinite }) => nonFinite !== null)).toEqual([]);
  expect(record.warnings.filter((text) => text.includes("same points"))).toEqual([]);
});

// What is recommended and how far: sources of known structure are no advice, endless numbers of points are not printed.
import { describe, expect, it } from "vitest";
import { assembleRecord } from "../../src/findings/assemble.js";
import { formatReach } from "../../src/findings/format.js";
import { headlinesOf } from "../../src/findings/headline.js";
import { makeAssembly, makeCell, makeProblem, makeSeries, makeSource } from "./make.js";

const RANDU = makeSource("randu", { knownStructure: "planes in three dimensions" });

describe("advice", () => {
  it("passes over the cheaper source where its structure is known", () => {
    const cells = [
      ...makeSeries({ noise: 0.1, source: "randu", secondsPerPoint: 1e-9 }),
      ...makeSeries({ noise: 0.1, seed: 2 }),
    ];
    const record = assembleRecord(makeAssembly(cells, { sources: [RANDU, makeSource("philox4x32")] }));
    const words = headlinesOf(record)[0]?.sentences.join(" ") ?? "";
    expect(words).toContain("The least effort for it: philox4x32");
  });

  it("says more than 10^15 points without a cost", () => {
    expect(formatReach({ n: 2e15, interval: [1e15, 4e15] })).toBe("more than 10^15");
    const problems = [
      makeProblem("p", { tolerance: { absolute: 1e-9, relative: null, to: "reference", confidence: 0.99 } }),
    ];
    const [row] = assembleRecord(makeAssembly(makeSeries({}), { problems })).convergence;
    expect(row?.reach?.n).toBeGreaterThan(1e15);
    expect(row?.cost).toBeNull();
  });

  it("takes the smallest n and no order where every estimate is exact to rounding", () => {
    const estimates = Array.from({ length: 32 }, (_, r) => 1 + (r % 3) * Number.EPSILON);
    const cells = [64, 256, 1024, 4096].map((n) => makeCell({ n, estimates }));
    const [row] = assembleRecord(makeAssembly(cells)).convergence;
    expect(row).toMatchObject({ order: null, reach: { n: 64, interval: [64, 64], extrapolated: false } });
  });

  it("writes the basis of a reference without its full stop", () => {
    const reference = { value: 1, text: "1", uncertainty: 0, basis: "By symmetry. " };
    const problems = [makeProblem("p", { reference })];
    const record = assembleRecord(makeAssembly(makeSeries({}), { problems }));
    expect(headlinesOf(record)[0]?.task).toMatch(/\(By symmetry\)$/);
  });
});

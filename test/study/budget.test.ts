// What a study measures for its budgets, by the engine: bits, rounding, inverse normals; and integrands that have no budget.
import { describe, expect, it } from "vitest";
import type { BudgetLine, StudyRecord } from "../../src/record/types.js";
import { parseRecord } from "../../src/record/schema.js";
import { problem, runSpec, specOf } from "./fixtures.js";

const QUICK = { sizes: [64, 256, 1024], replicates: 16 };
const exact = (value: number) => ({ value, text: String(value), uncertainty: 0, basis: "elementary" });

const lineOf = (record: StudyRecord, name: string, source = "philox4x32"): BudgetLine | undefined =>
  record.budgets.find((one) => one.source === source)?.lines.find(({ line }) => line === name);

describe("measured lines", () => {
  it("few bits of a source cost what theory says", async () => {
    // The middle of a cell of width w in place of u in u^2: -w^2 / 12; w = 2^-6.
    const coarse = { name: "coarse", source: "philox4x32", bits: "top 6" };
    const square = problem("square", "x[1]^2", { dimension: 1, reference: exact(1 / 3) });
    const record = await runSpec(specOf([square], { ...QUICK, sources: [coarse, "philox4x32"] }));
    const line = lineOf(record, "source resolution", "coarse");
    expect(line?.value).toBeGreaterThanOrEqual(2 ** -12 / 12);
    expect(line?.value).toBeLessThan((1.2 * 2 ** -12) / 12);
    const again = parseRecord(JSON.parse(JSON.stringify(record)));
    expect(again.measurements).toEqual(record.measurements);
  });

  it("cancellation shows in the arithmetic", async () => {
    const lossy = problem("lossy", "((1e9 + x[1]) - 1e9) + 0 * x[2]", { dimension: 2 });
    const record = await runSpec(specOf([lossy], { ...QUICK, sources: ["philox4x32"] }));
    const line = lineOf(record, "arithmetic");
    // 1e9 has units in the last place of 1.2e-7: errors of up to half of it.
    expect(line?.value).toBeGreaterThan(1e-10);
    expect(line?.value).toBeLessThan(1.2e-7);
  });

  it("inverse normals are exact to some units in the last place", async () => {
    const inputs = [{ name: "z", distribution: "normal" as const, length: 2, first: 0 }];
    const smooth = problem("smooth", "exp(z[1] / 4) + z[2]", {
      dimension: 2,
      inputs,
      reference: exact(Math.exp(1 / 32)),
    });
    const record = await runSpec(specOf([smooth], { ...QUICK, sources: ["philox4x32"] }));
    const line = lineOf(record, "transform");
    expect(line?.value).toBeGreaterThan(0);
    expect(line?.value).toBeLessThan(1e-15);
  });

  it("is the same on every run", async () => {
    const one = problem("one", "max(x[1] - 0.3, 0) * exp(x[2])", { dimension: 2 });
    const spec = specOf([one], { ...QUICK, sources: ["mt19937"] });
    const [a, b] = [await runSpec(spec), await runSpec(spec)];
    expect(a.measurements).toEqual(b.measurements);
  });
});

describe("integrands without a budget", () => {
  it("an infinite variance is found and every interval withdrawn", async () => {
    // x^(-2/3) has mean 3 and tail index 3/2.
    const wild = problem("wild", "x[1]^(-2/3)", { dimension: 1, reference: exact(3) });
    const sizes = [256, 512, 1024, 2048, 4096, 8192];
    const record = await runSpec(specOf([wild], { sizes, replicates: 32, sources: ["philox4x32", "pcg64"] }));
    expect(record.budgets.map(({ verdict }) => verdict)).toEqual(["none", "none"]);
    expect(record.warnings).toContainEqual(
      expect.stringMatching(/^wild: no finite variance: .* intervals and tests are withdrawn$/),
    );
  });

  it("a heavy but finite one keeps them", async () => {
    // x^(-1/4) has mean 4/3 and tail index 4.
    const tame = problem("tame", "x[1]^(-1/4)", { dimension: 1, reference: exact(4 / 3) });
    const record = await runSpec(specOf([tame], { ...QUICK, sources: ["philox4x32"] }));
    expect(record.warnings.filter((text) => text.includes("finite variance"))).toEqual([]);
    expect(record.budgets[0]?.verdict).not.toBe("none");
  });

  it("a constant integrand is said to be one", async () => {
    const flat = problem("flat", "0 * x[1] + 0.5", { dimension: 1 });
    const record = await runSpec(specOf([flat], { ...QUICK, sources: ["philox4x32"] }));
    expect(record.warnings).toContain(
      "flat: the integrand had one value at all of 65,536 points; if it is constant there is nothing to integrate",
    );
    expect(record.spreadTests[0]?.reason).toBe("the integrand does not vary within a replicate");
    expect(record.budgets[0]?.verdict).toBe("within");
  });

  it("replicates that all gave one value are said", async () => {
    // 256 points of a source of period 256 are all its states, whatever the seed.
    const cycle = { name: "cycle", congruential: { modulus: 256, multiplier: 5, increment: 1 } };
    const one = problem("one", "x[1]^2", { dimension: 1, reference: exact(1 / 3) });
    const record = await runSpec(
      specOf([one], { sizes: [64, 256], replicates: 16, sources: [cycle, "philox4x32"] }),
    );
    expect(record.warnings).toContain(
      "one, cycle: all 16 replicates gave the same value at 256 points; their deviation says nothing of the error",
    );
  });
});

import { describe, expect, it } from "vitest";
import { assembleRecord } from "../../src/findings/assemble.js";
import { planOf, type PlanOptions, type ProblemPlan } from "../../src/findings/plan.js";
import { studentFactor } from "../../src/numeric/student.js";
import type { RawCell, RecordSource } from "../../src/record/types.js";
import { makeAssembly, makeConfirmation, makeProblem, makeSeries, makeSource } from "./make.js";

const OPTIONS: PlanOptions = {
  secondsPerPoint: null,
  randomisations: 1,
  seconds: null,
  nearestSize: (_, n) => n,
};
const NET: Partial<RecordSource> = { family: "quasi-random", randomisations: ["owen"], period: null };

function plan(
  cells: RawCell[],
  sources: RecordSource[],
  options: Partial<PlanOptions> = {},
  changes: Parameters<typeof makeAssembly>[1] = {},
): ProblemPlan {
  const record = assembleRecord(makeAssembly(cells, { sources, ...changes }));
  return planOf(record, { ...OPTIONS, ...options })[0] as ProblemPlan;
}

const sobol = (options: Parameters<typeof makeSeries>[0] = {}) =>
  makeSeries({ source: "sobol+owen", order: 1, ...options });

describe("the n of a plan", () => {
  it("is k^2 sigma^2 / tolerance^2 for independent points without a bias (expected n)", () => {
    // Sigma 1, tolerance 0.01: (k / 0.01)^2, k Student's factor at 31 degrees of freedom; a deviation from 32 replicates at
    // several independent sizes is known within some 10 %, its square within 20 %. The theorem takes the bias line away.
    const cells = makeSeries({ noise: 1, replicates: 32 });
    const shifted = makeSource("philox4x32", { randomisations: ["shift"] });
    const [one] = plan(cells, [shifted]).sources;
    const exact = (studentFactor(0.99, 31) / 0.01) ** 2;
    expect((one?.expected ?? 0) / exact).toBeGreaterThan(0.7);
    expect((one?.expected ?? 0) / exact).toBeLessThan(1.4);
    expect(one?.interval?.[0]).toBeLessThan(one?.expected ?? 0);
    expect(one?.interval?.[1]).toBe(one?.point?.n);
    expect(one?.point?.interval[1]).toBeLessThanOrEqual(0.01);
  });

  it("is a size measured or a doubling for a quasi-random source", () => {
    const { recommended } = plan(sobol({ noise: 4 }), [makeSource("sobol+owen", NET)]);
    expect(Math.log2(recommended?.point?.n ?? 0) % 1).toBe(0);
    expect(recommended?.point?.interval[1]).toBeLessThanOrEqual(0.01);
    expect(recommended?.replicates).toBe(32);
  });

  it("counts evaluations in all where M randomisations are averaged, and sigma falls with the root of M", () => {
    const sources = [makeSource("sobol+owen", { ...NET })];
    const one = plan(sobol({ order: 0.5 }), sources).recommended;
    const four = plan(sobol({ order: 0.5 }), sources, { randomisations: 4 }).recommended;
    expect(four?.randomisations).toBe(4);
    expect(four?.point?.n).toBe(one?.point?.n);
    expect(four?.point?.total).toBeCloseTo(one?.point?.total ?? NaN, 3);
  });

  it("is marked beyond four times the largest n measured", () => {
    const near = plan(makeSeries({ noise: 0.1 }), [makeSource("philox4x32")]).recommended;
    const far = plan(makeSeries({ noise: 10 }), [makeSource("philox4x32")]).recommended;
    expect([near?.extrapolated, far?.extrapolated]).toEqual([false, true]);
  });
});

describe("cost", () => {
  const cells = [
    ...makeSeries({ noise: 0.3, secondsPerPoint: 1e-9 }),
    ...sobol({ noise: 4, secondsPerPoint: 1e-6 }),
  ];
  const sources = [makeSource("philox4x32"), makeSource("sobol+owen", NET)];

  it("is n times the measured seconds per point, and ranks", () => {
    const { sources: ranked } = plan(cells, sources);
    expect(ranked.map(({ source }) => source)).toEqual(["philox4x32", "sobol+owen"]);
    expect(ranked[0]?.seconds).toBeCloseTo((ranked[0]?.point?.n ?? 0) * 1e-9, 15);
  });

  it("follows the user's own seconds per point", () => {
    const { sources: ranked } = plan(cells, sources, { secondsPerPoint: 0.001 });
    expect(ranked.map(({ source }) => source)).toEqual(["sobol+owen", "philox4x32"]);
    expect(ranked[0]?.userSeconds).toBeCloseTo((ranked[0]?.point?.n ?? 0) * 0.001, 10);
  });

  it("turned round: what a time budget buys", () => {
    const [one] = plan(cells, sources, { secondsPerPoint: 0.001, seconds: 10 }).sources.filter(
      ({ source }) => source === "philox4x32",
    );
    expect(one?.affordable?.n).toBe(10_000);
  });
});

describe("what is never reached, and what is not recommended", () => {
  it("names a confirmed bias that takes the tolerance", () => {
    const cells = makeSeries({ source: "randu", bias: 0.05, noise: 0.1 });
    const made = { confirmations: [makeConfirmation(0.05, 0.1 / 64, "randu")] };
    const { sources, recommended } = plan(cells, [makeSource("randu")], {}, made);
    expect(sources[0]?.status).toBe("never");
    expect(sources[0]?.reason).toMatch(/^source structure alone takes 0\.05\d?, whatever n$/);
    expect(recommended).toBeNull();
  });

  it("names declared lines that take the tolerance", () => {
    const declared = [{ line: "weekly time step", kind: "bias" as const, value: 0.02, basis: "b" }];
    const problems = [makeProblem("p", { declared })];
    const { sources } = plan(makeSeries({}), [makeSource("philox4x32")], {}, { problems });
    expect(sources[0]?.reason).toBe("weekly time step alone takes 0.020, whatever n");
  });

  it("passes over a cheaper source with known structure", () => {
    const cells = [
      ...makeSeries({ source: "old", noise: 0.1, secondsPerPoint: 1e-10 }),
      ...makeSeries({ noise: 0.1 }),
    ];
    const sources = [makeSource("old", { knownStructure: "15 planes" }), makeSource("philox4x32")];
    const made = plan(cells, sources);
    expect(made.sources[0]?.source).toBe("old");
    expect(made.sources[0]?.unsound).toBe("known structure: 15 planes");
    expect(made.recommended?.source).toBe("philox4x32");
  });

  it("has no plan for a deterministic source or without a tolerance", () => {
    const fixed = plan(makeSeries({}), [makeSource("philox4x32", { deterministic: true })]);
    expect(fixed.sources[0]?.status).toBe("unknown");
    expect(fixed.sources[0]?.reason).toMatch(/no error bar/);
    const tolerance = { absolute: null, relative: 0.01, to: "reference", confidence: 0.99 };
    const loose = plan(
      makeSeries({}),
      [makeSource("philox4x32")],
      {},
      { problems: [makeProblem("p", { tolerance, reference: null })] },
    );
    expect(loose.tolerance).toBeNull();
    expect(loose.sources[0]?.reason).toMatch(/^no tolerance/);
  });
});

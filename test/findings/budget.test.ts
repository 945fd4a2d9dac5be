// The lines of the budget and how they are put together; figures worked out by hand.
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { assembleRecord } from "../../src/findings/assemble.js";
import { addingUp, contributionsOf } from "../../src/findings/budget/contributions.js";
import { divergentProblems } from "../../src/findings/divergence.js";
import type { ProblemMeasurements } from "../../src/record/measurements.js";
import { studentFactor } from "../../src/numeric/student.js";
import { makeAssembly, makeCell, makeProblem, makeSeries, makeSource } from "./make.js";

const MEASURED: ProblemMeasurements = {
  problem: "p",
  resolution: [
    {
      sources: ["philox4x32"],
      cost: {
        bits: 16,
        endpoint: "middle",
        confidence: 0.99,
        bias: -3e-4,
        standardError: 1e-5,
        interval: [-3.3e-4, -2.7e-4],
        unreachableTail: { bias: 0, standardError: 0, interval: [0, 0], probability: 1e-4 },
        points: 512,
        replicates: 16,
        nonFinite: 0,
      },
    },
  ],
  transform: { points: 1000, bias: 1e-15, standardError: 0, changed: 10, amplification: 2 ** 20 },
  arithmetic: {
    formula: { points: 128, bias: -2e-12, standardError: 0, changed: 128, digits: 64 },
    missing: [],
    flips: null,
    summation: { points: 8192, difference: -1e-12 },
  },
  tail: { points: 65536, order: 64, index: 5, further: 6, constant: false },
};

const lineOf = (name: string, measurements: readonly ProblemMeasurements[], changes = {}) =>
  assembleRecord(makeAssembly(makeSeries({}), { measurements, ...changes })).budgets[0]?.lines.find(
    ({ line }) => line === name,
  );

describe("lines", () => {
  it("resolution is the upper limit of what was measured in pairs, and counts in full where it is there", () => {
    const record = assembleRecord(makeAssembly(makeSeries({}), { measurements: [MEASURED] }));
    const line = record.budgets[0]?.lines.find((one) => one.line === "source resolution");
    expect(line).toMatchObject({ kind: "bias", value: 3.3e-4, interval: [2.7e-4, 3.3e-4] });
    expect(line?.basis).toContain("16 bits against 52");
    expect(line?.remedy).toContain("more output bits");
  });

  it("a source of 52 bits costs nothing by definition", () => {
    expect(lineOf("source resolution", [{ ...MEASURED, resolution: [] }])).toMatchObject({
      value: 0,
      remedy: null,
    });
  });

  it("arithmetic adds the formula's limit and the sum's", () => {
    expect(lineOf("arithmetic", [MEASURED])?.value).toBeCloseTo(3e-12, 20);
    const missing: ProblemMeasurements = {
      ...MEASURED,
      arithmetic: {
        formula: null,
        missing: ["gamma"],
        flips: null,
        summation: { points: 8192, difference: 0 },
      },
    };
    const line = lineOf("arithmetic", [missing]);
    expect(line?.value).toBeNull();
    expect(line?.basis).toContain("not assessed: gamma without a version in 64 digits");
  });

  it("no flip among N conditions is bounded as Clopper and Pearson do", () => {
    const flips = { points: 16384, bias: 0, standardError: 0, changed: 0, amplification: 2 ** 24 };
    const arithmetic = { formula: null, missing: [], flips, summation: { points: 8192, difference: 0 } };
    // Two-sided 99 %: 1 - 0.005^(1/N).
    const limit = -Math.expm1(Math.log(0.005) / 16384) / 2 ** 24;
    expect(lineOf("arithmetic", [{ ...MEASURED, arithmetic }])?.value).toBeCloseTo(limit, 18);
  });

  it("uniform inputs have no transform; others that were not measured say so", () => {
    expect(lineOf("transform", [MEASURED])?.value).toBe(0);
    const inputs = [{ name: "z", distribution: "normal" as const, length: 2, first: 0 }];
    const problems = [makeProblem("p", { inputs })];
    expect(lineOf("transform", [MEASURED], { problems })?.value).toBeCloseTo(1e-15, 25);
    expect(lineOf("transform", [], { problems })?.value).toBeNull();
  });

  it("period and overlap is a probability that is not spent", () => {
    const sources = [makeSource("philox4x32", { period: String(2 ** 31) })];
    const line = lineOf("period and overlap", [MEASURED], { sources });
    // 32 streams of 2 x 4096 numbers: 32^2 x 8192 / 2^31 = 2^23 / 2^31.
    expect(line).toMatchObject({ kind: "probability", value: 2 ** -8 });
    expect(line?.basis).toContain("Knuth");
    const full = assembleRecord(makeAssembly(makeSeries({}), { measurements: [MEASURED], sources }))
      .budgets[0];
    const plain = assembleRecord(makeAssembly(makeSeries({}), { measurements: [MEASURED] })).budgets[0];
    expect(full?.total).toBe(plain?.total);
  });
});

describe("totals", () => {
  it("take the degrees of freedom of all random lines together", () => {
    const declared = [{ line: "step", kind: "random" as const, value: 0.02, basis: "b" }];
    const problems = [makeProblem("p", { declared })];
    const [budget] = assembleRecord(makeAssembly(makeSeries({}), { problems })).budgets;
    const sampling = budget?.lines[0]?.value ?? NaN;
    // Welch & Satterthwaite: (s^2 + u^2)^2 / (s^4 / 31), u known.
    const degrees = (sampling ** 2 + 0.02 ** 2) ** 2 / (sampling ** 4 / 31);
    expect(budget?.degrees).toBeCloseTo(degrees, 8);
    expect(budget?.coverageFactor).toBeCloseTo(studentFactor(0.99, degrees), 12);
    const biases = (budget?.lines ?? [])
      .filter((l) => l.kind === "bias")
      .reduce((t, l) => t + (l.value ?? 0), 0);
    expect(budget?.total).toBeCloseTo(biases + studentFactor(0.99, degrees) * Math.hypot(sampling, 0.02), 12);
  });

  it("are the sum of what the lines contribute", () => {
    const random = fc.record({
      kind: fc.constantFrom("bias" as const, "random" as const, "probability" as const),
      value: fc.option(fc.double({ min: 0, max: 1e3, noNaN: true })),
    });
    fc.assert(
      fc.property(fc.array(random, { minLength: 1 }), (lines) => {
        const of = (kind: string) => lines.filter((l) => l.kind === kind).map((l) => l.value ?? 0);
        const total = of("bias").reduce((a, b) => a + b, 0) + 2.5 * Math.hypot(...of("random"));
        const parts = contributionsOf(lines, 2.5).reduce((a, b) => a + b, 0);
        expect(Math.abs(parts - total)).toBeLessThanOrEqual(1e-12 * total + 1e-300);
      }),
    );
  });

  it("add up to the last digit that is shown", () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: 0, max: 10, noNaN: true }), { minLength: 1, maxLength: 9 }),
        fc.integer({ min: 0, max: 6 }),
        (parts, places) => {
          const { parts: shown, total } = addingUp(parts, places);
          const unit = 10 ** -places;
          expect(shown.reduce((sum, part) => sum + Math.round(part / unit), 0)).toBe(
            Math.round(total / unit),
          );
          for (const [i, part] of shown.entries())
            expect(Math.abs(part - (parts[i] ?? 0))).toBeLessThan(unit * 1.000001);
        },
      ),
    );
  });
});

describe("a variance that is not finite", () => {
  const tail = { points: 65536, order: 64, index: 1.4, further: 1.5, constant: false };
  const growing = (exponent: number) =>
    [256, 512, 1024, 2048, 4096].map((n) =>
      makeCell({ n, estimates: [], withinVariances: Array.from({ length: 16 }, () => n ** exponent) }),
    );
  const sources = new Map([["philox4x32", makeSource("philox4x32")]]);
  const found = (index: number, further: number, exponent: number) =>
    divergentProblems([{ ...MEASURED, tail: { ...tail, index, further } }], growing(exponent), sources).size;

  it("is said where the tail index and the growth of the sample variance agree", () => {
    expect(found(1.4, 1.5, 0.4)).toBe(1);
    expect(found(1.4, 1.5, 0)).toBe(0); // does not grow
    expect(found(1.4, 3, 0.4)).toBe(0); // the tail ends
    expect(found(1.9, 1.9, 0.4)).toBe(0); // 2 is within two standard errors
  });

  it("takes every interval, test and verdict away", () => {
    const cells = makeSeries({}).map((cell) => ({
      ...cell,
      withinVariances: cell.withinVariances.map(() => cell.n ** 0.4),
    }));
    const record = assembleRecord(makeAssembly(cells, { measurements: [{ ...MEASURED, tail }] }));
    expect(record.budgets[0]?.verdict).toBe("none");
    expect(record.budgets[0]?.reason).toMatch(/^no finite variance: the tail index of \|f\| is 1\.4/);
    expect(record.tests[0]).toMatchObject({ kind: "none", pValue: null });
    expect(record.spreadTests[0]?.pValue).toBeNull();
    expect(record.cells.every((cell) => cell.rmseInterval === null && cell.biasStandardError === null)).toBe(
      true,
    );
    expect(record.convergence[0]).toMatchObject({ order: null, reach: null });
    expect(record.warnings.some((text) => text.startsWith("p: no finite variance"))).toBe(true);
  });
});

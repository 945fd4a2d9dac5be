/** From raw cells to verdicts: the rules of the record's statistics on small invented studies with known truth. */
import { describe, expect, it } from "vitest";
import { assembleRecord, candidatesOf } from "../../src/findings/assemble.js";
import { exitCodeOf, headlinesOf } from "../../src/findings/headline.js";
import type { Problem } from "../../src/problem/contract.js";
import type { RawCell, RecordSource } from "../../src/record/types.js";
import { makeAssembly, makeCell, makeConfirmation, makeProblem, makeSeries, makeSource } from "./make.js";

function problemInUse(source: string, points: number, tolerance: number): Problem {
  return makeProblem("p", {
    tolerance: { absolute: tolerance, relative: null, to: "reference", confidence: 0.99 },
    inUse: { source, points, secondsPerPoint: null },
  });
}

describe("a sound pseudo-random source", () => {
  // sigma = 1, n = 4096: s = 1/64 = 0.0156; total about (2.74 + 0.6) s = 0.05.
  const cells = makeSeries({ seed: 3 });

  it.each([
    [0.1, "within"],
    [0.05, "undecided"],
    [0.02, "outside"],
  ])("with a tolerance of %d is %s", (absolute, verdict) => {
    const tolerance = { absolute, relative: null, to: "reference", confidence: 0.99 };
    const record = assembleRecord(makeAssembly(cells, { problems: [makeProblem("p", { tolerance })] }));
    expect(record.budgets.map((budget) => budget.verdict)).toEqual([verdict]);
    expect(record.budgets[0]?.largestLine).toBe("sampling");
    expect(record.tests[0]?.confirmed).toBe(false);
  });

  it("is never `outside` by the structure line alone", () => {
    // Between the sampling part's upper limit and the total's: only what the study could not exclude is too large.
    const first = assembleRecord(makeAssembly(cells)).budgets[0] ?? expect.fail();
    const structure = first.lines[1]?.value ?? NaN;
    expect(structure).toBeGreaterThan(0);
    const absolute = (first.totalInterval?.[1] ?? NaN) - structure / 2;
    const tolerance = { absolute, relative: null, to: "reference", confidence: 0.99 };
    const budget = assembleRecord(makeAssembly(cells, { problems: [makeProblem("p", { tolerance })] }))
      .budgets[0];
    expect(budget?.verdict).toBe("undecided");
    expect(budget?.reason).toMatch(/no bias was confirmed, but this study cannot exclude one of up to/);
  });

  it("has an order near -1/2 and reaches the tolerance where k sigma / sqrt(n) does", () => {
    const record = assembleRecord(makeAssembly(cells));
    const [found] = record.convergence;
    expect(found?.orderInterval?.[0]).toBeLessThan(-0.5);
    expect(found?.orderInterval?.[1]).toBeGreaterThan(-0.5);
    // (2.744 / 0.01)^2 = 75,300 points, t with 31 degrees of freedom at 99 %.
    expect(found?.reach?.n).toBeGreaterThan(75_300 * 0.7);
    expect(found?.reach?.n).toBeLessThan(75_300 * 1.4);
    expect(found?.reach?.interval?.[0]).toBeLessThan(75_300);
    expect(found?.reach?.interval?.[1]).toBeGreaterThan(75_300);
    expect(found?.reach?.extrapolated).toBe(true);
    expect(found?.never).toBe(false);
    expect(found?.cost).toBeCloseTo((found?.reach?.n ?? 0) * 1e-8, 12);
  });

  it("spreads as crude Monte Carlo does", () => {
    const record = assembleRecord(makeAssembly(cells));
    // s^2 n / sigma^2 of 32 replicates: 1 within 31 degrees of freedom, 0.4 to 1.9 is its 99.8 % range.
    expect(record.cells[4]?.varianceAgainstCrude).toBeGreaterThan(0.4);
    expect(record.cells[4]?.varianceAgainstCrude).toBeLessThan(1.9);
    expect(record.cells[4]?.integrandDeviation).toBe(1);
    expect(record.cells[4]?.coverage).toBeNull();
  });
});

describe("a biased source", () => {
  const cells = makeSeries({ bias: -0.08, seed: 5 });
  const sources = [makeSource("randu", { knownStructure: "planes" })];
  const raw = cells.map((cell) => ({ ...cell, source: "randu" }));

  it("is a candidate, and only fresh keys confirm it", () => {
    const given = makeAssembly(raw, { sources });
    expect(candidatesOf(given).map((test) => [test.source, test.n])).toEqual([["randu", 4096]]);
    const before = assembleRecord(given);
    expect(before.tests[0]).toMatchObject({ candidate: true, confirmed: false });
    expect(before.budgets[0]?.lines[1]?.interval?.[0]).toBe(0);
    const after = assembleRecord({ ...given, confirmations: [makeConfirmation(-0.08, 1 / 64, "randu")] });
    expect(after.tests[0]).toMatchObject({ candidate: true, confirmed: true });
    expect(after.tests[0]?.confirmation?.bias).toBeCloseTo(-0.08, 2);
    expect(after.budgets[0]).toMatchObject({ verdict: "outside", largestLine: "source structure" });
  });

  it("is not confirmed by a bias of the other sign, nor by none", () => {
    for (const bias of [0.08, 0]) {
      const confirmations = [makeConfirmation(bias, 1 / 64, "randu")];
      const record = assembleRecord(makeAssembly(raw, { sources, confirmations }));
      expect(record.tests[0]).toMatchObject({ candidate: true, confirmed: false });
      expect(record.budgets[0]?.lines[1]?.interval?.[0]).toBe(0);
    }
  });

  it("never reaches a tolerance below its floor once it has stopped falling", () => {
    const sizes = [256, 512, 1024, 2048, 4096, 8192, 16384, 32768, 65536].map((n) => n * 64);
    const long = makeSeries({ bias: -0.08, sizes, source: "randu", seed: 6 });
    const fresh = makeConfirmation(-0.08, 1 / 2048, "randu", 65536 * 64);
    const [found] = assembleRecord(makeAssembly(long, { sources, confirmations: [fresh] })).convergence;
    expect(found).toMatchObject({ never: true, reach: null, cost: null });
    expect(found?.floorLower).toBeGreaterThan(0.07);
  });
});

describe("randomised and deterministic quasi-random sources", () => {
  const net = { family: "quasi-random", method: "digital net", period: null } as const;

  it("a scrambled net has no structure line but a theorem, and says that it was checked", () => {
    const sources = [makeSource("sobol+owen", { ...net, randomisations: ["owen"] })];
    const cells = makeSeries({ source: "sobol+owen", order: 1.5 });
    const [budget] = assembleRecord(makeAssembly(cells, { sources })).budgets;
    expect(budget?.verdict).toBe("within");
    expect(budget?.lines[1]).toMatchObject({ value: 0, interval: null });
    expect(budget?.lines[1]?.basis).toMatch(
      /^theorem \(owen: every point is uniform, Owen 1995\), implementation checked/,
    );
  });

  it("an implementation that errs is not excused by the theorem", () => {
    const sources = [makeSource("sobol+owen", { ...net, randomisations: ["owen"] })];
    const cells = makeSeries({ source: "sobol+owen", order: 1.5, bias: 0.05 });
    const confirmations = [makeConfirmation(0.05, 1e-5, "sobol+owen")];
    const record = assembleRecord(makeAssembly(cells, { sources, confirmations }));
    expect(record.budgets[0]).toMatchObject({ verdict: "outside", largestLine: "source structure" });
  });

  it("a deterministic row has an error and nothing else", () => {
    const sources = [makeSource("sobol", { ...net, deterministic: true })];
    const problems = [
      makeProblem("p", { inputs: [{ name: "z", distribution: "normal", length: 2, first: 0 }] }),
    ];
    const cells = [256, 512, 1024].map((n) => makeCell({ source: "sobol", n, estimates: [1 + 1 / n] }));
    const record = assembleRecord(makeAssembly(cells, { sources, problems }));
    expect(record.cells[2]).toMatchObject({
      bias: 1 / 1024,
      biasStandardError: null,
      rmse: null,
      rmseInterval: null,
    });
    expect(record.tests[0]).toMatchObject({
      kind: "none",
      reason: "deterministic source: one error, no error bar",
    });
    expect(record.convergence[0]).toMatchObject({ order: null, reach: null });
    expect(record.budgets[0]).toMatchObject({ verdict: "none", total: null });
    expect(record.warnings).toContain("sobol: deterministic source: no error bar");
    expect(record.warnings.join()).toMatch(
      /an unscrambled net on normal inputs puts its first point near z = −8/,
    );
  });
});

describe("probabilities", () => {
  const indicator = (hits: readonly number[], source: string) =>
    makeCell({ source, n: 1000, indicator: true, estimates: hits.map((k) => k / 1000) });
  const problems = [
    makeProblem("p", { reference: { value: 0.02, text: "0.02", uncertainty: 0, basis: "closed form" } }),
  ];
  const around20 = Array.from({ length: 32 }, (_, r) => 20 + ((r * 7) % 9) - 4);

  it("a pseudo-random source is tested by its hits, a quasi-random one by Student's t", () => {
    const sources: RecordSource[] = [
      makeSource("philox4x32"),
      makeSource("sobol+owen", { family: "quasi-random", randomisations: ["owen"] }),
    ];
    const cells = [indicator(around20, "philox4x32"), indicator(around20, "sobol+owen")];
    const { tests } = assembleRecord(makeAssembly(cells, { sources, problems }));
    expect(tests.map((test) => test.kind)).toEqual(["binomial", "student"]);
  });

  it("hits that spread too much from replicate to replicate are not counted as independent", () => {
    const wild = Array.from({ length: 32 }, (_, r) => (r % 2 === 0 ? 0 : 40));
    expect(assembleRecord(makeAssembly([indicator(wild, "philox4x32")], { problems })).tests[0]?.kind).toBe(
      "student",
    );
  });

  it("fewer than 100 expected hits or misses make no test", () => {
    for (const value of [0.003, 0.997]) {
      const rare = [
        makeProblem("p", { reference: { value, text: "", uncertainty: 0, basis: "closed form" } }),
      ];
      const [test] = assembleRecord(
        makeAssembly([indicator(around20, "philox4x32")], { problems: rare }),
      ).tests;
      expect(test).toMatchObject({ kind: "none", pValue: null, detectableBias: null });
      expect(test?.reason).toBe("96 hits or misses expected, fewer than 100");
    }
  });
});

describe("replicates that all gave the same value", () => {
  const sizes = [256, 512, 1024, 2048, 4096];
  const constant = (value: number, source: string) =>
    sizes.map((n) => makeCell({ source, n, estimates: new Array<number>(32).fill(value) }));
  const sources = [makeSource("randu", { knownStructure: "planes" }), makeSource("philox4x32")];
  const fresh = { ...makeConfirmation(0, 0, "randu"), estimates: new Array<number>(256).fill(1.8) };

  it("are tested with the deviation of a sound source where the value is wrong", () => {
    const cells = [...constant(1.8, "randu"), ...makeSeries({})];
    const record = assembleRecord(makeAssembly(cells, { sources, confirmations: [fresh] }));
    expect(record.tests[0]).toMatchObject({
      kind: "student",
      confirmed: true,
      reason: "all replicates gave the same value; tested with the deviation of philox4x32",
    });
    expect(record.budgets[0]).toMatchObject({ verdict: "outside", largestLine: "source structure" });
    expect(record.convergence[0]).toMatchObject({ never: true, reach: null });
    expect(record.convergence[0]?.order).toBeCloseTo(0, 12);
  });

  it("make no test without a sound source to borrow from, and the verdict is undecided", () => {
    const record = assembleRecord(makeAssembly(constant(1.8, "randu"), { sources }));
    expect(record.tests[0]).toMatchObject({ kind: "none", reason: "all replicates gave the same value" });
    expect(record.budgets[0]).toMatchObject({ verdict: "undecided" });
    expect(record.convergence[0]).toMatchObject({ never: false, reach: null });
  });

  it("make no test where the value is right to rounding, and the verdict is within", () => {
    const cells = [...constant(1 + 4 * Number.EPSILON, "randu"), ...makeSeries({})];
    const record = assembleRecord(makeAssembly(cells, { sources }));
    expect(record.tests[0]).toMatchObject({
      kind: "none",
      reason: "all replicates gave the same value, the reference to rounding",
    });
    expect(record.budgets[0]).toMatchObject({ verdict: "within" });
    expect(record.convergence[0]).toMatchObject({ order: null, reach: { n: 256, extrapolated: false } });
  });
});

describe("what cannot be judged", () => {
  it("non-finite values empty the statistics and are described", () => {
    const estimates = [1, 2, NaN, 1];
    const nonFinite = { count: 3, first: { replicate: 2, index: 7, inputs: [0.25, 0.5], value: "NaN" } };
    const record = assembleRecord(makeAssembly([makeCell({ estimates, nonFinite })]));
    expect(record.cells[0]).toMatchObject({ mean: null, bias: null, rmse: null, replicateDeviation: null });
    expect(record.budgets[0]).toMatchObject({ verdict: "none" });
    expect(record.warnings).toEqual([
      "p, philox4x32: 3 values are not finite at 1,024 points; the first is NaN at replicate 2, point 7, inputs 0.25, 0.5",
    ]);
  });

  it("a missing reference leaves a source undecided, unless its spread alone breaks the tolerance", () => {
    const problems = [makeProblem("p", { reference: null })];
    const verdict = (noise: number) =>
      assembleRecord(makeAssembly(makeSeries({ noise }), { problems })).budgets[0]?.verdict;
    expect(verdict(0.01)).toBe("undecided");
    expect(verdict(10)).toBe("outside");
  });

  it("replicates drawn from few states are warned of", () => {
    const sources = [makeSource("philox4x32", { period: "2147483646" })];
    const cells = makeSeries({ replicates: 64 });
    expect(assembleRecord(makeAssembly(cells, { sources })).warnings[0]).toMatch(
      /64 replicates among 2,147,483,646 states: 9\.4e\u22127 pairs with the same points/,
    );
  });
});

describe("declared contributions", () => {
  const declared = [
    { line: "weekly time step", kind: "bias", value: 0.03, basis: "halved step" },
    { line: "price model", kind: "random", value: 0.05, basis: "fit" },
  ] as const;
  const verdictAt = (absolute: number) => {
    const tolerance = { absolute, relative: null, to: "reference", confidence: 0.99 };
    const problems = [makeProblem("p", { tolerance, declared })];
    return (
      assembleRecord(makeAssembly(makeSeries({ noise: 1e-4 }), { problems })).budgets[0] ?? expect.fail()
    );
  };

  it("a declared bias adds, a declared deviation is added in quadrature and counted k times", () => {
    // 0.03 + 2.5758 * 0.05: the declared deviation counts as known, and the sampling below 1e-5 leaves the normal factor
    // (Abramowitz & Stegun, table 26.5).
    expect(verdictAt(0.2).total).toBeCloseTo(0.03 + 2.5758293 * 0.05, 4);
    expect(verdictAt(0.2)).toMatchObject({ verdict: "within", largestLine: "price model" });
    expect(verdictAt(0.1)).toMatchObject({ verdict: "outside" });
  });
});

describe("what is in use", () => {
  const cells = [...makeSeries({ seed: 3 }), ...makeSeries({ source: "sobol+owen", order: 1.5, seed: 4 })];
  const sources = [
    makeSource("philox4x32"),
    makeSource("sobol+owen", { family: "quasi-random", randomisations: ["owen"] }),
  ];

  it("decides the exit code and is said first, with what would help", () => {
    const record = assembleRecord(
      makeAssembly(cells, { sources, problems: [problemInUse("philox4x32", 3000, 0.02)] }),
    );
    const [headline] = headlinesOf(record);
    expect(record.budgets.at(-1)).toMatchObject({ inUse: true, n: 3000, verdict: "outside" });
    expect(headline?.inUse?.sentence).toMatch(
      /^In use: philox4x32, 3,000 points: outside \(0\.0\d+ > 0\.020\)\. Take \d+ times the points, or sobol\+owen with 256 points\.$/,
    );
    expect(exitCodeOf(record)).toBe(1);
  });

  it("within is exit code 0, undecided too unless it is to fail", () => {
    const code = (points: number, tolerance: number, undecided: boolean) =>
      exitCodeOf(
        assembleRecord(
          makeAssembly(cells, { sources, problems: [problemInUse("philox4x32", points, tolerance)] }),
        ),
        undecided,
      );
    expect(code(1_000_000, 0.02, true)).toBe(0);
    expect(code(4096, 0.05, false)).toBe(0);
    expect(code(4096, 0.05, true)).toBe(1);
  });

  it("a source that was not studied is not judged", () => {
    const record = assembleRecord(
      makeAssembly(cells, { sources, problems: [problemInUse("mt19937", 1000, 0.02)] }),
    );
    expect(headlinesOf(record)[0]?.inUse).toEqual({
      verdict: "none",
      sentence:
        "In use: mt19937, 1,000 points: not judged, because mt19937 is not among the sources of this study.",
    });
    expect(exitCodeOf(record)).toBe(0);
  });
});

it("digests depend on the estimates to the bit and on nothing else", () => {
  const cells = makeSeries({});
  const digest = (raw: RawCell[]) => assembleRecord(makeAssembly(raw)).digest;
  const slower = cells.map((cell) => ({ ...cell, secondsPerPoint: 1 }));
  const changed = cells.map((cell, i) =>
    i > 0 ? cell : { ...cell, estimates: cell.estimates.map((x, r) => (r > 0 ? x : x + Number.EPSILON)) },
  );
  expect(digest(slower)).toBe(digest(cells));
  expect(digest(changed)).not.toBe(digest(cells));
});

import { expect, test } from "vitest";
import type { Problem } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import type { MeasuredBias } from "../../src/record/explanation.js";
import { explain } from "../../src/study/explain.js";
import { evaluateAt } from "../../src/study/evaluate-at.js";
import { unboundedAlong } from "../../src/study/growth.js";
import { prepareProblems, type RunnableProblem } from "../../src/study/runnable.js";
import type { TaskResult } from "../../src/study/tasks.js";
import { problem, runSpec, specOf } from "./fixtures.js";

async function prepared(one: Problem): Promise<RunnableProblem> {
  const [runnable] = await prepareProblems([one]);
  if (runnable === undefined) throw new Error("not prepared");
  return runnable;
}

const exactly = (value: number, n = 64): MeasuredBias => ({
  value,
  standardError: null,
  interval: [value, value],
  n,
  replicates: 1,
});

const request = { output: "mean", seed: 1, confidence: 0.99, n: 64 };

function multiplicative(a: number, m: number, states: readonly number[]): number[][] {
  return states.map((x) => [x / m, ((a * x) % m) / m, ((((a * x) % m) * a) % m) / m]);
}

/** Trigonometric polynomials: their Fourier series ends, so a few dual vectors say everything. */
const WAVES = "prod(1 + 0.8 * cos(2 * pi * x) + 0.5 * cos(4 * pi * x + 1))";

test.each([
  { name: "power", modulus: 64, multiplier: 19, states: Array.from({ length: 32 }, (_, k) => 2 * k + 1) },
  { name: "prime", modulus: 61, multiplier: 2, states: Array.from({ length: 60 }, (_, k) => k + 1) },
  {
    name: "composite",
    modulus: 50,
    multiplier: 3,
    states: Array.from({ length: 50 }, (_, k) => k).filter((k) => k % 2 === 1 && k % 5 !== 0),
  },
])(
  "a small modulus, over all its states: predicted and exact bias agree ($name)",
  async ({ modulus, multiplier, states }) => {
    const runnable = await prepared(problem("waves", WAVES));
    const values = multiplicative(multiplier, modulus, states).map((u) => evaluateAt(runnable, u).value);
    const exact = values.reduce((sum, value) => sum + value, 0) / values.length - 1;
    const choice = parseSource({ name: "house", congruential: { modulus, multiplier } });
    const found = explain({ ...request, problem: runnable, choice, centre: 1, measured: exactly(exact) });
    expect(Math.abs(exact)).toBeGreaterThan(0.02);
    expect(found.explained).toBe(true);
    // sharp enough to tell the bias from 0 and from half of it
    expect(found.predicted?.standardError).toBeLessThan(Math.abs(exact) / 10);
    expect(found.difference?.value).toBeCloseTo(exact - (found.predicted?.value ?? 0), 12);
  },
);

test("one dual vector deep in the order, among many that add nothing", async () => {
  const ripples = await prepared(problem("ripples", "prod(1 + 0.9 * cos(2 * pi * ([9, 6, 1] .* x)))"));
  // the low 8 bits of 1103515245 x + 12345 mod 2^31 are a generator mod 2^8 of their own
  const step = (x: number): number => (1103515245 * x + 12345) % 256;
  const values = Array.from({ length: 256 }, (_, x) => {
    const u = [x, step(x), step(step(x))].map((state) => (state + 0.5) / 256);
    return evaluateAt(ripples, u).value;
  });
  const exact = values.reduce((sum, value) => sum + value, 0) / 256 - 1;
  const modulus = "2^31";
  const congruential = { modulus, multiplier: 1103515245, increment: 12345 };
  const choice = parseSource({ name: "low8", congruential, bits: "low 8" });
  const found = explain({ ...request, problem: ripples, choice, centre: 1, measured: exactly(exact) });
  expect(exact).toBeGreaterThan(0.1);
  expect(found.aliases[0]?.entries.map(Math.abs)).toEqual([9, 6, 1]);
  expect(found.explained).toBe(true);
});

const PEAK = "exp(-sum(square(x - [0.5, 0.4, 0.4])) / (2 * 0.03^2)) / (0.03 * sqrt(2 * pi))^3";

test("a peak half-way between the planes of randu: predicted, in closed form and simulated bias agree", async () => {
  const peak = problem("peak", PEAK, {
    reference: { value: 1, text: "1", uncertainty: 0, basis: "normalised" },
  });
  const spec = specOf([peak], { sources: ["randu", "philox4x32"], sizes: [16384], replicates: 32, seed: 3 });
  const record = await runSpec(spec);
  const found = record.explanations.find(({ source }) => source === "randu");
  // Poisson summation with the transform of the Gaussian: -2 exp(-2 pi^2 0.03^2 118) = -24.6 %
  const closed = -2 * Math.exp(-2 * Math.PI ** 2 * 0.03 ** 2 * 118);
  expect(closed).toBeCloseTo(-0.246, 3);
  const { predicted, measured } = found ?? {};
  // five standard errors: a false alarm in 10^6
  expect(Math.abs((predicted?.value ?? 0) - closed)).toBeLessThan(5 * (predicted?.standardError ?? 0));
  expect(predicted?.standardError).toBeLessThan(0.01);
  expect(Math.abs((measured?.value ?? 0) - closed)).toBeLessThan(5 * (measured?.standardError ?? 0));
  expect(found?.explained).toBe(true);
  expect(found?.aliases[0]).toMatchObject({
    indices: [0, 1, 2],
    entries: [9, -6, 1],
    planes: 15,
    size: 1,
    phase: 0,
  });
  expect(found?.aliases[0]?.gap).toBeCloseTo(118 ** -0.5, 12);
  // all points in one bin, those of a sound source in all of them
  expect(found?.comb?.source.filter((count) => count > 0)).toHaveLength(1);
  expect(found?.comb?.sound.every((count) => count > 0)).toBe(true);
  expect(record.explanations.some(({ source }) => source === "philox4x32")).toBe(false);
});

test("the same seed gives the same explanation, to the bit", async () => {
  const runnable = await prepared(problem("peak", PEAK));
  const choice = parseSource("randu");
  const once = explain({ ...request, problem: runnable, choice, centre: 1, measured: exactly(-0.246) });
  const again = explain({ ...request, problem: runnable, choice, centre: 1, measured: exactly(-0.246) });
  expect(again).toEqual(once);
});

test("a rank-1 lattice without randomisation: the one error is that of its dual vectors", async () => {
  // z = (1, 5): h = (5, -1) is in the dual for every n
  const runnable = await prepared(
    problem("wave", "1 + 0.5 * cos(2 * pi * (5 * x[1] - x[2]))", { dimension: 2 }),
  );
  const choice = parseSource({ name: "house", lattice: { vector: [1, 5] } });
  const found = explain({ ...request, problem: runnable, choice, centre: 1, measured: exactly(0.5) });
  expect(found.aliases[0]).toMatchObject({ entries: [5, -1], planes: 5 });
  expect(found.predicted?.value).toBeCloseTo(0.5, 2);
  expect(found.explained).toBe(true);
});

test("a bias that does not come from the planes is not called explained", async () => {
  const runnable = await prepared(problem("peak", PEAK));
  const found = explain({
    ...request,
    problem: runnable,
    choice: parseSource("randu"),
    centre: 1,
    measured: exactly(0.1),
  });
  expect(found.explained).toBe(false);
  expect(found.predicted?.value).toBeCloseTo(-0.246, 1);
});

test("where no bias shows there is none to explain", async () => {
  const runnable = await prepared(problem("peak", PEAK));
  const measured = {
    value: -0.2,
    standardError: 0.2,
    interval: [-0.72, 0.32],
    n: 64,
    replicates: 32,
  } as const;
  const found = explain({ ...request, problem: runnable, choice: parseSource("randu"), centre: 1, measured });
  expect(found.predicted?.value).toBeCloseTo(-0.246, 1);
  expect(found.explained).toBe(false);
});

test("an integrand without bound is left to the full cycle", async () => {
  const choice = parseSource("randu");
  for (const integrand of ["x[1]^-0.3", "-log(x[2])", "-log(1 - x[3])"]) {
    const runnable = await prepared(problem("edge", integrand));
    const found = explain({ ...request, problem: runnable, choice, centre: 1, measured: null });
    expect(found.predicted).toBeNull();
    expect(found.reason).toMatch(/grows without bound towards an edge of coordinate [123], .*--full-cycle/);
  }
});

test("normal inputs: what grows is told from what levels off", async () => {
  const inputs = [{ name: "z", distribution: "normal", length: 3, first: 0 }] as const;
  const along = async (integrand: string): Promise<number | null> =>
    unboundedAlong(await prepared(problem("edge", integrand, { inputs })), 0, 5);
  expect(await along("sum(z)")).toBe(0);
  expect(await along("z[1] * 0 + exp(z[2])")).toBe(1);
  expect(await along("max(1 - exp(z[1] + z[2]), 0)")).toBeNull();
  expect(await along("sum(z) > 1")).toBeNull();
});

test("a lattice that is too fine to matter is called so", async () => {
  const runnable = await prepared(problem("flat", "x[1]"));
  const found = explain({
    ...request,
    problem: runnable,
    choice: parseSource("mrg32k3a"),
    centre: 0.5,
    measured: null,
  });
  expect(found.predicted).toBeNull();
  expect(found.reason).toContain("too fine to matter");
});

const identity = (m: number): number[][] =>
  Array.from({ length: m }, (_, r) => Array.from({ length: m }, (__, c) => (r === c ? 1 : 0)));

test("a net without randomisation: the one error is that of the Walsh functions of its dual", async () => {
  // two coordinates alike: wal(k, k) is 1 on all points, and the indicator of a quarter has the coefficient 1/4 at (1, 1)
  const choice = parseSource({ name: "house", matrices: { base: 2, rows: [identity(4), identity(4)] } });
  const quarter = problem("quarter", "(x[1] > 0.5) * (x[2] > 0.5)", { dimension: 2 });
  const runnable = await prepared(quarter);
  const found = explain({
    ...request,
    n: 16,
    problem: runnable,
    choice,
    centre: 0.25,
    measured: exactly(0.25, 16),
  });
  expect(found.structure).toMatchObject({ kind: "net", modulus: "16" });
  expect(found.aliases[0]).toMatchObject({
    indices: [0, 1],
    entries: [1, 1],
    walsh: 2,
    planes: null,
    gap: null,
  });
  expect(found.predicted?.value).toBeCloseTo(0.25, 3);
  expect(found.explained).toBe(true);
  expect(found.comb).toBeNull();
});

test("a net in base 3", async () => {
  const choice = parseSource({ name: "house", matrices: { base: 3, rows: [identity(3), identity(3)] } });
  const ninth = problem("ninth", "(x[1] < 1 / 3) * (x[2] < 1 / 3)", { dimension: 2 });
  const runnable = await prepared(ninth);
  // all points are (x, x): 1/3 of them in the square, in place of 1/9
  const exact = 1 / 3 - 1 / 9;
  const found = explain({
    ...request,
    n: 27,
    problem: runnable,
    choice,
    centre: 1 / 9,
    measured: exactly(exact, 27),
  });
  expect(found.predicted?.value).toBeCloseTo(exact, 3);
  expect(found.explained).toBe(true);
});

test("points of a net that are no power of its base", async () => {
  const runnable = await prepared(problem("flat", "x[1]"));
  const found = explain({
    ...request,
    n: 100,
    problem: runnable,
    choice: parseSource("sobol"),
    centre: 0.5,
    measured: null,
  });
  expect(found.reason).toBe("its first 100 points are no net; take a power of 2 (--points 128)");
});

test("a run that is taken up again gives the same explanations", async () => {
  const reference = { value: 1, text: "1", uncertainty: 0, basis: "normalised" };
  const peak = problem("peak", PEAK, { reference });
  const spec = specOf([peak], { sources: ["randu", "philox4x32"], sizes: [4096], replicates: 32, seed: 3 });
  const journal = new Map<string, TaskResult>();
  const whole = await runSpec(spec, { journal });
  expect(whole.explanations.some(({ predicted }) => predicted !== null)).toBe(true);
  const half = new Map([...journal].slice(0, Math.floor(journal.size / 2)));
  expect((await runSpec(spec, { journal: half })).explanations).toEqual(whole.explanations);
});

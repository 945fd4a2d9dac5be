/** Quantities of one replicate against hand-worked values, and of studies against closed forms (fixed seeds). */
import { describe, expect, it } from "vitest";
import { mean, sum } from "../../src/numeric/sums.js";
import { variance as varianceOf } from "../../src/numeric/moments.js";
import type { Problem, Quantity } from "../../src/problem/contract.js";
import { sampleQuantile } from "../../src/quantities/order-statistics.js";
import { quantile } from "../../src/quantities/quantile.js";
import { shortfall } from "../../src/quantities/shortfall.js";
import type { Cell, StudyRecord } from "../../src/record/types.js";
import { buildSpec } from "../../src/study/settings.js";
import { problem, runSpec, specOf } from "../study/fixtures.js";

const exponential = { name: "x", distribution: "exponential", length: null, first: 0 } as const;
const normal = { name: "x", distribution: "normal", length: null, first: 0 } as const;
const uniform = { name: "x", distribution: "uniform", length: 2, first: 0 } as const;

function asked(
  integrand: string,
  quantity: Quantity,
  input: Problem["inputs"][number],
  value: number,
): Problem {
  return problem("asked", integrand, {
    inputs: [input],
    dimension: input.length ?? 1,
    quantity,
    reference: { value, text: String(value), uncertainty: 0, basis: "closed form" },
  });
}

function study(one: Problem, n: number, replicates: number, sources = ["philox4x32"]): Promise<StudyRecord> {
  return runSpec(specOf([one], { sources, sizes: [n], replicates, seed: 3 }));
}

function onlyCell(record: StudyRecord): Cell {
  const [cell] = record.cells;
  if (cell === undefined) throw new Error("no cell");
  return cell;
}

describe("one replicate", () => {
  it("interpolates order statistics at (n + 1) p: definition 6 of Hyndman and Fan (1996)", () => {
    const sorted = Float64Array.from([1, 2, 3, 4, 5, 6, 7, 8, 9]);
    // quantile(1:9, c(0.25, 0.5, 0.33), type = 6) of R 4: 2.5, 5, 3.3 (from memory)
    expect(sampleQuantile(sorted, 0.25)).toBe(2.5);
    expect(sampleQuantile(sorted, 0.5)).toBe(5);
    expect(sampleQuantile(sorted, 0.33)).toBeCloseTo(3.3, 12);
    expect(sampleQuantile(sorted, 0.01)).toBe(1);
    expect(sampleQuantile(sorted, 0.99)).toBe(9);
  });

  it("takes the last value of a shortfall in part", () => {
    const sorted = Float64Array.from([1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
    // The worst quarter of ten values: (10 + 9 + 8 / 2) / 2.5.
    expect(shortfall.estimate(sorted, 0.75).estimate).toBeCloseTo(9.2, 12);
    expect(shortfall.estimate(sorted, 0.8).estimate).toBeCloseTo(9.5, 12);
  });

  it("claims nothing where fewer than ten values are expected beyond the level", () => {
    const sorted = Float64Array.from({ length: 99 }, (_, i) => i);
    expect(quantile.estimate(sorted, 0.9)).toMatchObject({ withinVariance: null, finiteBias: null });
    expect(shortfall.estimate(sorted, 0.9)).toMatchObject({ withinVariance: null, finiteBias: null });
    expect(quantile.estimate(sorted, 0.89).withinVariance).not.toBeNull();
  });
});

/** Name, integrand, quantity, input, the value, and n times the squared standard error in closed form. */
const LAWS: readonly [string, string, Quantity, Problem["inputs"][number], number, number][] = [
  // mu4 - sigma^4 = 9 - 1 for an exponential law of mean 1, 3 - 1 for a standard normal one.
  ["variance, exponential", "x", "variance", exponential, 1, 8],
  ["variance, normal", "1000 + x", "variance", normal, 1, 2],
  // p (1 - p) / f(q)^2.
  ["quantile, exponential", "x", { quantile: 0.9 }, exponential, -Math.log(0.1), 0.9 / 0.1],
  // z(0.95) and the density there: Abramowitz & Stegun table 26.1, and 26.5 for the quantile.
  [
    "quantile, normal",
    "x",
    { quantile: 0.95 },
    normal,
    1.6448536269514722,
    (0.95 * 0.05) / 0.10313564037537128 ** 2,
  ],
  // q + mean; the variance of q + (x - q)+ / (1 - p) is (1 + p) / (1 - p) for mean 1.
  ["shortfall, exponential", "x", { shortfall: 0.9 }, exponential, 1 - Math.log(0.1), 1.9 / 0.1],
  // phi(z) / (1 - p).
  ["shortfall, normal", "x", { shortfall: 0.95 }, normal, 0.10313564037537128 / 0.05, NaN],
  // E (1 + x1) / E (1 + x2) = 1; the residual x1 - x2 has variance 1/6, over (3/2)^2.
  ["ratio of uniforms", "[1 + x[1], 1 + x[2]]", "ratio", uniform, 1, 1 / 6 / 1.5 ** 2],
];

describe("studies against closed forms", () => {
  it.each(LAWS)("%s", async (_, integrand, quantity, input, value, within) => {
    const record = await study(asked(integrand, quantity, input, value), 4096, 256);
    const cell = onlyCell(record);
    const range = cell.finiteBias ?? [NaN, NaN];
    // 256 replicates, five standard errors: one false alarm in two million.
    const error = 5 * (cell.biasStandardError ?? NaN);
    expect(cell.bias).toBeGreaterThan(range[0] - error);
    expect(cell.bias).toBeLessThan(range[1] + error);
    const claimed = mean(cell.withinVariances as number[]);
    // Differences over a finite width make the sparsity of a curved quantile function a few per cent too large.
    if (!Number.isNaN(within)) expect(Math.abs(claimed / within - 1)).toBeLessThan(0.1);
    // A variance from 256 replicates is good to 9 %.
    expect((4096 * varianceOf(cell.estimates)) / claimed).toBeGreaterThan(0.65);
    expect((4096 * varianceOf(cell.estimates)) / claimed).toBeLessThan(1.45);
    // Nominal 99 %; the normal interval of a skewed estimate holds somewhat less.
    expect(cell.coverage).toBeGreaterThan(0.95);
    expect(record.tests[0]?.confirmed).toBe(false);
    expect(record.budgets[0]?.lines.find((line) => line.line === "finite n")?.value).toBeGreaterThan(0);
  });

  it("states the leading bias of an exponential quantile, whose mean is known exactly", async () => {
    const [n, p] = [200, 0.9];
    const record = await study(asked("x", { quantile: p }, exponential, -Math.log(1 - p)), n, 4000);
    const cell = onlyCell(record);
    // E X_(k) = sum 1/(n - i + 1), i = 1..k (A. Renyi, Acta Mathematica Hungarica 4 (1953) 191-231).
    const expected = (k: number) => sum(Array.from({ length: k }, (_, i) => 1 / (n - i)));
    const place = (n + 1) * p;
    const k = Math.floor(place);
    const exact = expected(k) + (place - k) * (expected(k + 1) - expected(k)) + Math.log(1 - p);
    expect(Math.abs((cell.bias ?? NaN) - exact)).toBeLessThan(5 * (cell.biasStandardError ?? NaN));
    const [low, high] = cell.finiteBias ?? [NaN, NaN];
    // Twice the leading term p / (2 n (1 - p)) by a coarse second difference, 15 % too large, and the even points' term.
    expect(high / 2 / (p / (2 * n * (1 - p)))).toBeGreaterThan(0.9);
    expect(high / 2 / (p / (2 * n * (1 - p)))).toBeLessThan(2);
    // A few replicates see the curvature with the wrong sign.
    expect(Math.abs(low)).toBeLessThan(high / 10);
    expect(exact).toBeLessThan(high);
  });

  it("states the bias of a shortfall and of a ratio to leading order", async () => {
    const tail = onlyCell(
      await study(asked("x", { shortfall: 0.9 }, exponential, 1 - Math.log(0.1)), 200, 4000),
    );
    // -p Q'(p) / (2 n) = -9 / (2 * 200), and the same from the replicates.
    expect((tail.bias ?? NaN) / -0.0225).toBeGreaterThan(0.6);
    expect((tail.bias ?? NaN) / -0.0225).toBeLessThan(1.4);
    expect((tail.finiteBias?.[0] ?? NaN) / -0.045).toBeCloseTo(1, 0);
    // a = 1: r = 1 / E b with b uniform on (0.1, 1.1): bias r Var b / (n (E b)^2), to leading order.
    const ratio = onlyCell(await study(asked("[1, 0.1 + x[1]]", "ratio", uniform, 1 / 0.6), 64, 4000));
    const leading = 1 / 12 / 0.6 ** 3 / 64;
    expect((ratio.bias ?? NaN) / leading).toBeGreaterThan(0.7);
    expect((ratio.bias ?? NaN) / leading).toBeLessThan(1.3);
    expect((ratio.finiteBias?.[1] ?? NaN) / (2 * leading)).toBeCloseTo(1, 1);
  });

  it("does not blame an even source for the larger sample variance, but does blame a wrong value", async () => {
    const right = asked("x[1]", "variance", uniform, 1 / 12);
    const record = await study(right, 64, 64, ["lattice+shift"]);
    // Evenly spaced points: E s^2 = (1 - 1/n^2) / 12 * n / (n - 1), which is above 1/12 by 1/n.
    expect((onlyCell(record).bias ?? NaN) * 12 * 64).toBeCloseTo(1, 1);
    expect(record.tests[0]).toMatchObject({ confirmed: false, candidate: false });
    const wrong = await study(asked("x[1]", "variance", uniform, 1.1 / 12), 4096, 32);
    expect(wrong.tests[0]).toMatchObject({ confirmed: true });
    expect(wrong.budgets[0]).toMatchObject({ output: "variance" });
  });

  it("gives the same bits whatever the other sizes are", async () => {
    for (const quantity of ["variance", { quantile: 0.9 }, { shortfall: 0.9 }] as const) {
      const one = asked("x", quantity, exponential, 1);
      const settings = { sources: ["pcg64"], replicates: 4, seed: 5 };
      const several = await runSpec(specOf([one], { ...settings, sizes: [128, 1000, 3000] }));
      const alone = await runSpec(specOf([one], { ...settings, sizes: [1000] }));
      expect(several.cells.find((cell) => cell.n === 1000)?.digest).toBe(alone.cells[0]?.digest);
    }
  });

  it("gives no estimate where a value is not finite", async () => {
    const record = await study(asked("1 / (x - x)", { quantile: 0.9 }, exponential, 1), 64, 4);
    expect(onlyCell(record)).toMatchObject({ mean: null, finiteBias: null });
  });
});

describe("what is refused", () => {
  it("leaves out sizes that a level cannot be read from", () => {
    const { spec, warnings } = buildSpec(
      [{ problem: asked("x", { quantile: 0.999 }, exponential, 7), suite: null }],
      {
        sources: ["pcg64"],
        sizes: [512, 1024, 2048],
      },
    );
    expect(spec.sizes["asked"]).toEqual([1024, 2048]);
    expect(warnings.join()).toMatch(/sizes below 1000 points are left out, its quantile 0.999 cannot/);
  });

  const refused =
    (quantity: Quantity, sizes: number[], change: Partial<Problem> = {}, estimators?: string[]) =>
    () =>
      specOf([{ ...asked("x", quantity, exponential, 1), ...change }], {
        sources: ["pcg64"],
        sizes,
        ...(estimators === undefined ? {} : { estimators }),
      });

  it("says the limits of sizes", () => {
    expect(refused({ quantile: 0.9999 }, [512, 4096])).toThrow(
      /needs at least 10000 points, found 512, 4096/,
    );
    expect(refused({ shortfall: 0.9 }, [2 ** 25])).toThrow(/at most 16777216 \(2\^24\), found 33554432/);
    expect(refused({ quantile: 0.9 }, [2 ** 23], { reference: null })).toThrow(/for the consensus, 4 times/);
    expect(refused("variance", [2 ** 25])).not.toThrow();
  });
});

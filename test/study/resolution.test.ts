/** What output bits cost an integrand: against sums over all cells, done by hand or in plain numbers. */
import { describe, expect, it } from "vitest";
import { normalQuantile } from "../../src/numeric/normal.js";
import { mean } from "../../src/numeric/sums.js";
import type { Problem, SourceSpec } from "../../src/problem/contract.js";
import type { ResolutionCost } from "../../src/record/resolution.js";
import { parseSource } from "../../src/sources/choice.js";
import { bitLadder, cellsOf, resolutionCost } from "../../src/study/resolution.js";
import { prepareProblems, type RunnableProblem } from "../../src/study/runnable.js";
import { problem } from "./fixtures.js";

async function prepare(integrand: string, change: Partial<Problem>): Promise<RunnableProblem> {
  const [runnable] = await prepareProblems([problem("cells", integrand, change)]);
  return runnable as RunnableProblem;
}

const REQUEST = { seed: 5, points: 4096, replicates: 32 };

/** Fixed seed; an interval of 99.99 % misses a true value once in 10,000. */
const SURE = { ...REQUEST, confidence: 0.9999 };

function expectInside({ interval: [low, high] }: Pick<ResolutionCost, "interval">, value: number): void {
  expect(low).toBeLessThanOrEqual(value);
  expect(high).toBeGreaterThanOrEqual(value);
}

const middles = (bits: number): number[] =>
  Array.from({ length: 2 ** bits }, (_, k) => (k + 0.5) / 2 ** bits);

describe("the bias of b bits", () => {
  it("of x^2 is -h^2/12 with the middles of cells, h = 2^-b", async () => {
    const square = await prepare("x[1]^2", { dimension: 1 });
    for (const bits of [1, 2, 4, 8, 12]) {
      const cost = resolutionCost(square, bits, SURE);
      expectInside(cost, -(4 ** -bits) / 12);
      // reflection leaves the order of the bias itself: within a few per cent of it
      expect(cost.standardError).toBeLessThan(0.05 * 4 ** -bits);
    }
  });

  it("of x^2 is -h/2 + h^2/6 with left ends", async () => {
    const square = await prepare("x[1]^2", { dimension: 1 });
    for (const bits of [2, 4, 8]) {
      const h = 2 ** -bits;
      expectInside(resolutionCost(square, bits, { ...SURE, endpoint: "left" }), -h / 2 + (h * h) / 6);
    }
  });

  it("of a product of three is a product of sums over cells, outermost ones included once", async () => {
    const product = await prepare("x[1]^2 * x[2]^4 * x[3]^6", {});
    for (const bits of [1, 2, 3, 5]) {
      const moment = (power: number): number => mean(middles(bits).map((u) => u ** power));
      const exact = moment(2) * moment(4) * moment(6) - 1 / (3 * 5 * 7);
      const cost = resolutionCost(product, bits, SURE);
      expectInside(cost, exact);
      expect(cost.standardError).toBeLessThan(Math.abs(exact) / 5);
    }
  });

  it("of z^4 for normal inputs lies in the tails, also where no point of the run reaches them", async () => {
    const inputs = [{ name: "z", distribution: "normal", length: 2, first: 0 }] as const;
    const fourth = await prepare("z[1]^4 + z[2]^4", { dimension: 2, inputs });
    for (const bits of [4, 8, 12, 16]) {
      const exact = 2 * (mean(middles(bits).map((u) => normalQuantile(u) ** 4)) - 3);
      const { unreachableTail, ...cost } = resolutionCost(fourth, bits, SURE);
      expectInside(cost, exact);
      expect(cost.standardError).toBeLessThan(Math.abs(exact) / 20);
      expect(unreachableTail.bias / exact).toBeGreaterThan(0.8);
      expect(unreachableTail.probability).toBeCloseTo(1 - (1 - 2 ** -bits) ** 2, 12);
    }
  });

  it("is 0 at 52 bits and beyond, which no coordinate exceeds", async () => {
    const cubes = await prepare("sum(x .^ 3)", {});
    for (const bits of [52, 64]) {
      expect(resolutionCost(cubes, bits, REQUEST)).toMatchObject({ bits, bias: 0, interval: [0, 0] });
    }
  });

  it("is not finite, and says so, where a left end is a pole", async () => {
    const pole = await prepare("log(x[1]) + x[2]", { dimension: 2 });
    const left = resolutionCost(pole, 8, { ...REQUEST, endpoint: "left" });
    expect(left.bias).toBe(-Infinity);
    expect(left.nonFinite).toBeGreaterThan(0);
    const middle = resolutionCost(pole, 8, SURE);
    expect(middle.nonFinite).toBe(0);
    expectInside(middle, mean(middles(8).map(Math.log)) + 1);
  });
});

describe("asking for it", () => {
  it("gives the same bits for the same request, and refuses what is out of range", async () => {
    const cubes = await prepare("sum(x .^ 3)", {});
    expect(resolutionCost(cubes, 10, REQUEST)).toEqual(resolutionCost(cubes, 10, REQUEST));
    expect(() => resolutionCost(cubes, 0, REQUEST)).toThrow(
      new RangeError("bits: expected a whole number of at least 1, found 0"),
    );
    expect(() => resolutionCost(cubes, NaN, REQUEST)).toThrow(RangeError);
    expect(() => resolutionCost(cubes, 8, { ...REQUEST, replicates: 1 })).toThrow(
      new RangeError("replicates: expected a whole number of at least 2, found 1"),
    );
    expect(() => resolutionCost(cubes, 8, { ...REQUEST, points: 0 })).toThrow(
      new RangeError("points: expected a whole number of at least 1, found 0"),
    );
  });

  it("looks at the usual bits and the source's own", () => {
    expect(bitLadder(31)).toEqual([8, 12, 16, 24, 31, 32]);
    expect(bitLadder(24)).toEqual([8, 12, 16, 24, 32]);
    expect(bitLadder(64)).toEqual([8, 12, 16, 24, 32, 52]);
  });

  it("knows the cells of a source: its bits, at most 52, and which point of a cell it gives", () => {
    const cells = (spec: SourceSpec): unknown => cellsOf(parseSource(spec).source);
    expect(cells("randu")).toEqual({ bits: 31, endpoint: "middle" });
    expect(cells("lrand48")).toEqual({ bits: 31, endpoint: "middle" });
    expect(cells("pcg64")).toEqual({ bits: 52, endpoint: "middle" });
    expect(cells("sobol+owen")).toEqual({ bits: 52, endpoint: "middle" });
    const own = { name: "own", source: "mt19937", bits: "low 9", endpoint: "left" };
    expect(cells(own)).toEqual({ bits: 9, endpoint: "left" });
    expect(cells({ name: "float", source: "pcg64", float32: true })).toEqual({
      bits: 24,
      endpoint: "middle",
    });
  });
});

/** The compiled function: valid modules, blocks that do not matter, constants, channels, memory. */
import binaryen from "binaryen";
import { describe, expect, test } from "vitest";
import { Builder } from "../../src/formula/builder.js";
import { blockPointsFor, emitGraph } from "../../src/formula/compile.js";
import { runKernel } from "../../src/formula/fold.js";
import { compileFormula, describeFormula, evaluateConstant } from "../../src/formula/index.js";
import type { FormulaScope } from "../../src/formula/contract.js";
import { runFormula, valuesOf, vectorScope } from "./run.js";

const FORMULAS: readonly (readonly [string, FormulaScope])[] = [
  ["exp(-sum((x - 0.5) .^ 2))", vectorScope("x", 8)],
  ["prod((abs(4 * x - 2) + a) ./ (1 + a))", vectorScope("x", 4, { a: [1, 2, 3, 4] })],
  ["level = 100 * exp(cumsum(0.01 + 0.2 * x))\nmax(mean(level) - 100, 0)", vectorScope("x", 32)],
  ["cos(2 * pi * 0.3 + dot(c, x))", vectorScope("x", 3, { c: [1, 2, 3] })],
  ["m = mean(x)\nsum((x - m) .^ 2) / (length(x) - 1)", vectorScope("x", 16)],
  ["sum(sort(x)[2:end]) + sort(x)[3]", vectorScope("x", 7)],
  ["level = cumsum(x)\nsum(max(diff(level), 0)) + max(level) + level[2]", vectorScope("x", 9)],
  ["sum(exp(M * x))", vectorScope("x", 2, { M: [[1, 2], [3, 4], [5, 6]] })], // prettier-ignore
  ["sum([x[1], sin(x[2]), 3] .* x) > 1", vectorScope("x", 3)],
  ["y = pow(x, 1.5)\nsum(y) / prod(y + 1) + atan2(y[1], y[2])", vectorScope("x", 5)],
];

function points(count: number, dimension: number): number[][] {
  return Array.from({ length: count }, (_, i) =>
    Array.from({ length: dimension }, (_unused, j) => ((i + 1) * Math.sqrt(j + 2.5)) % 1),
  );
}

describe.each(FORMULAS)("%s", (text, scope) => {
  test("passes both validators", async () => {
    const { moduleBytes } = await compileFormula(text, scope);
    expect(WebAssembly.validate(moduleBytes)).toBe(true);
    const module = binaryen.readBinary(moduleBytes);
    module.setFeatures(binaryen.Features.All);
    expect(module.validate()).toBe(1);
    module.dispose();
  });

  test("a point's value does not depend on the block, on its place in it or on its neighbours", async () => {
    const formula = await compileFormula(text, scope);
    const all = points(formula.blockPoints + 13, formula.dimension);
    const together = runFormula(formula, all).flat();
    const shifted = runFormula(formula, all.slice(5)).flat();
    expect(shifted).toEqual(together.slice(5));
    const wider: FormulaScope = {
      inputs: [...scope.inputs, { name: "unused", length: 300, first: formula.dimension }],
      constants: scope.constants,
    };
    const other = await compileFormula(text, wider);
    expect(other.blockPoints).not.toBe(formula.blockPoints);
    expect(runFormula(other, all).flat()).toEqual(together);
  });
});

test("points per block: a multiple of 64, at most 32 KB of coordinates", () => {
  expect([0, 1, 8, 10, 64, 65, 1000].map(blockPointsFor)).toEqual([2048, 2048, 512, 384, 64, 64, 64]);
});

test("several channels stand one block apart", () => {
  const builder = new Builder(runKernel);
  const x = builder.rows(0, 3);
  const [sum, largest] = [builder.reduce("sum", x), builder.reduce("max", x)];
  const formula = emitGraph(builder, [sum, largest, builder.row(1)], 3, false);
  expect(formula.channels).toBe(3);
  expect(runFormula(formula, [[1, 2, 4], [0.5, -1, 0.25]])).toEqual([[7, 4, 2], [-0.25, 0.5, -1]]); // prettier-ignore
});

test("conditions are recognised as probabilities", async () => {
  const scope = vectorScope("x", 2);
  const indicator = async (text: string): Promise<boolean> => (await compileFormula(text, scope)).indicator;
  expect(await indicator("x[1] < x[2] and not (x[1] > 0.5)")).toBe(true);
  expect(await indicator("(x[1] < 0.3) * (x[2] < 0.7)")).toBe(true);
  expect(await indicator("4 * (x[1] < 0.3)")).toBe(false);
  expect(await indicator("sum(x < 0.5)")).toBe(false);
});

test("a NaN spoils a whole sorted vector, of inputs or of constants", async () => {
  const scope = vectorScope("x", 5, { c: [3, NaN, 1] });
  const texts = ["sort(sqrt(x))[1]", "sort(sqrt(x))[3]", "sort(sqrt(x))[end]", "sort(c)[1] + 0 * x[1]"];
  for (const text of texts) expect(await valuesOf(text, scope, [[4, 1, -1, 9, 16]])).toEqual([NaN]);
});

test("what is not chosen has no effect", async () => {
  const scope = vectorScope("x", 1);
  expect(await valuesOf("x[1] > 0 ? log(x[1]) : 7", scope, [[-1], [1]])).toEqual([7, 0]);
});

test("vectors are kept in memory only where they must be", async () => {
  const scratch = async (text: string): Promise<number> =>
    (await compileFormula(text, vectorScope("x", 10))).scratchBytes;
  expect(await scratch("max(mean(exp(x) .* x + sqrt(x)) - 1, 0)")).toBe(0);
  expect(await scratch("y = cumsum(x)\nmax(y) + min(y) + y[end]")).toBe(0);
  // Ten rows of four vectors of two doubles.
  expect(await scratch("y = exp(x)\nm = mean(y)\nsum((y - m) .^ 2)")).toBe(640);
  expect(await scratch("sum(sort(x) .* (1:10))")).toBe(640);
});

// Python 3.11, fractions and math: exact integers; exp(1), sqrt(2) / 3 to the nearest double.
test.each([
  ["2^31 - 1", 2147483647],
  ["sum((1:100) .^ 2)", 338350],
  ["sqrt(2) / 3", 0.47140452079103173],
  ["exp(1)", Math.E],
  ["1 < 2", 1],
  ["f(p) = p * p\nf(3) + cumprod([1, 2, 3, 4])[end]", 33],
])("constant %s", async (text, value) => {
  expect(await evaluateConstant(text)).toBeCloseTo(value, 14);
});

test("a constant has the bits of the compiled code", async () => {
  const arguments_ = [0.1, 0.7, 1.3, 2.9];
  for (const name of ["exp", "log", "sin", "erfc", "gamma", "normalCdf"]) {
    const compiled = await valuesOf(`${name}(x[1])`, vectorScope("x", 1), arguments_.map((value) => [value])); // prettier-ignore
    const folded = await Promise.all(arguments_.map((value) => evaluateConstant(`${name}(${value})`)));
    expect(folded).toEqual(compiled);
  }
});

test("a constant may use constants, but no inputs", async () => {
  expect(await evaluateConstant("notional * 1.5", { notional: 4 })).toBe(6);
  await expect(evaluateConstant("x + 1")).rejects.toThrow('unknown name "x"');
});

test("description of names and result", async () => {
  const text = "y = cumsum(x)\ninside = y[1] < 0\ninside ? max(y) : 0";
  expect(await describeFormula(text, vectorScope("x", 12))).toEqual({
    names: [
      { name: "y", shape: "a vector of 12" },
      { name: "inside", shape: "a condition" },
    ],
    result: "a number",
  });
});

test("a chain as long as allowed, with slices and elements taken of it", async () => {
  const lines = Array.from({ length: 1400 }, (_, i) => `b${i + 1} = b${i} + 0.5`);
  const text = ["b0 = x + 0", ...lines, "b1400[2] + sum(b1400[1:2])"].join("\n");
  expect(await valuesOf(text, vectorScope("x", 3), [[1, 2, 3]])).toEqual([702 + 701 + 702]);
});

/**
 * Special-function kernels against mpmath values (test/published/data/special.json, made by test/published/make/special.py)
 * and against the normal quantiles and probabilities of test/published/data/stats.json (mpmath, 50 digits).
 */
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { valuesOf } from "../formula/run.js";
import { expectClose, stats } from "../published/stats-data.js";
import { mapKernels } from "./map-kernel.js";

/** Argument, nearest double to the value, and what that double lacks in units of its last place. */
type Point = [number, number, number];

const published = JSON.parse(
  readFileSync(new URL("../published/data/special.json", import.meta.url), "utf8"),
) as { points: Record<Name, Point[]> };

const names = ["erf", "erfc", "gamma", "lgamma", "normalPdf", "normalCdf", "normalQuantile"] as const;
type Name = (typeof names)[number];
const kernels = mapKernels(names);

/** The bounds of docs/kernels.md, in units in the last place. */
const bounds: Record<Name, number> = {
  erf: 2,
  erfc: 3,
  gamma: 3.5,
  lgamma: 3.5,
  normalPdf: 2.5,
  normalCdf: 3.5,
  normalQuantile: 9,
};

const word = new DataView(new ArrayBuffer(8));

function bits(x: number): bigint {
  word.setFloat64(0, x);
  return word.getBigUint64(0);
}

/** Distance of the doubles around |y|, y finite. */
function ulp(y: number): number {
  word.setFloat64(0, Math.abs(y));
  const exponent = Math.max(word.getUint16(0) >> 4, 1);
  return exponent > 52 ? 2 ** (exponent - 1075) : Number.MIN_VALUE * 2 ** (exponent - 1);
}

function values(name: Name, xs: readonly number[]): number[] {
  return [...kernels[name](Float64Array.from(xs))];
}

describe.each(names)("%s", (name) => {
  const points = published.points[name];
  const found = values(
    name,
    points.map(([x]) => x),
  );

  it(`is within ${bounds[name]} ulp of mpmath`, () => {
    expect(points.length).toBeGreaterThan(300);
    points.forEach(([x, y, rest], i) => {
      const error = Math.abs(((found[i] ?? NaN) - y) / ulp(y) - rest);
      expect(error <= bounds[name], `${name}(${x}) = ${found[i]}, ${y} expected: ${error} ulp off`).toBe(
        true,
      );
    });
  });

  it("gives each lane its own value, whatever stands beside it", () => {
    const edges = [NaN, 0, -0, 1, -1, Infinity, -Infinity, 5e-324, 200, -200, 0.5];
    const xs = points.flatMap(([x], i) => [x, edges[i % edges.length] ?? 0]);
    const beside = values(name, xs);
    points.forEach(([x], i) => expect(beside[2 * i], `${name}(${x})`).toBe(found[i]));
    const shifted = values(name, [0.3, ...xs]);
    expect(shifted.slice(1).map(bits)).toEqual(beside.map(bits));
  });

  it("has the same bits when spliced into a formula", async () => {
    const scope = { inputs: [{ name: "a", length: null, first: 0 }], constants: {} };
    const spliced = await valuesOf(
      `${name}(a)`,
      scope,
      points.map(([x]) => [x]),
    );
    expect(spliced.map(bits)).toEqual(found.map(bits));
  });

  it("gives NaN for NaN", () => {
    expect(values(name, [NaN, 0.25, 0.25, NaN]).map((y) => Number.isNaN(y))).toEqual([
      true,
      false,
      false,
      true,
    ]);
  });
});

// Limits and poles: the definitions in the NIST Digital Library of Mathematical Functions, chapters 5 and 7.
// Poles of gamma and the domain of lgamma as in mathjs 15 (gamma(-1) = Infinity, lgamma(-0.5) = NaN), whose language it is.
describe("edges", () => {
  it.each<[Name, number, number]>([
    ["erf", 0, 0],
    ["erf", -0, -0],
    ["erf", Infinity, 1],
    ["erf", -Infinity, -1],
    ["erf", 30, 1],
    ["erfc", 0, 1],
    ["erfc", -0, 1],
    ["erfc", Infinity, 0],
    ["erfc", -Infinity, 2],
    ["erfc", 27.3, 0],
    ["normalPdf", Infinity, 0],
    ["normalPdf", -Infinity, 0],
    ["normalPdf", -40, 0],
    ["normalCdf", 0, 0.5],
    ["normalCdf", Infinity, 1],
    ["normalCdf", -Infinity, 0],
    ["normalCdf", -39, 0],
    ["normalQuantile", 0, -Infinity],
    ["normalQuantile", -0, -Infinity],
    ["normalQuantile", 1, Infinity],
    ["normalQuantile", 0.5, 0],
    ["normalQuantile", -5e-324, NaN],
    ["normalQuantile", 1.0000000000000002, NaN],
    ["normalQuantile", Infinity, NaN],
    ["normalQuantile", -Infinity, NaN],
    ["gamma", 0, Infinity],
    ["gamma", -0, Infinity],
    ["gamma", -1, Infinity],
    ["gamma", -186, Infinity],
    ["gamma", -(2 ** 60), Infinity],
    ["gamma", Infinity, Infinity],
    ["gamma", -Infinity, NaN],
    ["gamma", 171.625, Infinity],
    ["gamma", 5e-324, Infinity],
    ["gamma", -5e-324, -Infinity],
    ["gamma", -190.5, -0],
    ["gamma", -191.5, 0],
    ["gamma", -200.5, -0],
    ["lgamma", 0, Infinity],
    ["lgamma", -0, Infinity],
    ["lgamma", 1, 0],
    ["lgamma", 2, 0],
    ["lgamma", -0.5, NaN],
    ["lgamma", -1, NaN],
    ["lgamma", Infinity, Infinity],
    ["lgamma", -Infinity, NaN],
    ["lgamma", 1e306, Infinity],
  ])("%s(%d) is %d", (name, x, y) => {
    const [found = 0] = values(name, [x]);
    if (y === 0) expect(Math.abs(found)).toBe(0);
    else expect(found).toBe(y);
    if (y === 0 && name === "gamma") expect(Object.is(found, y)).toBe(true);
  });
});

describe("gamma at the integers", () => {
  it("is the correctly rounded factorial", () => {
    let factorial = 1n;
    const xs = Array.from({ length: 171 }, (_, k) => k + 1);
    const found = values("gamma", xs);
    for (const n of xs) {
      expect(found[n - 1], `gamma(${n})`).toBe(Number(factorial));
      factorial *= BigInt(n);
    }
  });
});

describe("normal distribution", () => {
  const rows = stats.normal_quantiles.filter((row) => Number(row.p_as_double) < 1);

  it.each(rows)(
    "quantile at p = $p is within 1e-15 of mpmath",
    ({ p_as_double, quantile_of_p_as_double }) => {
      const [found = NaN] = values("normalQuantile", [Number(p_as_double)]);
      expectClose(found, Number(quantile_of_p_as_double), 1e-15);
    },
  );

  it.each(stats.normal_cdf)("distribution at x = $x", ({ x, cdf, sf }) => {
    const [left = NaN, right = NaN] = values("normalCdf", [Number(x), -Number(x)]);
    // x is a decimal; rounding it to a double moves the tail by up to x^2 2^-53
    const tolerance = 1e-15 + Number(x) ** 2 * 2 ** -53;
    expectClose(left, Number(cdf), tolerance, Number.MIN_VALUE);
    expectClose(right, Number(sf), tolerance, Number.MIN_VALUE);
  });
});

describe("normalBlock", () => {
  const own = instantiateKernels();
  const { exports, arena } = own;
  const scratch = arena.allocate(exports.normalBlockScratch());
  const uniforms = published.points.normalQuantile
    .map(([p]) => p)
    .concat([0, 1, -1, 2, NaN, 1e-310, Infinity]);

  it.each([
    [1, 1, 1],
    [1, 3, 2],
    [3, 64, 64],
    [5, 64, 61],
    [2, 4096, 4096],
    [3, 1030, 1025],
    [7, 511, 511],
  ])(
    "%d rows of stride %d with %d values: the bits of vec_normalQuantile, nothing else touched",
    (rows, stride, count) => {
      const size = rows * stride + 2;
      const before = Array.from({ length: size }, (_, i) => uniforms[(i * 7) % uniforms.length] ?? 0.5);
      const expected = values("normalQuantile", before);
      const mark = arena.mark();
      const pointer = arena.allocate(size * 8);
      own.f64(pointer, size).set(before);
      exports.normalBlock(pointer, stride, rows, count, scratch);
      const found = own.u64(pointer, size);
      for (let i = 0; i < size; i++) {
        const inside = i < rows * stride && i % stride < count;
        expect(found[i], `value ${i}`).toBe(bits((inside ? expected : before)[i] ?? 0));
      }
      arena.release(mark);
    },
  );
});

/**
 * Elementary kernels against mpmath values (test/published/data/elementary.json, made by
 * test/published/make/elementary.py), and at zeros, infinities and NaN against IEEE 754-2019, section 9.2.1 (the same
 * results as in ISO C, Annex F).
 */
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { mapKernels } from "./map-kernel.js";

/** The bounds promised in docs/kernels.md, in units in the last place. */
const BOUNDS = {
  exp: 1,
  expm1: 1,
  log: 0.6,
  log1p: 0.6,
  log2: 0.6,
  log10: 0.6,
  cbrt: 0.6,
  pow: 1,
  sin: 0.75,
  cos: 0.75,
  tan: 2.5,
  asin: 1,
  acos: 1,
  atan: 0.75,
  atan2: 1.25,
  sinh: 2,
  cosh: 1.5,
  tanh: 2.5,
};
type Name = keyof typeof BOUNDS;
const NAMES = Object.keys(BOUNDS) as Name[];
const TWO = new Set<Name>(["pow", "atan2"]);
const kernels = mapKernels(NAMES);

/** Arguments, the nearest double of the value, and what that lacks in units of its last place. */
const published = JSON.parse(
  readFileSync(new URL("../published/data/elementary.json", import.meta.url), "utf8"),
) as Record<Name, number[][]>;

const word = new DataView(new ArrayBuffer(8));

function bits(x: number): bigint {
  word.setFloat64(0, x);
  return word.getBigUint64(0);
}

/** Distance of the doubles around |y|, y finite. */
function ulp(y: number): number {
  const exponent = Math.max(Number((bits(y) >> 52n) & 0x7ffn), 1);
  return exponent > 52 ? 2 ** (exponent - 1075) : Number.MIN_VALUE * 2 ** (exponent - 1);
}

/** The kernel at rows of arguments. */
function at(name: Name, rows: readonly (readonly number[])[]): number[] {
  const column = (k: number): Float64Array => Float64Array.from(rows, (row) => row[k] ?? 1);
  return [...kernels[name](column(0), TWO.has(name) ? column(1) : undefined)];
}

const EDGES = [NaN, 0, -0, Infinity, -Infinity, 5e-324, -1, 1e-310, 800, -800, 1e300];

describe.each(NAMES)("%s", (name) => {
  const arity = TWO.has(name) ? 2 : 1;
  const rows = published[name];
  const found = at(name, rows);

  it(`is within ${BOUNDS[name]} ulp of mpmath`, () => {
    expect(rows.length).toBeGreaterThan(100);
    rows.forEach((row, i) => {
      const [value = NaN, rest = NaN] = row.slice(arity);
      const error = Math.abs(((found[i] ?? NaN) - value) / ulp(value) - rest);
      expect(
        error <= BOUNDS[name],
        `${name}(${row.slice(0, arity).join(", ")}) = ${found[i]}, ${value} expected: ${error} ulp off`,
      ).toBe(true);
    });
  });

  it("gives each lane its own bits, whatever stands beside it", () => {
    // neighbours take the rare path, so that ordinary arguments go through both paths
    const mixed = rows.flatMap((row, i) => [
      row,
      [EDGES[i % EDGES.length] ?? 0, EDGES[(i * 7) % EDGES.length] ?? 0],
    ]);
    const beside = at(name, mixed);
    expect(rows.map((_, i) => beside[2 * i])).toEqual(found);
    const shifted = at(name, [[0.3, 0.3], ...mixed]);
    expect(shifted.slice(1).map(bits)).toEqual(beside.map(bits));
  });
});

/** Compares with the sign of zero; NaN equals NaN. */
function expectRows(name: Name, table: readonly (readonly number[])[]): void {
  const found = at(name, table);
  table.forEach((row, i) => {
    const last = row[row.length - 1];
    expect(found[i], `${name}(${row.slice(0, -1).map(String).join(", ")})`).toBe(last);
  });
}

const { PI } = Math;
const INF = Infinity;
const MAX = Number.MAX_VALUE;

describe("zeros, infinities and NaN", () => {
  const limits: Partial<Record<Name, [number, number][]>> = {
    exp: [
      [0, 1],
      [-0, 1],
      [INF, INF],
      [-INF, 0],
      [710, INF],
      [-746, 0],
      [MAX, INF],
      [-MAX, 0],
      [-745.2, 0],
    ],
    expm1: [
      [0, 0],
      [-0, -0],
      [INF, INF],
      [-INF, -1],
      [710, INF],
      [-800, -1],
      [-40, -1],
    ],
    log: [
      [0, -INF],
      [-0, -INF],
      [1, 0],
      [INF, INF],
      [-1, NaN],
      [-5e-324, NaN],
      [-INF, NaN],
    ],
    log1p: [
      [0, 0],
      [-0, -0],
      [-1, -INF],
      [INF, INF],
      [-1.5, NaN],
      [-INF, NaN],
    ],
    log2: [
      [0, -INF],
      [-0, -INF],
      [1, 0],
      [INF, INF],
      [-1, NaN],
      [-INF, NaN],
    ],
    log10: [
      [0, -INF],
      [-0, -INF],
      [1, 0],
      [INF, INF],
      [-1, NaN],
      [-INF, NaN],
    ],
    cbrt: [
      [0, 0],
      [-0, -0],
      [INF, INF],
      [-INF, -INF],
    ],
    sin: [
      [0, 0],
      [-0, -0],
      [INF, NaN],
      [-INF, NaN],
    ],
    cos: [
      [0, 1],
      [-0, 1],
      [INF, NaN],
      [-INF, NaN],
    ],
    tan: [
      [0, 0],
      [-0, -0],
      [INF, NaN],
      [-INF, NaN],
    ],
    asin: [
      [0, 0],
      [-0, -0],
      [1, PI / 2],
      [-1, -PI / 2],
      [1.0000000000000002, NaN],
      [-INF, NaN],
    ],
    acos: [
      [1, 0],
      [-1, PI],
      [0, PI / 2],
      [1.0000000000000002, NaN],
      [INF, NaN],
    ],
    atan: [
      [0, 0],
      [-0, -0],
      [INF, PI / 2],
      [-INF, -PI / 2],
    ],
    sinh: [
      [0, 0],
      [-0, -0],
      [INF, INF],
      [-INF, -INF],
      [711, INF],
      [-711, -INF],
    ],
    cosh: [
      [0, 1],
      [-0, 1],
      [INF, INF],
      [-INF, INF],
      [711, INF],
      [-711, INF],
    ],
    tanh: [
      [0, 0],
      [-0, -0],
      [INF, 1],
      [-INF, -1],
      [1e300, 1],
      [-30, -1],
    ],
  };

  it.each(Object.keys(limits) as Name[])("%s", (name) => {
    expectRows(name, [...(limits[name] ?? []), [NaN, NaN]]);
  });

  it("pow", () => {
    const third = 1 / 3;
    expectRows("pow", [
      [NaN, 0, 1],
      [NaN, -0, 1],
      [1, NaN, 1],
      [1, INF, 1],
      [1, -INF, 1],
      [-1, INF, 1],
      [-1, -INF, 1],
      [0, 0, 1],
      [INF, 0, 1],
      [NaN, 1, NaN],
      [2, NaN, NaN],
      [NaN, NaN, NaN],
      [0, NaN, NaN],
      [-8, third, NaN],
      [-1, 0.5, NaN],
      [0, 3, 0],
      [-0, 3, -0],
      [-0, 2, 0],
      [-0, 0.5, 0],
      [0, -3, INF],
      [-0, -3, -INF],
      [-0, -2, INF],
      [-0, -0.5, INF],
      [0, INF, 0],
      [0, -INF, INF],
      [0.5, INF, 0],
      [0.5, -INF, INF],
      [-0.5, INF, 0],
      [2, INF, INF],
      [-2, INF, INF],
      [2, -INF, 0],
      [INF, 0.1, INF],
      [INF, -0.1, 0],
      [-INF, 3, -INF],
      [-INF, 2, INF],
      [-INF, 0.5, INF],
      [-INF, -3, -0],
      [-INF, -2, 0],
      [-INF, -0.5, 0],
      [10, 309, INF],
      [-10, 309, -INF],
      [10, -324, 0],
      [-10, -325, -0],
      [5e-324, 2, 0],
      [5e-324, -2, INF],
      [MAX, MAX, INF],
      [-MAX, MAX, INF],
      [MAX, -MAX, 0],
      [-1, MAX, 1],
      [-1, 9007199254740991, -1],
      [-1, 9007199254740992, 1],
      [3, 5e-324, 1],
    ]);
  });

  it("atan2", () => {
    expectRows("atan2", [
      [0, 0, 0],
      [-0, 0, -0],
      [0, -0, PI],
      [-0, -0, -PI],
      [0, 2, 0],
      [-0, 2, -0],
      [0, -2, PI],
      [-0, -2, -PI],
      [2, 0, PI / 2],
      [2, -0, PI / 2],
      [-2, 0, -PI / 2],
      [INF, 1, PI / 2],
      [-INF, -1, -PI / 2],
      [1, INF, 0],
      [-1, INF, -0],
      [1, -INF, PI],
      [-1, -INF, -PI],
      [INF, INF, PI / 4],
      [-INF, INF, -PI / 4],
      [INF, -INF, (3 * PI) / 4],
      [-INF, -INF, (-3 * PI) / 4],
      [0, INF, 0],
      [0, -INF, PI],
      [INF, 0, PI / 2],
      [5e-324, MAX, 0],
      [-5e-324, -MAX, -PI],
      [MAX, 5e-324, PI / 2],
      [NaN, 1, NaN],
      [1, NaN, NaN],
      [NaN, INF, NaN],
    ]);
  });
});

describe("whole results", () => {
  it("log2 of every power of two", () => {
    const rows = Array.from({ length: 2098 }, (_, i) => {
      const k = i - 1074;
      return [k < -1022 ? Number.MIN_VALUE * 2 ** (k + 1074) : 2 ** k, k === 0 ? 0 : k];
    });
    expectRows("log2", rows);
  });

  it("log10 of 10^k, and 10^k itself, up to 10^22, which is the last one that is a double", () => {
    const powers = Array.from({ length: 23 }, (_, k): [number, number] => [Number(`1e${k}`), k]);
    expectRows("log10", powers);
    expectRows(
      "pow",
      powers.map(([x, k]) => [10, k, x]),
    );
  });

  it("cbrt of cubes", () => {
    expectRows(
      "cbrt",
      Array.from({ length: 2001 }, (_, i) => [(i - 1000) ** 3, i - 1000]),
    );
  });
});

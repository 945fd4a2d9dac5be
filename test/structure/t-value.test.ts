/** t against its definition, boxes counted point by point, for random matrices in several bases; bounds and bad input. */
import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { findSource } from "../../src/sources/registry.js";
import { isDigitalNet, netOf, netOfSource, type Net } from "../../src/structure/net.js";
import { pairTValues, tValue, worstPairs } from "../../src/structure/t-value.js";

/** Leading digits of the coordinates of all points, most significant first. */
function digitsOfPoints({ base, digits, matrices }: Net): number[][][] {
  return Array.from({ length: base ** digits }, (_, index) => {
    const expansion = Array.from({ length: digits }, (_, c) => Math.floor(index / base ** c) % base);
    return matrices.map((matrix) =>
      Array.from({ length: digits }, (_, r) =>
        r < matrix.rows ? expansion.reduce((sum, e, c) => sum + e * matrix.get(r, c), 0) % base : 0,
      ),
    );
  });
}

function compositions(total: number, parts: number): number[][] {
  if (parts === 1) return [[total]];
  return Array.from({ length: total + 1 }, (_, first) =>
    compositions(total - first, parts - 1).map((rest) => [first, ...rest]),
  ).flat();
}

/** The least t such that all boxes of volume base^(t-m) hold base^t points. */
function tByCounting(net: Net): number {
  const points = digitsOfPoints(net);
  const { base, digits } = net;
  for (let t = 0; t <= digits; t++) {
    const fair = compositions(digits - t, net.matrices.length).every((sides) => {
      const counts = new Map<string, number>();
      for (const point of points) {
        const box = point.map((coordinate, j) => coordinate.slice(0, sides[j]).join("")).join(" ");
        counts.set(box, (counts.get(box) ?? 0) + 1);
      }
      return counts.size === base ** (digits - t) && [...counts.values()].every((c) => c === base ** t);
    });
    if (fair) return t;
  }
  return NaN;
}

const nets = fc
  .constantFrom(
    { base: 2, digits: 5, dimension: 3 },
    { base: 2, digits: 4, dimension: 4 },
    { base: 3, digits: 3, dimension: 3 },
    { base: 5, digits: 2, dimension: 3 },
    { base: 2, digits: 6, dimension: 2 },
    { base: 7, digits: 2, dimension: 2 },
  )
  .chain(({ base, digits, dimension }) =>
    fc
      .array(
        fc.array(fc.array(fc.nat(base - 1), { minLength: digits, maxLength: digits }), {
          minLength: 1,
          maxLength: digits + 1,
        }),
        { minLength: dimension, maxLength: dimension },
      )
      .map((rows) => netOf({ base, order: "natural", matrices: rows.map((m) => new Matrix(m)) })),
  );

const all = ({ matrices }: Net): number[] => matrices.map((_, j) => j);

describe("t", () => {
  it("is what counting points in boxes gives, for any matrices, short and singular ones too", () => {
    fc.assert(
      fc.property(nets, (net) => {
        expect(tValue(net, all(net)).t).toBe(tByCounting(net));
        const pairs = pairTValues(net);
        for (let j = 1; j < net.matrices.length; j++) {
          for (let i = 0; i < j; i++) {
            const two = { ...net, matrices: [net.matrices[i], net.matrices[j]].flatMap((m) => m ?? []) };
            expect(pairs.values[(j * (j - 1)) / 2 + i]).toBe(tByCounting(two));
          }
        }
      }),
      { seed: 20260401, numRuns: 60 },
    );
  });

  it.each(["sobol", "niederreiter", "polynomial-lattice", "interlaced-2", "interlaced-3"])(
    "is what counting gives for 64 points of %s in three dimensions",
    (id) => {
      const source = findSource(id);
      if (source === undefined || !isDigitalNet(source)) throw new Error("no digital net");
      const net = netOfSource(source, 3, 64);
      expect(tValue(net, [0, 1, 2]).t).toBe(tByCounting(net));
    },
  );

  it("does not depend on the order of the coordinates", () => {
    const source = findSource("sobol");
    if (source === undefined || !isDigitalNet(source)) throw new Error("no digital net");
    const net = netOfSource(source, 12, 2 ** 12);
    expect(tValue(net, [11, 3, 7, 0])).toEqual(tValue(net, [0, 3, 7, 11]));
  });

  it("gives limits that hold where the steps run out", () => {
    const source = findSource("sobol");
    if (source === undefined || !isDigitalNet(source)) throw new Error("no digital net");
    const net = netOfSource(source, 9, 2 ** 14);
    const indices = [0, 1, 2, 3, 4, 5, 6, 7, 8];
    const exact = tValue(net, indices).t ?? NaN;
    for (const steps of [1, 50, 500, 2000]) {
      const cut = tValue(net, indices, steps);
      expect(cut.atLeast).toBeLessThanOrEqual(exact);
      expect(cut.atMost).toBeGreaterThanOrEqual(exact);
    }
    expect(tValue(net, indices, 50).t).toBeNull();
  });

  it("lists the worst pairs, the largest t first", () => {
    const source = findSource("sobol");
    if (source === undefined || !isDigitalNet(source)) throw new Error("no digital net");
    const pairs = pairTValues(netOfSource(source, 60, 2 ** 10));
    const worst = worstPairs(pairs, 20);
    expect(worst).toHaveLength(20);
    expect(worst[0]?.t).toBe(pairs.counts.length - 1);
    const sorted = [...pairs.values].sort((a, b) => b - a).slice(0, 20);
    expect(worst.map(({ t }) => t)).toEqual(sorted);
    for (const { indices, t } of worst) {
      expect(tValue(netOfSource(source, 60, 2 ** 10), indices).t).toBe(t);
    }
  });
});

describe("bad input", () => {
  const unit = (rows: number[][]) => ({ base: 2, order: "natural" as const, matrices: [new Matrix(rows)] });
  const net = netOf(
    unit([
      [1, 0],
      [0, 1],
    ]),
  );

  it.each([
    [[], "coordinates: expected at least one, found none"],
    [[1], "coordinates: expected different ones from 1 to 1, found 2 (out of range)"],
    [[0, 0], "coordinates: expected different ones from 1 to 1, found 1 (given twice)"],
  ])("coordinates %j", (indices, message) => {
    expect(() => tValue(net, indices)).toThrow(new RangeError(message));
  });

  it.each([
    [() => netOf({ ...unit([[1]]), base: 4 }), "base: expected a prime number, found 4"],
    [
      () => netOf(unit([[1, 2]])),
      "generating matrix 1: expected digits from 0 to 1, found 2 in row 1, column 2",
    ],
    [
      () => netOf(unit([[1, 0]]), 3),
      "digits: expected 1 to 2 in base 2 (the first 2^digits points), found 3",
    ],
  ])("%#", (call, message) => {
    expect(call).toThrow(new RangeError(message));
  });

  it("fewer points than the base", () => {
    const source = findSource("faure");
    if (source === undefined || !isDigitalNet(source)) throw new Error("no digital net");
    expect(() => netOfSource(source, 5, 4)).toThrow(
      'n: expected at least the base, 5 points, for the quality of source "faure" in 5 dimensions, found 4',
    );
  });
});

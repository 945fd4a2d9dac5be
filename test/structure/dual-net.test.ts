/** Dual vectors against the definition: the Walsh functions that are 1 on all points, found by trying every one. */
import { Matrix } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { findSource } from "../../src/sources/registry.js";
import { parseSource } from "../../src/sources/choice.js";
import { dualVectors } from "../../src/structure/dual-net.js";
import { isDigitalNet, netOf, netOfSource, type Net } from "../../src/structure/net.js";
import { firstPoints } from "../../src/structure/points.js";
import { tValue } from "../../src/structure/t-value.js";
import { walshPhases } from "../../src/structure/walsh.js";

function netFor(id: string, dimension: number, n: number): Net {
  const source = findSource(id);
  if (source === undefined || !isDigitalNet(source)) throw new Error(`${id} is no digital net`);
  return netOfSource(source, dimension, n);
}

const digitsOf = (k: number, base: number): number => (k === 0 ? 0 : k.toString(base).length);

const cases = [
  ["sobol", 2, 16, 6],
  ["sobol-natural", 3, 8, 5],
  ["niederreiter", 3, 16, 6],
  ["faure", 3, 9, 4],
  ["polynomial-lattice", 2, 32, 7],
  ["interlaced-2", 2, 16, 6],
] as const;

describe.each(cases)(
  "the dual of %s in %i dimensions, %i points, to weight %i",
  (id, dimension, n, weight) => {
    const net = netFor(id, dimension, n);
    const { base } = net;
    const points = firstPoints(parseSource(id), { dimension, n, key: null });
    const isOne = (indices: number[], k: number[]): boolean =>
      walshPhases(base, { indices, k }, points.coordinates, n, n).every((phase) => phase === 0);

    it("is what trying all Walsh functions gives", () => {
      const expected: string[] = [];
      const all = (j: number, left: number, k: number[]): void => {
        if (j === dimension) {
          const indices = k.flatMap((component, at) => (component > 0 ? [at] : []));
          if (
            indices.length > 0 &&
            isOne(
              indices,
              indices.map((at) => k[at] ?? 0),
            )
          )
            expected.push(k.join());
          return;
        }
        for (let component = 0; digitsOf(component, base) <= left; component++) {
          all(j + 1, left - digitsOf(component, base), [...k, component]);
        }
      };
      all(0, weight, []);
      const { vectors, completeTo, end } = dualVectors(net, { enough: Infinity, weight });
      const found = vectors.map(({ indices, k }) =>
        Array.from({ length: dimension }, (_, j) => k[indices.indexOf(j)] ?? 0).join(),
      );
      expect(found.sort()).toEqual(expected.sort());
      expect([completeTo, end]).toEqual([weight, "weight"]);
    });

    it("has the least weight m - t + 1, and vectors by weight and product", () => {
      const { vectors } = dualVectors(net, { enough: 1, weight: net.digits + 1 });
      const t =
        tValue(
          net,
          Array.from({ length: dimension }, (_, j) => j),
        ).t ?? NaN;
      expect(vectors[0]?.weight).toBe(net.digits - t + 1);
      for (const [i, { weight: own, product, k }] of vectors.entries()) {
        expect(own).toBe(k.reduce((sum, component) => sum + digitsOf(component, base), 0));
        expect(product).toBe(k.reduce((a, b) => a * b, 1));
        expect(product).toBeGreaterThanOrEqual(i === 0 ? 0 : (vectors[i - 1]?.product ?? NaN));
      }
    });
  },
);

describe("limits of the search", () => {
  it("keeps to vectors of few coordinates", () => {
    const net = netFor("sobol", 30, 2 ** 8);
    const { vectors } = dualVectors(net, { order: 2, enough: 50 });
    expect(vectors.length).toBeGreaterThanOrEqual(50);
    expect(vectors.every(({ indices }) => indices.length <= 2)).toBe(true);
  });

  it("says how far it came where the steps run out", () => {
    const net = netFor("sobol", 30, 2 ** 12);
    const cut = dualVectors(net, { enough: Infinity, steps: 20_000 });
    expect(cut.end).toBe("steps");
    const whole = dualVectors(net, { enough: Infinity, weight: cut.completeTo });
    expect(cut.vectors).toEqual(whole.vectors);
  });
  it("ends where there are too many vectors, as of matrices of zeros", () => {
    const zeros = netOf({ base: 127, order: "natural", matrices: [Matrix.zeros(4, 4), Matrix.zeros(4, 4)] });
    const { vectors, completeTo, end } = dualVectors(zeros, { enough: 1e6 });
    // 126 in each coordinate of one digit, 126 * 127 of two, and 126^2 in both
    expect([vectors.length, completeTo, end]).toEqual([2 * 126 + 2 * 126 * 127 + 126 ** 2, 2, "steps"]);
  });
});

describe("Walsh functions", () => {
  it.each([
    [2, 7],
    [3, 17],
    [5, 26],
  ])(
    "in base %i: orthonormal over base^K cells (Walsh 1923, Chrestenson 1955), k up to %i",
    (base, largest) => {
      const cells = base ** 3;
      const points = Float64Array.from({ length: cells }, (_, i) => (i + 0.5) / cells);
      const phases = Array.from({ length: largest + 1 }, (_, k) =>
        walshPhases(base, k === 0 ? { indices: [], k: [] } : { indices: [0], k: [k] }, points, cells, cells),
      );
      for (const [k, one] of phases.entries()) {
        for (const [l, other] of phases.entries()) {
          const counts = new Array<number>(base).fill(0);
          for (let i = 0; i < cells; i++) {
            const difference = ((one[i] ?? 0) - (other[i] ?? 0) + base) % base;
            counts[difference] = (counts[difference] ?? 0) + 1;
          }
          expect(counts).toEqual(
            k === l ? [cells, ...counts.slice(1).fill(0)] : counts.slice().fill(cells / base),
          );
        }
      }
    },
  );

  it("are the products of Rademacher's functions in base 2: signs at quarters and eighths", () => {
    const points = Float64Array.from({ length: 8 }, (_, i) => (i + 0.5) / 8);
    const signs = (k: number): string =>
      Array.from(walshPhases(2, { indices: [0], k: [k] }, points, 8, 8), (p) => (p === 0 ? "+" : "-")).join(
        "",
      );
    expect([1, 2, 3, 4, 6].map(signs)).toEqual(["++++----", "++--++--", "++----++", "+-+-+-+-", "+--++--+"]);
  });

  it("take numbers of more than 31 digits", () => {
    const points = Float64Array.of(2 ** -33, 1 - 2 ** -34);
    expect([...walshPhases(2, { indices: [0], k: [2 ** 32 + 1] }, points, 2, 2)]).toEqual([1, 0]);
  });
});

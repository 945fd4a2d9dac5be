import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { chiSquareUpper } from "../../src/numeric/chi-square.js";
import type { Randomisation } from "../../src/sources/contract.js";
import { faure } from "../../src/sources/faure.js";
import { pointsOf } from "./points.js";

/** The K digits of a coordinate, first after the point first. */
function digitsIn(base: number, u: number): number[] {
  const digits: number[] = [];
  let cells = 1;
  let places = 0;
  for (; cells * base <= 2 ** 52; places++) cells *= base;
  let rest = Math.floor(u * cells);
  for (let k = 0; k < places; k++, rest = Math.floor(rest / base)) digits.unshift(rest % base);
  return digits;
}

it("equals the generating matrices times the digits of the index", () => {
  const cases = fc.record({
    dimension: fc.integer({ min: 1, max: 40 }),
    first: fc.oneof(fc.nat(3000), fc.integer({ min: 0, max: 2 ** 44 })),
  });
  fc.assert(
    fc.property(cases, ({ dimension, first }) => {
      const { base, order, matrices } = faure.generatingMatrices(dimension, 2 ** 52);
      expect(order).toBe("natural");
      const points = pointsOf(faure, { dimension, first, count: 9 });
      for (const [i, point] of points.entries()) {
        const columns = matrices[0]?.columns ?? NaN;
        const digits = Array.from({ length: columns }, (_, k) => Math.floor((first + i) / base ** k) % base);
        for (const [j, u] of point.entries()) {
          const rows = digitsIn(base, u).map((_, r) =>
            digits.reduce((sum, digit, k) => (sum + digit * (matrices[j]?.get(r, k) ?? NaN)) % base, 0),
          );
          expect(digitsIn(base, u)).toEqual(rows);
        }
      }
    }),
    { numRuns: 40, seed: 61 },
  );
});

const variants: Randomisation[][] = [[], ["digital-shift"], ["linear"], ["owen"]];

describe.each(
  variants.map((randomisations) => ({ randomisations, name: ["faure", ...randomisations].join("+") })),
)("$name", ({ randomisations }) => {
  it.each([
    [2, 2, 6],
    [3, 3, 4],
    [5, 5, 3],
    [4, 5, 3],
  ])("t = 0: every elementary interval holds one point, d = %i, %i^%i points", (dimension, base, m) => {
    const count = base ** m;
    // the second block of b^m points is stratified too
    const points = pointsOf(faure, { dimension, first: count, count, randomisations, key: "net" });
    for (let choice = 0; choice < (m + 1) ** dimension; choice++) {
      const places = Array.from({ length: dimension }, (_, j) => Math.floor(choice / (m + 1) ** j) % (m + 1));
      if (places.reduce((sum, place) => sum + place, 0) !== m) continue;
      const boxes = points.map((point) =>
        point.map((u, j) => digitsIn(base, u).slice(0, places[j]).join()).join(";"),
      );
      expect(new Set(boxes).size).toBe(count);
    }
  });
});

describe("owen in base 5", () => {
  const options = { dimension: 5, count: 125 };
  const plain = pointsOf(faure, options);

  it("keeps prefixes: two points share exactly as many digits as before", () => {
    const scrambled = pointsOf(faure, { ...options, randomisations: ["owen"], key: "nested" });
    const shared = (a: number, b: number): number => {
      const other = digitsIn(5, b);
      return digitsIn(5, a).findIndex((digit, r) => digit !== other[r]);
    };
    for (let i = 0; i < 125; i += 3) {
      for (let k = 0; k < i; k += 2) {
        for (let j = 0; j < 5; j++) {
          expect(shared(scrambled[i]?.[j] ?? NaN, scrambled[k]?.[j] ?? NaN)).toBe(
            shared(plain[i]?.[j] ?? NaN, plain[k]?.[j] ?? NaN),
          );
        }
      }
    }
  });

  // 5! = 120 permutations, 4,000 drawings each at the root and at one node below it; below 1e-4 for 1 seed in 10,000 a test.
  it.each([
    ["the root", 0],
    ["the node below digit 0", 1],
  ])("all permutations are equally likely at %s", (_, level) => {
    const counts = new Map<string, number>();
    for (let r = 0; r < 800; r++) {
      const scrambled = pointsOf(faure, { dimension: 5, count: 25, randomisations: ["owen"], key: `p${r}` });
      for (let j = 0; j < 5; j++) {
        const image: number[] = [];
        for (let i = 0; i < 25; i++) {
          const before = digitsIn(5, plain[i]?.[j] ?? NaN);
          if (level === 1 && before[0] !== 0) continue;
          image[before[level] ?? NaN] = digitsIn(5, scrambled[i]?.[j] ?? NaN)[level] ?? NaN;
        }
        counts.set(image.join(), (counts.get(image.join()) ?? 0) + 1);
      }
    }
    expect(counts.size).toBe(120);
    const mean = 4000 / 120;
    const statistic = [...counts.values()].reduce((sum, count) => sum + (count - mean) ** 2 / mean, 0);
    expect(chiSquareUpper(statistic, 119)).toBeGreaterThan(1e-4);
  });
});

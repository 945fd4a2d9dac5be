/** Brent's method: roots known in closed form, flat and steep functions, infinite values. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { findRoot } from "../../src/numeric/root.js";

describe("findRoot", () => {
  it("finds roots known in closed form to the last places", () => {
    expect(findRoot((x) => x * x * x - 2, 0, 1)).toBeCloseTo(Math.cbrt(2), 15);
    expect(findRoot((x) => Math.exp(x) - 1e-30, 0, 1)).toBeCloseTo(-30 * Math.LN10, 12);
    expect(findRoot((x) => Math.atan(x - 1e6), 0, 1)).toBeCloseTo(1e6, 8);
    expect(findRoot((x) => (x - 3) ** 9, 10, 1)).toBeCloseTo(3, 1);
  });

  it("counts infinite values by their sign", () => {
    expect(findRoot((x) => (x <= 0 ? -Infinity : Math.log(x)), -5, 1)).toBeCloseTo(1, 14);
  });

  it("gives the start where that is the root", () => {
    expect(findRoot((x) => x - 4, 4, 1)).toBe(4);
  });

  it("says so where the sign never changes", () => {
    expect(() => findRoot(() => 1, 0, 1)).toThrow(/no change of sign/);
  });

  it("finds the root of any increasing cubic from any start", () => {
    const number = fc.double({ min: -1e3, max: 1e3, noNaN: true });
    fc.assert(
      fc.property(number, number, fc.double({ min: 1e-3, max: 1e3, noNaN: true }), (root, start, slope) => {
        const f = (x: number) => (x - root) ** 3 + slope * (x - root);
        expect(Math.abs(findRoot(f, start, 1) - root)).toBeLessThanOrEqual(
          1e-12 * Math.max(1, Math.abs(root)),
        );
      }),
      { seed: 1, numRuns: 300 },
    );
  });
});

// Upper percentage points of F: Abramowitz & Stegun, Handbook of Mathematical Functions (1964), table 26.9.
import { describe, expect, it } from "vitest";
import { fisherTails, fisherTwoSided } from "../../src/numeric/fisher.js";

describe("tails of F", () => {
  it.each([
    [0.05, 5, 10, 3.33],
    [0.05, 1, 10, 4.96],
    [0.01, 5, 10, 5.64],
    [0.01, 10, 20, 3.37],
    [0.025, 4, 8, 5.05],
  ])("%d with %d and %d degrees", (tail, a, b, point) => {
    // The table has three digits: the tail at its ends holds the stated one.
    expect(fisherTails(point - 0.005, a, b).upper).toBeGreaterThan(tail);
    expect(fisherTails(point + 0.005, a, b).upper).toBeLessThan(tail);
  });

  it("is 1/F with the degrees exchanged, and exact at the ends", () => {
    expect(fisherTails(3.33, 5, 10).upper).toBeCloseTo(fisherTails(1 / 3.33, 10, 5).lower, 14);
    expect(fisherTails(0, 5, 10)).toEqual({ lower: 0, upper: 1 });
    expect(fisherTails(Infinity, 5, 10)).toEqual({ lower: 1, upper: 0 });
    expect(fisherTwoSided(1, 7, 7)).toBeCloseTo(1, 14);
    expect(() => fisherTails(1, 0, 3)).toThrow(RangeError);
    expect(() => fisherTails(1, 3, NaN)).toThrow(RangeError);
  });
});

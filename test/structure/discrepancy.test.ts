/** Point sets that are refused, and laws of L2 discrepancies. */
import { describe, expect, it } from "vitest";
import { discrepancies } from "../../src/structure/discrepancy.js";
import { pointSet } from "../../src/structure/points.js";
import { extremeDiscrepancy, starDiscrepancy } from "../../src/structure/star-discrepancy.js";

/** n points in the middle of equal intervals. */
function midpoints(n: number) {
  return pointSet(Array.from({ length: n }, (_, i) => [(i + 0.5) / n]));
}

describe("L2 discrepancies", () => {
  it("does not depend on the order of the points, over the edges of blocks and tiles", () => {
    const rows = Array.from({ length: 523 }, (_, i) => [(i * 0.618034) % 1, (i * 0.754878) % 1, i / 523]);
    const [forth, back] = [discrepancies(pointSet(rows)), discrepancies(pointSet(rows.slice().reverse()))];
    for (const [k, one] of forth.entries()) {
      expect(Math.abs(one.squared - (back[k]?.squared ?? NaN))).toBeLessThan(one.rounding);
      expect(one.rounding).toBeLessThan(one.squared / 1e8);
    }
  });

  it("centred in one dimension: 1/(12 n^2) at midpoints (K.-T. Fang and Y. Wang, Number-Theoretic Methods in Statistics, 1994)", () => {
    const [centred] = discrepancies(midpoints(700), ["centred"]);
    expect((centred?.squared ?? NaN) * 12 * 700 ** 2).toBeCloseTo(1, 8);
  });
});

describe("points and exact discrepancies that are refused", () => {
  it.each([
    [[], "points: expected at least one point of at least one coordinate"],
    [[[0.1, 0.2], [0.3]], "points[2]: expected 2 coordinates as in the first point, found 1"],
    [[[0.1], [NaN]], "points[2]: expected coordinates from 0 to 1, found NaN"],
    [[[1.5]], "points[1]: expected coordinates from 0 to 1, found 1.5"],
  ])("points %j", (points, message) => {
    expect(() => pointSet(points)).toThrow(new RangeError(message));
  });

  it("too many boxes", () => {
    const points = pointSet(Array.from({ length: 600 }, () => [0.5, 0.5, 0.5]));
    expect(() => starDiscrepancy(points)).toThrow(
      "points: the exact star discrepancy of 600 points in 3 dimensions needs 601^3 boxes, more than 2^25; take fewer points, one dimension, or an L2 discrepancy",
    );
  });

  it("extreme discrepancy in two dimensions", () => {
    expect(() => extremeDiscrepancy(pointSet([[0.5, 0.5]]))).toThrow(/one dimension, found 2/);
  });
});

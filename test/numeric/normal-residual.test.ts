// How far a double is from the true normal quantile. True values: mpmath 1.3, 60 digits, sqrt(2) erfinv(2u - 1).
import { describe, expect, it } from "vitest";
import { quantileError } from "../../src/numeric/normal-residual.js";

describe("error of a normal quantile", () => {
  it.each([
    [0.975, 1.9599639845400538, -2.821657963445305e-17, 1e-29],
    [0.25, -0.6744897501960817, 3.7755511355050287e-17, 1e-29],
    [1e-10, -6.361340902404057, -3.862393341514606e-16, 1e-21],
    [1 - 2 ** -53, 8.209536151601387, 5.325239936691457e-16, 1e-16],
  ])("at u = %d", (u, z, error, within) => {
    expect(Math.abs(quantileError(z, u) - error)).toBeLessThan(within);
  });

  it("is the distance of another number, to first order", () => {
    const far = quantileError(1.9599639845400538 + 2 ** -30, 0.975);
    expect(far * 2 ** 30).toBeCloseTo(1, 7);
  });
});

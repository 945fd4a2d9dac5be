// Formulas in 64 digits: values of mpmath 1.3 (60 digits), and agreement with the interpreter on everything that it has.
import { describe, expect, it } from "vitest";
import { highPrecision } from "../../src/formula/high-precision.js";
import { interpretFormula } from "../../src/formula/interpret.js";

const NONE = { inputs: [{ name: "x", length: 3, first: 0 }], constants: {} };

async function value(text: string, x: readonly number[] = [0.25, 0.5, 0.75]): Promise<number> {
  return -(await highPrecision(text, NONE)).excess(x, 0);
}

describe("in 64 digits", () => {
  it.each([
    ["normalCdf(5 * x[1])", 0.8943502263331448],
    ["erf(x[3])", 0.711155633653515],
    ["erfc(14 * x[1])", 7.430983723414127e-7],
    ["normalQuantile(x[1])", -0.6744897501960817],
    ["(1 + 1e-30 * x[1]) - 1", 0.25e-30],
  ])("%s", async (text, expected) => {
    expect((await value(text)) / expected).toBeCloseTo(1, 15);
  });

  it.each([
    "sum(x) + prod(x) + mean(x) + min(x) + max(x) + norm(x) + length(x)",
    "dot(x, cumsum(x)) + sum(cumprod(x)) + sum(diff(sort(x)))",
    "max(x[1] - 0.3, 0) + min(x[2], x[3])",
    "x[1] > 0.2 ? exp(x[2]) : log(x[3])",
    "x[1] < x[2] and x[3] > 0.1",
    "sum(x > 0.4) + mod(7 * x[3], 2) + floor(3 * x[3]) + round(-2.5) + fix(-1.7) + sign(-x[1])",
    "sin(x[1]) + cos(x[2]) * tan(x[3]) + atan2(x[1], x[2]) + sinh(x[1]) + log1p(x[1]) + expm1(x[2])",
    "sum(x .^ 2) + x[1]^1.5 + cbrt(x[2]) + sqrt(x[3]) + normalPdf(x[1]) + pi",
  ])("%s agrees with the interpreter", async (text) => {
    const plain = (await interpretFormula(text, NONE))([0.25, 0.5, 0.75])[0] ?? NaN;
    expect(await value(text)).toBeCloseTo(plain, 13);
  });

  it("names functions that it lacks", async () => {
    const none = await highPrecision("gamma(x[1]) + lgamma(x[2])", NONE);
    expect(none.missing).toEqual(["gamma", "lgamma"]);
    expect(none.excess([0.1, 0.2, 0.3], 1)).toBeNaN();
  });
});

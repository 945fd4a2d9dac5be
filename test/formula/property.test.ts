/**
 * Random formulas: the compiled function agrees with mathjs.
 *
 * Stated error. The interpreter is run at the point and at eight points whose coordinates are moved by about 1e-13
 * relative; the largest change of its value is a measure of the formula's conditioning there. The compiled value must
 * lie within 1e-9 relative or 1e-13 absolute (mathjs gives lgamma(1) as -4e-16), or within 50 times that change where it
 * is larger. Points at which the moved values
 * are not all finite, or change by more than 1e-5 relative (a jump of floor or of a condition, a pole), are skipped and
 * counted; at least half of the points must remain. Non-finite values must be non-finite on both sides.
 */
import fc from "fast-check";
import { expect, test } from "vitest";
import { compileFormula, interpretFormula } from "../../src/formula/index.js";
import { SCOPE, formulas } from "./random-formula.js";
import { runFormula } from "./run.js";

const DIMENSION = 11;
const POINTS = Array.from({ length: 6 }, (_, i) =>
  // Weyl's sequence with the square roots of small primes, on (-2, 3).
  Array.from(
    { length: DIMENSION },
    (_unused, j) => 5 * (((i + 1) * Math.sqrt([2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31][j] ?? 2)) % 1) - 2,
  ),
);
const MOVES = 8;

function moved(point: readonly number[], k: number): number[] {
  return point.map((value, j) => value * (1 + 1e-13 * Math.sin(1 + 3 * k + 7 * j)));
}

interface Outcome {
  readonly compared: boolean;
  readonly agrees: boolean;
}

function compare(
  found: number,
  evaluate: (point: readonly number[]) => number[],
  point: readonly number[],
): Outcome {
  const [value = NaN] = evaluate(point);
  const others = Array.from({ length: MOVES }, (_, k) => evaluate(moved(point, k))[0] ?? NaN);
  const all = [value, ...others];
  if (all.every((other) => !Number.isFinite(other)))
    return { compared: true, agrees: !Number.isFinite(found) };
  if (!all.every(Number.isFinite)) return { compared: false, agrees: true };
  const change = Math.max(...others.map((other) => Math.abs(other - value)));
  if (change > 1e-5 * Math.abs(value) || Math.abs(value) > 1e250) return { compared: false, agrees: true };
  return {
    compared: true,
    agrees: Math.abs(found - value) <= Math.max(1e-9 * Math.abs(value), 50 * change, 1e-13),
  };
}

test("compiled formulas agree with mathjs", async () => {
  let points = 0;
  let compared = 0;
  await fc.assert(
    fc.asyncProperty(formulas, async (text) => {
      const formula = await compileFormula(text, SCOPE);
      expect(WebAssembly.validate(formula.moduleBytes)).toBe(true);
      const interpret = await interpretFormula(text, SCOPE);
      const values = runFormula(formula, POINTS);
      POINTS.forEach((point, i) => {
        const outcome = compare(values[i]?.[0] ?? NaN, interpret, point);
        points += 1;
        compared += Number(outcome.compared);
        const [reference = NaN] = interpret(point);
        if (!outcome.agrees)
          throw new Error(`${text}\nat ${point.join()}: ${values[i]?.[0]} against ${reference}`);
      });
    }),
    { numRuns: 1000, seed: 20260401 },
  );
  expect(compared).toBeGreaterThan(points / 2);
});

test("the comparison notices a wrong constant, a wrong sign and a wrong element", async () => {
  const pairs = [
    ["sum(x .* w) + 1.000001", "sum(x .* w) + 1"],
    ["exp(-mean(x .^ 2))", "exp(mean(x .^ 2))"],
    ["sort(x)[2] + cumsum(z)[3]", "sort(x)[3] + cumsum(z)[3]"],
  ] as const;
  for (const [planted, right] of pairs) {
    const values = runFormula(await compileFormula(planted, SCOPE), POINTS);
    const interpret = await interpretFormula(right, SCOPE);
    const outcomes = POINTS.map((point, i) => compare(values[i]?.[0] ?? NaN, interpret, point));
    expect(outcomes.some(({ compared, agrees }) => compared && !agrees)).toBe(true);
  }
});

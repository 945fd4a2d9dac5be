/**
 * The 124 formulas of data/integrals.json, whose provenance stands in the file, at two fixed points each: the compiled
 * function, and the interpreter, against values computed with NumPy and SciPy.
 */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { compileFormula, interpretFormula } from "../../src/formula/index.js";
import { runFormula, vectorScope } from "../formula/run.js";

interface FixedPoint {
  point: number[];
  value: number;
}

interface Integral {
  id: string;
  dim: number;
  domain: string;
  expr: string;
  at_point: FixedPoint;
  at_point_2: FixedPoint;
}

const file = new URL("data/integrals.json", import.meta.url);
const { integrals } = JSON.parse(readFileSync(file, "utf8")) as { integrals: Integral[] };

/** Relative; a value of 0 (conditions, payoffs out of the money) must be met exactly. */
const TOLERANCE = 1e-12;

test("the file holds 124 integrals", () => {
  expect(integrals).toHaveLength(124);
});

describe.each(integrals)("$id", ({ dim, domain, expr, at_point, at_point_2 }) => {
  const scope = vectorScope(domain.slice(0, domain.indexOf(":")), dim);

  test("compiled function at both points", async () => {
    const formula = await compileFormula(expr, scope);
    expect(WebAssembly.validate(formula.moduleBytes)).toBe(true);
    const values = runFormula(formula, [at_point.point, at_point_2.point]).flat();
    [at_point, at_point_2].forEach(({ value }, i) => {
      expect(Math.abs((values[i] ?? NaN) - value)).toBeLessThanOrEqual(TOLERANCE * Math.abs(value));
    });
  });

  test("interpreter at both points", async () => {
    const interpret = await interpretFormula(expr, scope);
    for (const { point, value } of [at_point, at_point_2]) {
      const [found = NaN] = interpret(point);
      expect(Math.abs(found - value)).toBeLessThanOrEqual(TOLERANCE * Math.abs(value));
    }
  });
});

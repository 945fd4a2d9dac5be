/**
 * Integrals over a box, a simplex, a ball, a sphere and all of space. The values are quadratures in mpmath 1.3 (30 digits), not the
 * closed forms of the files: Dirichlet's integral from its gamma functions there, the ball by its radial integral, the others from
 * the formula of the basis. The estimates hold the maps and their Jacobians.
 */
import { expect, test } from "vitest";
import { loadPaths } from "../../src/problem/load.js";
import { runSpec, specOf } from "../study/fixtures.js";

const VALUES: Readonly<Record<string, number>> = {
  "all-of-space": 4.33661820433096,
  ball: 2.38097971875233,
  box: 17.3333333333333,
  simplex: 0.000126293459626793,
  sphere: 2.25590957739185,
};

test("integrals over other domains: their values, and estimates within five standard errors", async () => {
  const { problems } = await loadPaths(["domains"]);
  const all = problems.map(({ problem }) => problem);
  expect(all.map(({ id }) => id).sort()).toEqual(Object.keys(VALUES));
  const sources = ["pcg64", "sobol+owen"];
  const record = await runSpec(specOf(all, { sizes: [4096], replicates: 32, sources, seed: 7 }));
  for (const cell of record.cells) {
    const exact = VALUES[cell.problem] ?? NaN;
    const { value = NaN } = all.find(({ id }) => id === cell.problem)?.reference ?? {};
    expect(value / exact).toBeCloseTo(1, 13);
    // t with 31 degrees of freedom beyond 5: 2e-5 both ways, 2e-4 over ten
    expect(Math.abs((cell.mean ?? NaN) - exact), cell.problem).toBeLessThan(
      5 * (cell.biasStandardError ?? NaN),
    );
    expect(cell.biasStandardError).toBeLessThan(0.02 * exact);
  }
});

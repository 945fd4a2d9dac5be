/**
 * The mean of every shipped integrand over 2^16 points of philox4x32 against its reference, one fixed key each. A
 * difference above 4.9 standard errors has probability 1e-6 for a normal mean; over some 50 problems a false alarm of
 * the whole test is below 1e-4. (The peaks of `planes` and the rare events have means of slightly skewed distribution,
 * for which the level is nominal.)
 */
import { expect, test } from "vitest";
import { compileProblem } from "../../src/problem/compile.js";
import { loadPaths } from "../../src/problem/load.js";
import { Engine } from "../problem/engine.js";

test("integrands have the means that their references say", async () => {
  const { problems } = await loadPaths(["classic", "inputs", "planes", "tidal"]);
  for (const { problem } of problems) {
    if (problem.reference === null) continue;
    const { mean, standardError } = new Engine(await compileProblem(problem)).mean(
      "philox4x32",
      2 ** 16,
      problem.id,
    );
    const standardised = (mean - problem.reference.value) / standardError;
    expect(Math.abs(standardised), problem.id).toBeLessThan(4.9);
  }
});

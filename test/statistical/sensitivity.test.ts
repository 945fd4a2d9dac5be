/**
 * Intervals of shares hold what they say: 95 % intervals for a product of three factors, over 100 fixed seeds. Each of 7
 * counts is Binomial(100, 0.95) if they do; fewer than 86 have probability 2e-4 each, so a false alarm 1.5e-3 in all.
 */
import { expect, it } from "vitest";
import type { Share } from "../../src/record/sensitivity.js";
import { prepareProblems } from "../../src/study/runnable.js";
import { measureSensitivity } from "../../src/study/sensitivity.js";
import { problem } from "../study/fixtures.js";

it("covers first-order and total indices and the mean dimension", async () => {
  const described = problem("product", "(x[1] + 0.5) * (2 * x[2]) * (0.8 + 0.4 * x[3])");
  const [runnable] = await prepareProblems([described]);
  if (runnable === undefined) throw new Error("nothing to run");
  // factors of mean 1; variances w^2 / 12
  const parts = [1 / 12, 4 / 12, 0.16 / 12];
  const product = parts.reduce((all, one) => all * (1 + one), 1);
  const totals = parts.map((one) => (one * product) / (1 + one) / (product - 1));
  const exact = [...parts.map((one) => one / (product - 1)), ...totals, totals.reduce((a, b) => a + b, 0)];
  const hits = exact.map(() => 0);
  for (let seed = 1; seed <= 100; seed++) {
    const { measures } = measureSensitivity(runnable, described, {
      seed,
      points: 2 ** 10,
      coordinates: 2 ** 28,
      confidence: 0.95,
    });
    if (measures === null) throw new Error("no measures");
    const shares: Share[] = [
      ...measures.units.map(({ alone }) => alone),
      ...measures.units.map(({ total }) => total),
      measures.meanDimension,
    ];
    for (const [k, { interval }] of shares.entries()) {
      const value = exact[k] ?? NaN;
      if (interval[0] <= value && value <= interval[1]) hits[k] = (hits[k] ?? 0) + 1;
    }
  }
  for (const count of hits) expect(count).toBeGreaterThanOrEqual(86);
});

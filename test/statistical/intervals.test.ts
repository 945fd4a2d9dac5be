/**
 * Coverage of the stated 95 % intervals and the error rates of verdicts, on simulated curves with known truth. Seeds are
 * fixed; a check fails only where the count contradicts the stated share at 99.9 % (Clopper & Pearson 1934).
 * TOLERAND_TRIALS sets the number of curves (docs/calibration.md holds the shares for 2,000).
 */
import { describe, expect, it } from "vitest";
import { clopperPearson } from "../../src/numeric/binomial.js";
import { coverageOf, spreadCoverage, verdictsAt, type Coverage } from "./coverage.js";

const TRIALS = Number(process.env["TOLERAND_TRIALS"] ?? 400);

function report(what: string, counts: object): void {
  if (process.env["TOLERAND_TRIALS"] !== undefined) console.log(what, JSON.stringify(counts));
}

function expectShare(share: number, low: number, high = 1): void {
  const [least, most] = clopperPearson(Math.round(share * TRIALS), TRIALS, 0.999);
  expect(most, `share ${share}, stated at least ${low}`).toBeGreaterThanOrEqual(low);
  expect(least, `share ${share}, stated at most ${high}`).toBeLessThanOrEqual(high);
}

describe("95 % intervals hold the truth", () => {
  const cases = (["nested", "steep"] as const).flatMap((kind) =>
    (["normal", "skewed", "heavy"] as const).flatMap((shape) =>
      [16, 32, 128].map((replicates) => ({ kind, shape, replicates })),
    ),
  );

  it.each(cases)("$kind errors, $shape, $replicates replicates", ({ kind, shape, replicates }) => {
    const found: Coverage = coverageOf(kind, shape, replicates, TRIALS);
    report(`${kind} ${shape} ${replicates}`, found);
    // Normal errors: 92 to 97 % for all but the n to tolerance between two steep sizes, 88 %. Others: the shares below.
    const normal = shape === "normal";
    expectShare(found.order, normal ? 0.92 : 0.9, 0.97);
    expectShare(found.rmse, normal ? 0.92 : shape === "heavy" ? 0.88 : 0.73, 0.97);
    expectShare(found.deviation, normal ? 0.92 : 0.82, 0.97);
    expectShare(found.reach, normal ? 0.87 : 0.78, 0.97);
  });
});

describe("the bootstrap interval of the spread against crude Monte Carlo", () => {
  it.each([
    [16, 0.8],
    [32, 0.86],
    [128, 0.91],
  ])("%d replicates", (replicates, least) => {
    const share = spreadCoverage(replicates, TRIALS);
    report(`spread ${replicates}`, { share });
    expectShare(share, least, 0.97);
  });
});

describe("verdicts on a sound source with normal errors", () => {
  it.each([16, 32, 128])("%d replicates, at the edge of the tolerance", (replicates) => {
    const edge = verdictsAt(1, replicates, TRIALS);
    report(`edge ${replicates}`, edge);
    // Both errors at the worst place there is: `within` below 1 %, `outside` below 8 %.
    expectShare((edge["within"] ?? 0) / TRIALS, 0, 0.01);
    expectShare((edge["outside"] ?? 0) / TRIALS, 0, 0.08);
  });

  it.each([16, 32, 128])("%d replicates, well inside and well outside", (replicates) => {
    const inside = verdictsAt(3, replicates, TRIALS);
    const outside = verdictsAt(0.5, replicates, TRIALS);
    report(`inside and outside ${replicates}`, { inside, outside });
    expectShare((inside["within"] ?? 0) / TRIALS, 0.96);
    expectShare((outside["outside"] ?? 0) / TRIALS, 0.93);
    expect(inside["outside"]).toBe(0);
    expect(outside["within"]).toBe(0);
  });
});

/** The answer in one sentence: what it names, what it leaves out, on a made-up record. */
import { describe, expect, it } from "vitest";
import { answerOf, byEffort } from "../../src/findings/answer.js";
import type { StudyRecord } from "../../src/record/types.js";
import { sampleRecord } from "../report/sample-record.js";

const record = sampleRecord();

function answer(at: number, of: StudyRecord = record): string {
  const problem = of.problems[at];
  if (problem === undefined) throw new Error(`no problem ${at}`);
  return answerOf(problem, "value", of);
}

describe("answerOf", () => {
  it("names the least effort, the least of another family, and every confirmed bias with its size", () => {
    expect(answer(0)).toMatch(
      /^sobol\+owen stays inside ±0\.01 at 99 % with ≈ 120 points \(13 µs\); \S+ needs ≈ [\d,]+ points \(\S+ \S+\); randu is off by −0\.050\S* whatever n \(its points lie on the planes of 9\u00a0u₁ − 6\u00a0u₂ \+ u₃: 15 planes, gap 0\.092\); house is off by \+0\.020\S* whatever n/,
    );
  });

  it("counts undecided verdicts among those that were judged", () => {
    const judged = record.budgets.filter((b) => b.problem === "ridge" && !b.inUse && b.verdict !== "none");
    const undecided = judged.filter((b) => b.verdict === "undecided");
    expect(undecided.length).toBeGreaterThan(0);
    expect(answer(0)).toContain(`${undecided.length} of ${judged.length} verdicts undecided`);
  });

  it("does not advise a source of known structure, however cheap", () => {
    const cheap = record.convergence.map((one) =>
      one.source === "randu" && one.problem === "guarantee" ? { ...one, cost: 1e-9 } : one,
    );
    expect(answer(1, { ...record, convergence: cheap })).not.toContain("randu");
  });

  it("says when nothing reaches the tolerance, or none is known", () => {
    const none = record.convergence.map((one) => ({ ...one, reach: null, cost: null }));
    expect(answer(1, { ...record, convergence: none })).toMatch(
      /^No source is known to stay inside ±0\.01 at 99 %/,
    );
    const unknown = record.problems.map((problem) => ({
      ...problem,
      reference: null,
      tolerance: { absolute: null, relative: 0.01, to: "reference", confidence: 0.99 },
    }));
    expect(answer(1, { ...record, problems: unknown })).toMatch(/^The tolerance is not known/);
  });

  it("says that an n is extrapolated", () => {
    const far = record.convergence.map((one) =>
      one.reach === null ? one : { ...one, reach: { ...one.reach, extrapolated: true } },
    );
    expect(answer(1, { ...record, convergence: far })).toContain("(13 µs, extrapolated)");
  });
});

describe("byEffort", () => {
  it("orders by cost, then by n, unknown costs last, and leaves out what never reaches", () => {
    const [first] = record.convergence;
    if (first === undefined) throw new Error("no convergence");
    const one = (source: string, cost: number | null, n: number, never = false) => ({
      ...first,
      source,
      cost,
      never,
      reach: { n, interval: null, extrapolated: false },
    });
    const all = [
      one("a", null, 5),
      one("b", 2, 9),
      one("c", 1, 99),
      one("d", 0.1, 1, true),
      one("e", null, 3),
    ];
    expect(byEffort(all).map((x) => x.source)).toEqual(["c", "b", "e", "a"]);
  });
});

// The spec of a study: precedence, and what is refused or left out, word for word.
import { describe, expect, it } from "vitest";
import { estimatorIds } from "../../src/estimators/registry.js";
import { ESTIMATORS } from "../../src/problem/defaults.js";
import { buildSpec } from "../../src/study/settings.js";
import { problem } from "./fixtures.js";

const entry = (id: string, study = {}) => ({ problem: problem(id, "mean(x)", { study }), suite: null });

describe("the spec", () => {
  it("takes flags before problems before suites before defaults", () => {
    const suite = { study: { replicates: 16, sizes: [128] } };
    const own = { problem: problem("a", "mean(x)", { study: { replicates: 24 } }), suite };
    const { spec } = buildSpec([own], { seed: 5 });
    expect(spec.replicates).toEqual({ a: 24 });
    expect(spec.sizes).toEqual({ a: [128] });
    expect(spec.seed).toBe(5);
    expect(spec.falseAlarms).toBe(0.01);
  });

  it("refuses problems that disagree on what the study shares", () => {
    expect(() => buildSpec([entry("a", { seed: 1 }), entry("b", { seed: 2 })], {})).toThrow(
      "seed: the problems of one study share it, found 1 (a) and 2 (b); settle it with --seed",
    );
    expect(buildSpec([entry("a", { seed: 1 }), entry("b", { seed: 2 })], { seed: 3 }).spec.seed).toBe(3);
  });

  it("refuses an unknown estimator and proposes the nearest", () => {
    expect(() => buildSpec([entry("a")], { estimators: ["crud"] })).toThrow(
      'estimators: expected one of crude, found "crud"; did you mean "crude"?',
    );
  });

  it("adds what is in use to the sources, once", () => {
    const inUse = { source: "minstd-16807", points: 5000, secondsPerPoint: null };
    const { spec } = buildSpec([{ problem: problem("a", "mean(x)", { inUse }), suite: null }], {
      sources: ["pcg64"],
    });
    expect(spec.sources).toEqual({ a: ["pcg64", "minstd-16807"] });
  });

  it("refuses two sources of one name", () => {
    const house = (multiplier: number) => ({
      name: "house",
      congruential: { modulus: "2^31", multiplier, increment: 0 },
    });
    expect(() => buildSpec([entry("a")], { sources: [house(65539), house(69069)] })).toThrow(
      'sources: two different sources are called "house"; give one of them another name',
    );
  });

  it("knows the estimators that problem files may name", () => {
    // The problem room may not import the estimators; its list must be theirs.
    expect(ESTIMATORS).toEqual(estimatorIds);
  });
});

import { describe, expect, test } from "vitest";
import { editDistance, nearest } from "../../src/numeric/nearest.js";

describe("edit distance", () => {
  test("counts insertions, deletions, substitutions and swaps of neighbours", () => {
    expect(editDistance("tide", "tide")).toBe(0);
    expect(editDistance("tide", "tides")).toBe(1);
    expect(editDistance("tide", "tie")).toBe(1);
    expect(editDistance("tide", "tile")).toBe(1);
    expect(editDistance("tide", "tdie")).toBe(1);
    expect(editDistance("", "tide")).toBe(4);
  });

  test("'kitten' and 'sitting' differ by three edits (the usual textbook pair; common practice, no single source)", () => {
    expect(editDistance("kitten", "sitting")).toBe(3);
  });

  test("a very long word costs no more than a short one", () => {
    expect(editDistance("x".repeat(1e6), "tide")).toBe(64);
  });
});

describe("nearest word", () => {
  const known = ["mt19937", "minstd-16807", "minstd-48271", "randu", "sobol"];

  test("proposes the word with the fewest edits, whatever the case", () => {
    expect(nearest("mt19973", known)).toBe("mt19937");
    expect(nearest("SOBOL", known)).toBe("sobol");
    expect(nearest("minstd", ["minstd-16807", "midst"])).toBe("midst");
  });

  test("proposes nothing where everything is far off", () => {
    expect(nearest("latin-hypercube", known)).toBeNull();
    expect(nearest("anything", [])).toBeNull();
  });
});

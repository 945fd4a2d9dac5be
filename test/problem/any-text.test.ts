/** Whatever a problem file holds, the outcome is a problem or a ProblemError with places: never another exception. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { ProblemError } from "../../src/problem/errors.js";
import { fileWith, problemIn } from "./text.js";

async function outcome(text: string): Promise<void> {
  try {
    const problem = await problemIn(text);
    expect(problem.dimension).toBeGreaterThan(0);
    expect(problem.tolerance.absolute === null || problem.tolerance.absolute > 0).toBe(true);
  } catch (error) {
    if (!(error instanceof ProblemError)) throw error;
    const lines = text.split("\n");
    expect(error.issues.length).toBeGreaterThan(0);
    for (const { line, column, message } of error.issues) {
      expect(line).toBeGreaterThanOrEqual(1);
      expect(line).toBeLessThanOrEqual(lines.length);
      expect(column).toBeGreaterThanOrEqual(1);
      expect(column).toBeLessThanOrEqual((lines[(line ?? 1) - 1]?.length ?? 0) + 1);
      expect(message).not.toMatch(/\[object|undefined/);
    }
  }
}

const GOOD = fileWith({
  title: "A title",
  constants: "{ a: 2, v: [1, 2], m: [[1, 2], [3, 4]] }",
  reference: "{ value: 0.5, uncertainty: 0, basis: symmetry }",
  declared: "[{ line: step, bias: 0.1, basis: guess }]",
  inUse: "{ source: mt19937, points: 100 }",
  study: "{ sources: [pcg64], sizes: 2^4..2^6, replicates: 4, seed: 1 }",
});

test("texts with a piece cut out, doubled or replaced", async () => {
  const piece = fc.tuple(
    fc.nat(GOOD.length),
    fc.nat(30),
    fc.constantFrom("", ":", "- ", "{", "]", "\n", "\t", "-1", "[[", "x: 1", "0", "'", "#", "é"),
  );
  await fc.assert(
    fc.asyncProperty(piece, fc.boolean(), async ([at, length, put], double) => {
      const middle = double ? GOOD.slice(at, at + length) + put + GOOD.slice(at, at + length) : put;
      await outcome(GOOD.slice(0, at) + middle + GOOD.slice(at + length));
    }),
    { numRuns: 500, seed: 1 },
  );
});

test("any data in the place of any part", async () => {
  const paths = [
    "title",
    "inputs",
    "constants",
    "integrand",
    "reference",
    "tolerance",
    "declared",
    "inUse",
    "study",
  ];
  const value = fc.jsonValue({ maxDepth: 3 }).map((data) => JSON.stringify(data));
  await fc.assert(
    fc.asyncProperty(fc.constantFrom(...paths), value, (key, data) => outcome(fileWith({ [key]: data }))),
    { numRuns: 500, seed: 2 },
  );
});

test("any text at all", async () => {
  await fc.assert(
    fc.asyncProperty(fc.string({ unit: "binary", maxLength: 60 }), (text) => outcome(text)),
    { numRuns: 500, seed: 3 },
  );
});

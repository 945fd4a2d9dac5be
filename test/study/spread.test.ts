// A source without any bias over all its seeds whose replicates spread as far fewer points would, from the run to the words.
import { beforeAll, describe, expect, it } from "vitest";
import { headlinesOf } from "../../src/findings/headline.js";
import { parseRecord } from "../../src/record/schema.js";
import type { StudyRecord } from "../../src/record/types.js";
import { problem, runSpec, specOf } from "./fixtures.js";

/**
 * x <- 5002 x mod 1355777 (prime, 5002 a primitive root), of which every 4096th output is taken: (1355777 - 1)/331, so that one run
 * has 331 different points, repeated. Over all seeds each coordinate takes every state once: no bias. 1,024 points are
 * worth 331, and the estimates spread 1024/331 = 3.1 times as independent ones would.
 */
const SHORT = {
  name: "short",
  congruential: { modulus: 1355777, multiplier: 5002 },
  tuples: "strided 4096",
};

const one = problem("one", "exp(x[1])", {
  dimension: 1,
  reference: { value: Math.E - 1, text: "e - 1", uncertainty: 0, basis: "elementary" },
});

describe("spread", () => {
  let record: StudyRecord;
  beforeAll(async () => {
    const settings = { sizes: [256, 1024], replicates: 32, sources: [SHORT, "philox4x32", "sobol+owen"] };
    record = await runSpec(specOf([one], settings));
  });

  it("is tested for pseudo-random sources in one family with the biases", () => {
    expect(record.spreadTests.map((test) => [test.source, test.n])).toEqual([
      ["short", 1024],
      ["philox4x32", 1024],
    ]);
    expect(record.family.tests).toBe(5);
  });

  it("of repeated points is confirmed, without a bias", () => {
    const [short, philox] = record.spreadTests;
    expect(record.tests.map((test) => test.confirmed)).toEqual([false, false, false]);
    expect(short?.confirmed).toBe(true);
    expect(short?.confirmation?.replicates).toBe(256);
    const [low, high] = short?.confirmation?.interval ?? [0, 0];
    expect(low).toBeLessThan(1024 / 331);
    expect(high).toBeGreaterThan(1024 / 331);
    expect(philox?.confirmed).toBe(false);
  });

  it("is said, and such a source is no advice", () => {
    const words = headlinesOf(record)[0]?.sentences.join(" ") ?? "";
    expect(words).toMatch(
      /short spreads [23]\.\d+ times what independent points would \(95 % interval [^)]*\), confirmed on 256 fresh replicates: its points are not independent\./,
    );
    expect(words).toContain("The least effort for it: sobol+owen");
  });

  it("stands in the record file", () => {
    const again = parseRecord(JSON.parse(JSON.stringify(record)));
    expect(again.spreadTests[0]?.confirmation?.ratio).toBe(record.spreadTests[0]?.confirmation?.ratio);
  });
});

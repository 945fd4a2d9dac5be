// Sources of the user's own in a study: what is refused before it runs, and what its record says.
import { describe, expect, it } from "vitest";
import { problem, runSpec, specOf } from "./fixtures.js";

const two = problem("two", "mean(x)", { dimension: 2 });
const quick = { sizes: [64, 256], replicates: 8 };

describe("published seeds and given states in a study", () => {
  it("a given state is one deterministic row among the replicates of its generator", async () => {
    const state = { name: "production", source: "mt19937", state: 5489 };
    const record = await runSpec(specOf([two], { ...quick, sources: ["mt19937", state] }));
    const row = record.cells.filter((cell) => cell.source === "production");
    expect(row.map(({ n, replicates, rmse }) => [n, replicates, rmse])).toEqual([
      [64, 1, null],
      [256, 1, null],
    ]);
    expect(record.sources.find(({ id }) => id === "production")?.deterministic).toBe(true);
    expect(record.warnings).toContain("production: deterministic source: no error bar");
  });

  it("published seeds give the estimates of the seeds, in any cutting into tasks", async () => {
    const published = { name: "house", source: "mt19937", seeding: "published" };
    const record = await runSpec(specOf([two], { ...quick, sources: [published] }));
    const single = await Promise.all(
      [1, 8].map((state) =>
        runSpec(specOf([two], { ...quick, sources: [{ name: "one", source: "mt19937", state }] })),
      ),
    );
    const estimates = record.cells.at(-1)?.estimates ?? [];
    expect([estimates[0], estimates[7]]).toEqual(single.map((one) => one.cells.at(-1)?.estimates[0]));
  });

  it("more replicates than seeds are refused before the run", () => {
    const house = {
      name: "house",
      congruential: { modulus: 1021, multiplier: 65 },
      seeding: { published: { stride: 200 } },
    };
    expect(() => specOf([two], { ...quick, sources: [house] })).toThrow(
      new RangeError(
        'replicates: source "house" has 6 of 256 points in 2 coordinates (it has no more valid seeds), but 8 are asked for by "two"; take fewer replicates or points (--replicates, --sizes)',
      ),
    );
  });

  it("replicates that repeat each other are said", async () => {
    // the lowest bit of a power-of-two modulus alternates: 0, 1, 0, 1, ... or 1, 0, 1, 0, ...
    const low = {
      name: "low",
      congruential: { modulus: "2^31", multiplier: 5, increment: 1 },
      bits: "low 1",
    };
    const record = await runSpec(specOf([two], { ...quick, sources: [low] }));
    expect(record.warnings.filter((text) => text.includes("same points"))).toEqual([
      expect.stringMatching(
        /^two, low: replicate \d has the same points as replicate \d; 6 of 8 replicates repeat another, and error bars are too small$/,
      ),
    ]);
  });

  it("coordinates at the ends are counted", async () => {
    const left = {
      name: "left",
      congruential: { modulus: 16, multiplier: 5, increment: 3 },
      endpoint: "left",
      state: 0,
    };
    const record = await runSpec(specOf([two], { ...quick, sources: [left] }));
    // 512 coordinates pass 32 times through the full period of 16
    expect(record.warnings).toContain("two, left: 32 coordinates were exactly 0 or 1");
  });
});

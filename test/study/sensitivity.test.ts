/** Which inputs matter: what is refused, repeated and told. */
import { describe, expect, it } from "vitest";
import { looksOf } from "../../src/findings/sensitivity.js";
import { sensitivityHeadline, sensitivityLines } from "../../src/findings/sensitivity-words.js";
import { PickFreeze } from "../../src/study/pick-freeze.js";
import { prepareProblems, type RunnableProblem } from "../../src/study/runnable.js";
import { measureSensitivity, type SensitivityRequest } from "../../src/study/sensitivity.js";
import type { Sensitivity } from "../../src/record/sensitivity.js";
import { jsonText } from "../../src/record/json.js";
import { parseRecord } from "../../src/record/schema.js";
import type { TaskResult } from "../../src/study/tasks.js";
import { problem, runSpec, specOf } from "./fixtures.js";

const REQUEST: SensitivityRequest = { seed: 1, points: 2 ** 14, coordinates: 2 ** 28 };

async function runnableOf(described: ReturnType<typeof problem>): Promise<RunnableProblem> {
  const [runnable] = await prepareProblems([described]);
  if (runnable === undefined) throw new Error("nothing to run");
  return runnable;
}

async function measured(
  integrand: string,
  change: Parameters<typeof problem>[2] = {},
  request = REQUEST,
): Promise<Sensitivity> {
  const described = problem("one", integrand, change);
  return measureSensitivity(await runnableOf(described), described, request);
}

describe("sensitivity", () => {
  it("is a function of the seed", async () => {
    const [one, again, other] = [
      await measured("x[1] * x[2] + x[3]"),
      await measured("x[1] * x[2] + x[3]"),
      await measured("x[1] * x[2] + x[3]", {}, { ...REQUEST, seed: 2 }),
    ];
    expect(again).toEqual(one);
    expect(other).not.toEqual(one);
  });

  it("says why there is nothing to tell", async () => {
    expect((await measured("0 * x[1] + 2")).reason).toBe("the integrand does not vary");
    const broken = await measured("sqrt(x[1] - 0.5)");
    expect(broken.measures).toBeNull();
    expect(broken.reason).toMatch(/^the integrand is not finite at \d+ of \d+ points$/);
    const dear = await measured("sum(x)", {}, { ...REQUEST, coordinates: 1000 });
    expect(dear.reason).toContain("would cost more than a small part of this study");
    expect(sensitivityHeadline(dear)).toBe(dear.reason);
  });

  it("takes fewer points where coordinates are dear", async () => {
    const few = await measured("sum(x)", {}, { ...REQUEST, coordinates: 2 ** 18 });
    expect(few.measures?.points).toBeLessThan(2 ** 10);
    expect(few.measures?.points).toBeGreaterThanOrEqual(64);
  });

  it("says where rare events carry the variance", async () => {
    const rare = problem("rare", "min(x) > 0.9 ? 1 : 0");
    const found = measureSensitivity(await runnableOf(rare), rare, { ...REQUEST, points: 2 ** 12 });
    const told = sensitivityLines(found, rare).some((line) => line.includes("few points meet what makes it"));
    expect(told).toBe(true);
    const usual = problem("usual", "sum(x)");
    const lines = sensitivityLines(measureSensitivity(await runnableOf(usual), usual, REQUEST), usual);
    expect(lines.some((line) => line.includes("few points meet"))).toBe(false);
  });

  it("works with one coordinate", async () => {
    const one = await measured("x[1]^2", { dimension: 1 });
    expect(one.measures?.pairs).toEqual([]);
    expect(one.measures?.allPairs).toBeNull();
    expect(one.measures?.truncation).toEqual({ atLeast: 1, atMost: 1 });
    expect(sensitivityHeadline(one)).toBe("x[1] is the only input");
  });

  it("refuses ranges", async () => {
    const described = problem("one", "x[1]");
    const runnable = await runnableOf(described);
    expect(() => measureSensitivity(runnable, described, { ...REQUEST, confidence: NaN })).toThrow(
      "confidence: expected a number between 0 and 1, found NaN",
    );
    expect(() => new PickFreeze(runnable, { seed: 1, points: 100, replicates: 2 })).toThrow(
      "points: expected a power of two from 2 on, found 100",
    );
    expect(() => new PickFreeze(runnable, { seed: 1, points: 64, replicates: 1 })).toThrow(
      "replicates: expected a whole number of at least 2, found 1",
    );
  });
});

describe("smoothness", () => {
  // in four dimensions orders of smooth and of kinked integrands lie well apart
  const looks = async (integrand: string, dimension = 4): Promise<string> => {
    const { measures } = await measured(integrand, { dimension }, { ...REQUEST, points: 2 ** 15 });
    if (!measures?.smoothness) throw new Error("no order");
    return looksOf(measures.smoothness);
  };

  it("sees a jump and a kink, and neither in a smooth integrand", async () => {
    expect(await looks("x[1] + x[2] > 0.9 ? 1 : 0", 2)).toBe("jumping");
    expect(await looks("cos(sum(x))")).toBe("smooth");
    expect(["kinked", "rough"]).toContain(await looks("max(sum(x) - 1.9, 0)"));
  });

  it("is told as evidence", async () => {
    const described = problem("one", "x[1] + x[2] > 0.9 ? 1 : 0", { dimension: 2 });
    const found = measureSensitivity(await runnableOf(described), described, REQUEST);
    const lines = sensitivityLines(found, described);
    expect(lines.some((line) => line.includes("evidence of one, no proof"))).toBe(true);
  });
});

describe("in a study", () => {
  const settings = { sources: ["philox4x32", "pcg64"], sizes: [2 ** 14], replicates: 32 };

  it("is in the record, the same when a run is taken up again, and passes through JSON", async () => {
    const spec = specOf([problem("shares", "x[1] + 2 * x[2] * x[3]")], settings);
    const journal = new Map<string, TaskResult>();
    const record = await runSpec(spec, { journal });
    const [found] = record.sensitivity;
    expect(found?.problem).toBe("shares");
    // 1/12 alone of 1/12 + 4 (1/9 - 1/16)
    expect(found?.measures?.units[0]?.total.value).toBeCloseTo(1 / 12 / (1 / 12 + 4 * (1 / 9 - 1 / 16)), 1);
    const again = await runSpec(spec, { journal });
    expect(again.sensitivity).toEqual(record.sensitivity);
    expect(parseRecord(JSON.parse(jsonText(record))).sensitivity).toEqual(record.sensitivity);
  });

  it("has t of each pair for the nets among the sources", async () => {
    // points of pairs: the first two coordinates of Sobol's sequence are a (0, m, 2)-net (Sobol' 1967), as are those of
    // Faure's in any pair (Faure 1982)
    const described = problem("pairs", "x[1] * x[2] * x[3]");
    const sources = ["sobol", "philox4x32", "sobol+owen", "faure"];
    const [found] = (await runSpec(specOf([described], { ...settings, sources }))).sensitivity;
    expect(found?.nets.map(({ source, base }) => [source, base])).toEqual([
      ["sobol", 2],
      ["sobol+owen", 2],
      ["faure", 3],
    ]);
    const [plain, scrambled, faure] = found?.nets ?? [];
    expect(scrambled?.t).toEqual(plain?.t);
    const first = found?.measures?.pairs.findIndex(({ i, j }) => i === 0 && j === 1) ?? -1;
    expect(plain?.t[first]).toBe(0);
    expect(faure?.t).toEqual([0, 0, 0]);
  });

  it("is left out of a small study, with the reason", async () => {
    const spec = specOf([problem("small", "x[1] + x[2] * x[3]")], {
      ...settings,
      sizes: [64],
      replicates: 4,
    });
    const record = await runSpec(spec);
    expect(record.sensitivity).toEqual([
      {
        problem: "small",
        output: "mean",
        confidence: 0.95,
        measures: null,
        nets: [],
        reason: "which inputs matter was not asked: it would cost more than a small part of this study",
      },
    ]);
  });

  it("has no figures where the variance is not finite", async () => {
    // P(f > y) = y^-(4/3): a mean, no variance
    const heavy = problem("heavy", "x[1]^(-0.75) + x[2]", { dimension: 2 });
    const [found] = (await runSpec(specOf([heavy], settings))).sensitivity;
    expect(found?.measures).toBeNull();
    expect(found?.reason).toContain("no finite variance");
  });
});

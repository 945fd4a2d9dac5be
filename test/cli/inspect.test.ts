// `tolerand inspect` as a user meets it. RANDU: G. Marsaglia, PNAS 61 (1968) 25-28; 15 planes, 9 x - 6 y + z.
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { run } from "../../src/cli/commands/inspect.js";
import { fakeIo } from "./io.js";

async function inspect(sources: string | readonly string[], flags: Readonly<Record<string, unknown>> = {}) {
  const io = fakeIo();
  try {
    await run({ sources: typeof sources === "string" ? [sources] : sources, ...flags }, io);
  } catch (error) {
    return { out: io.out(), err: (error as Error).message };
  }
  return { out: io.out(), err: io.err() };
}

interface Entry {
  readonly dimension: number;
  readonly squaredLength: string;
  readonly vector: readonly string[];
  readonly l1Vector: readonly string[];
  readonly hyperplanes: string;
  readonly marsagliaBound: string;
  readonly figure: number;
}

interface Inspected {
  readonly source: string;
  readonly period: string | null;
  readonly periodReasons: readonly { readonly condition: string; readonly holds: boolean }[];
  readonly periodFromState: { readonly period: string } | null;
  readonly lowBitPeriods: readonly string[] | null;
  readonly periodUse: { readonly share: number; readonly overlapProbability: number | null } | null;
  readonly dual?: readonly Entry[];
  readonly dualKnuth?: readonly Entry[];
  readonly dualOrbit?: readonly Entry[];
  readonly dualSeedAveraged?: readonly Entry[];
  readonly dualIndices?: Entry & { readonly indices: readonly number[] };
  readonly notComputed: readonly string[];
}

async function json(sources: string | readonly string[], flags: Readonly<Record<string, unknown>> = {}) {
  const { out, err } = await inspect(sources, { ...flags, json: true });
  expect(err).toBe("");
  return JSON.parse(out) as readonly Inspected[];
}

describe("JSON", () => {
  it("gives RANDU's period, low bits and planes, in whole numbers", async () => {
    const [randu] = await json("randu", { dimension: "2..4", state: "1" });
    expect(randu).toMatchObject({ source: "randu", period: "536870912" });
    expect(randu?.lowBitPeriods?.slice(0, 5)).toEqual(["1", "2", "2", "4", "8"]);
    expect(randu?.dual?.map(({ dimension }) => dimension)).toEqual([2, 3, 4]);
    expect(randu?.dual?.[1]).toMatchObject({
      squaredLength: "118",
      vector: ["9", "-6", "1"],
      l1Vector: ["9", "-6", "1"],
      hyperplanes: "15",
      marsagliaBound: "2344",
    });
    // the same planes hold the run and all odd states; nu^2 of two dimensions differs (Knuth's table takes m / 4)
    for (const key of ["dualKnuth", "dualOrbit", "dualSeedAveraged"] as const) {
      expect(randu?.[key]?.[1]).toMatchObject({ squaredLength: "118", hyperplanes: "15" });
    }
    expect(randu?.dualKnuth?.[0]?.squaredLength).toBe("536936458");
  });

  it("knows a congruential generator invented on the spot", async () => {
    // D. E. Knuth, The Art of Computer Programming, vol. 2, 3.3.4, table 1, line 1: a = 23, m = 10^8 + 1
    const [own] = await json(
      '{ name: lehmer, congruential: { modulus: "10^8 + 1", multiplier: 23, increment: 0 } }',
      { dimension: "2..6" },
    );
    expect(own?.dual?.map(({ squaredLength }) => squaredLength)).toEqual(["530", "530", "530", "530", "447"]);
    expect(own?.dualKnuth).toBeUndefined();
  });

  it("takes index sets, states, points and streams", async () => {
    const [one, other] = await json(["lcg-1664525", "minstd-16807"], {
      dimension: "2",
      indices: "5,0,1",
      points: "2^10",
      streams: "4",
    });
    expect(one?.dualIndices?.indices).toEqual([0, 1, 5]);
    expect(one?.periodUse?.share).toBeCloseTo(2 ** -21, 15);
    // runs of length L start at random: none begins within L of another, 3 L / m for each of 4 (in the limit)
    expect(one?.periodUse?.overlapProbability).toBeCloseTo(12 * 2 ** -21, 9);
    expect(other?.periodReasons.map(({ holds }) => holds)).toEqual(Array(8).fill(true));
    const [even] = await json("randu", { dimension: "2", state: "4" });
    expect(even?.periodFromState?.period).toBe("134217728");
  });

  it("says why there is no lattice, and what there is instead", async () => {
    const [philox] = await json("philox4x32");
    expect(philox?.dual).toBeUndefined();
    expect(philox?.period).toBe(String(2n ** 130n));
    expect(philox?.notComputed).toEqual([
      "philox4x32: no lattice, as its outputs are not linear modulo a whole number",
    ]);
    const [split] = await json("{ name: split, source: randu, tuples: per-coordinate }");
    expect(split?.notComputed[0]).toMatch(/^split: no joint lattice, as every coordinate is a stream/);
  });
});

describe("tables", () => {
  it("show planes with their convention and the worst figure", async () => {
    const { out } = await inspect("randu", { dimension: "2..8" });
    expect(out).toContain("Worst figure: S = 0.0075 in dimension 3.");
    expect(out).toMatch(/^ {2}3 +118 +0\.0075 +0\.0921 +15 +2344 {2}\(9, −6, 1\)$/m);
    expect(out).toContain("Planes: those that meet the cube [0, 1)^t");
    expect(out).toContain("yes  a mod 8 is 3 or 5 (it is 3): the longest period, m / 4, is reached");
    expect(out).toContain("one run: modulus 268435456, one run: two classes of states");
  });

  it("show where an enumeration stopped", async () => {
    const { out } = await inspect("lcg-6364136223846793005", { dimension: "26" });
    expect(out).toMatch(/^ {2}26 +56 .* ≤ 27 /m);
    expect(out).toContain("Enumeration by |h|₁ reached its bound in dimension 26");
  });
});

describe("report", () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), "tolerand-inspect-"));
  });
  afterAll(() => {
    rmSync(folder, { recursive: true });
  });

  it("is written beside the tables", async () => {
    const { out, err } = await inspect("randu", { dimension: "3", out: join(folder, "page") });
    expect(out).toContain("(9, −6, 1)");
    expect(err).toContain("Next: open ");
    expect(readFileSync(join(folder, "page", "index.html"), "utf8")).toContain("15 planes hold them");
    expect(existsSync(join(folder, "page", "charts", "slice-randu.vl.json"))).toBe(true);
  });

  it("leaves the report of a study alone, and says where it cannot write", async () => {
    writeFileSync(join(folder, "record.json"), "{}");
    const { err } = await inspect("randu", { dimension: "3", out: folder });
    expect(err).toContain("holds the report of a study and is not overwritten");
    const below = await inspect("randu", { dimension: "3", out: join(folder, "record.json", "x") });
    expect(below.err).toContain("--out: cannot write to ");
  });
});

describe("bad input", () => {
  it.each([
    ["randu", { dimension: "1" }, 'whole numbers from 2 to 10000 such as 2..16, 8 or 2,3,6, found "1"'],
    ["randu", { dimension: "5..3" }, 'found "5..3"'],
    ["randu", { dimension: "49" }, 'from 2 to 48 for the dual lattice of "randu", found 49'],
    ["randu", { indices: "0,3,0" }, '--indices: expected indices that differ, found 0 twice in "0,3,0"'],
    [
      "randu",
      { indices: "0,x" },
      '--indices: expected at most 48 whole numbers from 0 such as 0,1,5, found "0,x"',
    ],
    ["randu", { state: "0" }, "state: expected a whole number from 1 to 2147483647"],
    ["randu", { points: "0" }, '--points: expected a whole number of at least 1, found "0"'],
    ["randoo", {}, 'did you mean "randu"?'],
    ["system", {}, 'source: nothing can be said about the structure of "system"'],
    [
      "{ name: v, lattice: { vector: [1, 3] } }",
      { indices: "0,2" },
      "index set: expected whole numbers from 0 to 1, found 2",
    ],
  ])("%s with %j", async (source, flags, message) => {
    const { out, err } = await inspect(source, flags);
    expect(out).toBe("");
    expect(err).toContain(message);
  });
});

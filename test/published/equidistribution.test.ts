/**
 * Dimensions of equidistribution in print: P. L'Ecuyer, Mathematics of Computation 65 (1996) 203-213 and 68 (1999) 261-269 (taus88
 * and LFSR113 are maximally equidistributed); M. Matsumoto and T. Nishimura, ACM Transactions on Modeling and Computer Simulation 8
 * (1998) 3-30, table II (MT19937); T. Nishimura, ibid. 10 (2000) 348-357 (311 dimensions of 64 bits); sums of gaps: F. Panneton,
 * P. L'Ecuyer and M. Matsumoto, ACM Transactions on Mathematical Software 32 (2006) 1-16, and S. Harase and T. Kimoto, ibid. 44
 * (2018) 30. All from memory.
 */
import { describe, expect, test } from "vitest";
import { parseSource } from "../../src/sources/choice.js";
import { equidistributionSection } from "../../src/structure/sections/equidistribution.js";

const REQUEST = {
  dimensions: [2],
  dimensionsGiven: false,
  points: null,
  streams: 1,
  state: null,
  indices: null,
  span: 12,
};

async function of(id: string) {
  const { equidistribution } = await equidistributionSection.inspect(parseSource(id), REQUEST);
  const entries = equidistribution ?? [];
  return {
    dimensions: entries.map(({ dimension }) => dimension),
    gap: entries.reduce((sum, { gap }) => sum + gap, 0),
  };
}

describe("equidistribution in print", () => {
  test.each([
    ["taus88", 88],
    ["lfsr113", 113],
  ])("%s is maximally equidistributed", async (id, bits) => {
    const { dimensions, gap } = await of(id);
    expect(gap).toBe(0);
    expect(dimensions).toEqual(Array.from({ length: 32 }, (_, k) => Math.floor(bits / (k + 1))));
  });

  test("mt19937: table II", async () => {
    const { dimensions, gap } = await of("mt19937");
    expect(dimensions).toEqual([
      19937, 9968, 6240, 4984, 3738, 3115, 2493, 2492, 1869, 1869, 1248, 1246, 1246, 1246, 1246, 1246, 623,
      623, 623, 623, 623, 623, 623, 623, 623, 623, 623, 623, 623, 623, 623, 623,
    ]);
    expect(gap).toBe(6750);
  });

  test("mt19937-64: 311 dimensions of 64 bits, gaps of 7820 in all", async () => {
    const { dimensions, gap } = await of("mt19937-64");
    expect(dimensions.at(-1)).toBe(311);
    expect(gap).toBe(7820);
  });

  test("D. Blackman and S. Vigna (2021): xoshiro256** in 4 dimensions, xoroshiro128** in 2", async () => {
    expect((await of("xoshiro256**")).dimensions.at(-1)).toBe(4);
    expect((await of("xoroshiro128**")).dimensions.at(-1)).toBe(2);
  });
});

/** States after jumps, from the libraries and checks named in data/generators.json and beside each test. */
import { describe, expect, test } from "vitest";
import { affinePower, applyAffine } from "../../src/numeric/affine.js";
import { applyMatrix, powerMatrix } from "../../src/numeric/matrix-mod.js";
import { A1, A2, M1, M2 } from "../../src/sources/mrg32k3a.js";
import { data, pseudoRandomSource } from "./generator-data.js";

describe("congruential maps", () => {
  for (const jump of data.jumps.filter(({ kind }) => kind === "LCG")) {
    const whole = (name: string): bigint => BigInt(String(jump[name]));
    const [a, c, m, n, x0] = ["a", "c", "m", "n", "x0"].map(whole) as [
      bigint,
      bigint,
      bigint,
      bigint,
      bigint,
    ];
    test(`${a} x + ${c} mod ${m}, ${n} steps from ${x0}`, () => {
      const power = affinePower({ multiplier: a, increment: c, modulus: m }, n);
      expect(power.multiplier).toBe(whole("A"));
      expect(power.increment).toBe(whole("C"));
      expect(applyAffine(power, x0)).toBe(whole("x_n"));
    });
  }
});

describe("linear maps over GF(2)", () => {
  const cases = [
    ["xoshiro256++", "xoshiro256 state", 1n << 192n],
    ["xoroshiro128+", "xoroshiro128+/** (24,16,37)", 1n << 96n],
    ["xoroshiro128**", "xoroshiro128+/** (24,16,37)", 1n << 96n],
  ] as const;
  for (const [id, kind, steps] of cases) {
    test(`${id}: ${steps} steps (Blackman and Vigna's long jump)`, () => {
      const jump = data.jumps.find((candidate) => candidate.kind.startsWith(kind));
      const words = (list: unknown): bigint[] => (list as string[]).map((word) => BigInt(word));
      const after = pseudoRandomSource(id).recurrence.advance?.(words(jump?.["state_before"]), steps);
      expect(after).toEqual(words(jump?.["state_after"]));
    });
  }
});

describe("PCG64 from NumPy's seed 12345", () => {
  /** PCG64(12345).state of NumPy 2.4.6, and the same words for PCG64DXSM(12345). */
  const start = "state=33261208707367790463622745601869196757,inc=268209174141567072605526753992732310247";
  /** The step of `jumped`: 2^128 divided by the golden ratio, made odd (NumPy's documentation of PCG64.jumped). */
  const jumped = 0x9e3779b97f4a7c15f39cc0605cedc835n;
  for (const jump of data.jumps.filter(({ kind }) => kind.startsWith("PCG64"))) {
    const id = jump.kind.startsWith("PCG64DXSM") ? "pcg64-dxsm" : "pcg64";
    const steps = jump.n === undefined ? jumped : BigInt(jump.n);
    test(`${id}: ${steps} steps`, () => {
      const { recurrence } = pseudoRandomSource(id);
      const after = recurrence.advance?.(recurrence.stateFromText(start), steps) ?? [];
      const [low = 0n, high = 0n] = after;
      expect((high << 64n) | low).toBe(BigInt(String(jump["state"])));
      const outputs = recurrence.integers(after);
      for (const value of jump["next3"] as string[]) expect(outputs.next().value).toBe(BigInt(value));
    });
  }
});

describe("MRG32k3a (P. L'Ecuyer, R. Simard, E. J. Chen, W. D. Kelton, Operations Research 50 (2002) 1073-1075; values from memory)", () => {
  test("first rows of the matrices of a jump by 2^127", () => {
    expect(powerMatrix(A1, 1n << 127n, M1)[0]).toEqual([2427906178n, 3580155704n, 949770784n]);
    expect(powerMatrix(A2, 1n << 127n, M2)[0]).toEqual([1464411153n, 277697599n, 1610723613n]);
  });

  test("the second stream from six times 12345", () => {
    const seed = [12345n, 12345n, 12345n];
    const second = [3692455944n, 1366884236n, 2968912127n, 335948734n, 4161675175n, 475798818n];
    const { recurrence } = pseudoRandomSource("mrg32k3a");
    expect(recurrence.advance?.([...seed, ...seed], 1n << 127n)).toEqual(second);
    expect(applyMatrix(powerMatrix(A1, 1n << 127n, M1), seed, M1)).toEqual(second.slice(0, 3));
  });
});

import { describe, expect, test, vi } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { isPrime, powerMod } from "../../src/numeric/factor.js";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import { findSource, listSources, sourceIds } from "../../src/sources/registry.js";

const house = { modulus: "2^31", multiplier: 65539, increment: 0 };

function pseudoRandomIds(): string[] {
  return listSources().flatMap(({ id, family, repeatable = true }) =>
    family === "pseudo-random" && repeatable ? [id] : [],
  );
}

function message(spec: unknown): string {
  try {
    parseSource(spec as SourceSpec);
  } catch (error) {
    if (error instanceof RangeError || error instanceof TypeError) return error.message;
    throw error;
  }
  return "no error";
}

describe("listing", () => {
  test("every id is listed under its own name, in lower case, with a citation", () => {
    const listed = listSources();
    expect(listed.map(({ id }) => id)).toEqual(sourceIds());
    for (const { id, title, citation, method, outputBits, period, family } of listed) {
      expect(id).toBe(id.toLowerCase());
      expect(title).not.toBe("");
      expect(citation).toMatch(/\d{4}/);
      expect(method).not.toBe("");
      expect(outputBits).toBeGreaterThan(0);
      if (family !== "pseudo-random") expect(period).toBeNull();
    }
  });
});

describe("periods", () => {
  /** No exact period is known, or it depends on the seed. */
  const unknown = ["system", "math-random", "sfc64", "knuth-subtractive", "kiss99", "kiss64"];

  test("every other pseudo-random source states its exact period", () => {
    const silent = listSources().filter(
      ({ family, period }) => family === "pseudo-random" && period === null,
    );
    expect(silent.map(({ id }) => id).sort()).toEqual([...unknown].sort());
  });

  test("mwc: a 2^16 - 1 and a 2^15 - 1 are prime, so that each half has the period a 2^15 - 1", () => {
    const halves = [36969n, 18000n];
    for (const a of halves)
      expect([isPrime(a * 65536n - 1n), isPrime(a * 32768n - 1n)]).toEqual([true, true]);
    expect(findSource("mwc")?.period).toBe(halves.reduce((product, a) => product * (a * 32768n - 1n), 1n));
  });

  test("ranlux: the period is the order of the base modulo 2^576 - 2^240 + 1 (2 and 3 do not divide it further)", () => {
    const modulus = (1n << 576n) - (1n << 240n) + 1n;
    for (const [id, bits] of [
      ["ranlux-3", 24n],
      ["ranlux48", 48n],
    ] as const) {
      const period = findSource(id)?.period ?? 0n;
      expect(powerMod(1n << bits, period, modulus)).toBe(1n);
      for (const p of [2n, 3n, 5n, 7n, 13n, 17n]) {
        if (period % p === 0n) expect(powerMod(1n << bits, period / p, modulus)).not.toBe(1n);
      }
    }
  });
});

describe("ids", () => {
  test("every id parses to its source, plus signs of its name included", () => {
    for (const id of sourceIds()) {
      const choice = parseSource(id);
      expect([choice.id, choice.source.id, choice.spec]).toEqual([id, id, id]);
      expect(choice.randomisations).toEqual([]);
    }
    expect(parseSource("xoshiro256++").source.id).toBe("xoshiro256++");
  });

  test("an unknown id is answered with the nearest known one", () => {
    expect(message("mt19973")).toBe(
      'source: unknown source "mt19973"; did you mean "mt19937"? "tolerand sources" lists what there is',
    );
    expect(message("xoshiro256")).toContain('did you mean "xoshiro256+"?');
    expect(message("philox4x23+owen")).toContain('did you mean "philox4x32"?');
    expect(message("a name that nothing here resembles")).toBe(
      'source: unknown source "a name that nothing here resembles"; "tolerand sources" lists what there is',
    );
    expect(message("")).toContain('unknown source ""');
    expect(message("toString")).toContain('unknown source "toString"');
  });

  test("a randomisation that does not apply is refused with those that do", () => {
    expect(message("mt19937+owen")).toBe(
      'source: "mt19937" takes no randomisation, found "mt19937+owen"; write "mt19937"',
    );
    expect(message("xoshiro256+++shift")).toBe(
      'source: "xoshiro256++" takes no randomisation, found "xoshiro256+++shift"; write "xoshiro256++"',
    );
  });

  test("other values are refused by type", () => {
    expect(message(null)).toBe('source: expected an id like "mt19937" or a mapping, found null');
    expect(message(["mt19937"])).toBe(
      'source: expected an id like "mt19937" or a mapping, found ["mt19937"]',
    );
    expect(message(7)).toBe('source: expected an id like "mt19937" or a mapping, found 7');
  });
});

describe("the user's own source", () => {
  test("a congruential generator with all its options", () => {
    const spec = {
      name: "house",
      congruential: house,
      tuples: "successive",
      endpoint: "middle",
      bits: "top 31",
      seeding: "uniform-state",
    };
    const choice = parseSource(spec);
    expect(choice).toMatchObject({ id: "house", deterministic: false, spec });
    expect(choice.source).toMatchObject({
      id: "house",
      family: "own",
      method: "congruential",
      outputBits: 31,
      period: 1n << 29n,
      title: "65539 x + 0 mod 2147483648",
    });
  });

  test.each([
    [
      {},
      "source.name: expected 1 to 40 letters, digits, dots, dashes or underscores, beginning with a letter or digit, found nothing",
    ],
    [
      { name: "house", congruental: house },
      'source: unknown key "congruental", did you mean "congruential"?; allowed are name, congruential, recursive, xorshift, source, draws, tuples, endpoint, bits, float32, seeding, state',
    ],
    [
      { name: "house", congruential: { ...house, modulo: 3 } },
      'source.congruential: unknown key "modulo", did you mean "modulus"?; allowed are modulus, multiplier, increment',
    ],
    [
      { name: "house" },
      'source: expected one of the keys "congruential", "recursive", "xorshift", "source", "draws", found none',
    ],
    [
      { name: "house", congruential: house, source: "mt19937" },
      'source: expected one of the keys "congruential", "recursive", "xorshift", "source", "draws", found "congruential" and "source"',
    ],
    [
      { name: "mt19937", congruential: house },
      'source.name: expected a name that no source of the program has, found "mt19937"',
    ],
    [
      { name: "house", congruential: { ...house, modulus: "2^65" } },
      'source.congruential.modulus: expected a whole number from 2 to 18446744073709551616, found "2^65" = 36893488147419103232',
    ],
    [
      { name: "house", congruential: { ...house, multiplier: 0 } },
      "source.congruential.multiplier: expected a whole number from 1 to 2147483647, found 0",
    ],
    [
      { name: "house", congruential: { ...house, modulus: "2^^31" } },
      'source.congruential.modulus: expected a whole number or a formula of whole numbers with + - * ^ ( ), like "2^31 - 1", found "2^^31" (unexpected "^")',
    ],
    [
      { name: "house", congruential: { modulus: "2^31" } },
      'source.congruential.multiplier: expected a whole number or a formula like "2^16 + 3", found nothing',
    ],
    [
      { name: "house", source: "mt19937", tuples: "pairs" },
      'source.tuples: expected "successive", "strided k" (like "strided 2") or "per-coordinate", found "pairs"',
    ],
    [
      { name: "house", source: "mt19937", tuples: "strided 9999" },
      'source.tuples: expected "strided k" with k from 1 to 4096, found "strided 9999"',
    ],
    [
      { name: "house", source: "mt19937", bits: "top 33" },
      'source.bits: expected 1 to 32 bits (an output has 32), found "top 33"',
    ],
    [
      { name: "house", source: "mt19937", bits: 12 },
      'source.bits: expected "all", "top b" or "low b" (like "top 31"), found 12',
    ],
    [
      { name: "house", source: "mt19937", endpoint: "right" },
      'source.endpoint: expected "middle" or "left", found "right"',
    ],
    [
      { name: "house", recursive: { modulus: 101, multipliers: [] } },
      "source.recursive.multipliers: expected a list of 1 to 64 whole numbers or formulas, a1 first, found []",
    ],
    [
      { name: "house", recursive: { modulus: 101, multipliers: [1, null] } },
      "source.recursive.multipliers.1: expected a whole number or a formula, found null",
    ],
    [
      { name: "house", recursive: { modulus: 101, multipliers: [5, 0] } },
      "source.recursive.multipliers.1: expected a last multiplier that is not 0, found 0",
    ],
    [
      { name: "house", recursive: { modulus: 101, multipliers: [5, 101] } },
      "source.recursive.multipliers.1: expected a whole number from -100 to 100, found 101",
    ],
    [
      { name: "house", xorshift: { bits: 48, shifts: [13, -7, 17] } },
      "source.xorshift.bits: expected 32 or 64, found 48",
    ],
    [
      { name: "house", xorshift: { bits: 32, shifts: [13, -32, 5] } },
      "source.xorshift.shifts.1: expected a shift from 1 to 31, or its negative for one to the right, found -32",
    ],
    [
      { name: "house", xorshift: { bits: 32, shifts: [13, 5] } },
      "source.xorshift.shifts: expected three whole numbers, positive to the left and negative to the right, found [13,5]",
    ],
    [
      { name: "house", source: "nothing" },
      `source.source: expected a pseudo-random source (${pseudoRandomIds().join(", ")}), found "nothing"`,
    ],
  ])("%j is refused", (spec, expected) => {
    expect(message(spec)).toBe(expected);
  });

  test("bits of a cut output are what it prints", () => {
    const whole = parseSource("mt19937").source;
    const cut = parseSource({ name: "house", source: "mt19937", bits: "low 4" }).source;
    if (!("openIntegers" in whole && "openIntegers" in cut)) throw new Error("no integers");
    const request = { key: null, state: "5489" };
    const open = (source: object): { next(): bigint } =>
      (source as { openIntegers(r: typeof request): { next(): bigint } }).openIntegers(request);
    const [a, b] = [open(whole), open(cut)];
    for (let k = 0; k < 20; k++) expect(b.next()).toBe(a.next() & 15n);
  });
});

describe("sources that cannot be repeated", () => {
  test.each(["system", "math-random"])("%s says so and refuses a state", (id) => {
    const { source } = parseSource(id);
    expect(source.repeatable).toBe(false);
    const request = { dimension: 1, n: 8, randomisations: [], key: null, state: "1" };
    expect(() => source.open(request, instantiateKernels())).toThrow(
      new RangeError(`state: expected none, as source "${id}" takes no seed or state, found "1"`),
    );
  });

  test("math-random gives what the engine gives, at 52 bits", () => {
    const engine = vi
      .spyOn(Math, "random")
      .mockReturnValueOnce(0)
      .mockReturnValueOnce(0.75 + 2 ** -52);
    const kernels = instantiateKernels();
    const row = kernels.arena.allocate(64);
    const request = { dimension: 1, n: 2, randomisations: [], key: null };
    parseSource("math-random").source.open(request, kernels).fill(row, 8, 2);
    expect([...kernels.f64(row, 2)]).toEqual([2 ** -53, 0.75 + 2 ** -52 + 2 ** -53]);
    engine.mockRestore();
  });
});

describe("published states", () => {
  test.each([
    ["randu", "0", 'state: expected a whole number from 1 to 2147483647 for source "randu", found "0"'],
    ["minstd-16807", "2147483647", "from 1 to 2147483646"],
    [
      "mt19937",
      "-1",
      'state: expected a seed from 0 to 4294967295, or 2 to 624 of them as a key, for source "mt19937", found "-1"',
    ],
    ["mt19937", "1,4294967296", "2 to 624 of them as a key"],
    [
      "mt19937-64",
      "",
      'state: expected a seed below 2^64, or 2 to 312 of them as a key, for source "mt19937-64"',
    ],
    ["xoshiro256++", "0,0,0,0", "four words below 2^64, not all 0"],
    ["xoshiro256++", "1,2,3", "four words below 2^64, not all 0"],
    ["pcg64", "state=1,inc=2", "inc odd"],
    ["pcg64", "42", '"initstate,initseq"'],
    ["philox4x32", "0 0 0 0", '"counter;key" as four and two hexadecimal 32-bit words'],
    ["philox4x32", "0 0 0 123456789;0 0", '"counter;key"'],
  ])("%s refuses %s", (id, state, expected) => {
    const { source } = parseSource(id);
    if (!("openIntegers" in source)) throw new Error("no integers");
    const open = source.openIntegers as (request: { key: null; state: string }) => unknown;
    expect(() => open({ key: null, state })).toThrow(expected);
    expect(() => open({ key: null, state })).toThrow(RangeError);
  });
});

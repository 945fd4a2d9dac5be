/**
 * Published and library outputs of the pseudo-random sources. Every value stands in data/generators.json with where it
 * comes from (GSL 2.7.1, libstdc++ 12, Boost.Random 1.74, NumPy 1.24.2, glibc, or a plain integer implementation of
 * the definition) and with the published values that it was confirmed by.
 */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { affinePower, applyAffine } from "../../src/numeric/affine.js";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import { isPseudoRandom, USUAL } from "../../src/sources/pseudo-random.js";
import { coordinateOf } from "../sources/oracle.js";

interface Setting {
  readonly id: string;
  readonly params: Readonly<Record<string, string>>;
  readonly seed: string;
  readonly first10: readonly string[];
  readonly at: Readonly<Record<string, string>>;
}

interface Block {
  readonly name: string;
  readonly ctr: string;
  readonly key: string;
  readonly out: string;
}

interface Jump {
  readonly kind: string;
  readonly n: string;
  readonly [key: string]: unknown;
}

interface Data {
  readonly generators: readonly Setting[];
  readonly known_answer_blocks: readonly Block[];
  readonly jumps: readonly Jump[];
}

const data = JSON.parse(
  readFileSync(new URL("./data/generators.json", import.meta.url), "utf8"),
) as unknown as Data;
const settings = new Map(data.generators.map((setting) => [setting.id, setting]));

function setting(id: string): Setting {
  const found = settings.get(id);
  if (found === undefined) throw new Error(`no setting ${id}`);
  return found;
}

/** Outputs 1 ... 10, 10,000 and 1,000,000 that a setting lists, by index. */
function listed({ first10, at }: Setting): [number, bigint][] {
  const first = first10.map((value, i): [number, bigint] => [i + 1, BigInt(value)]);
  return [
    ...first,
    ...Object.entries(at).map(([index, value]): [number, bigint] => [Number(index), BigInt(value)]),
  ];
}

/** The integers of a source and the coordinates of its kernel at the indices that a setting lists. */
function check(id: string, spec: SourceSpec, state: string, topBits?: number): void {
  const expected = listed(setting(id));
  const { source } = parseSource(spec);
  if (!isPseudoRandom(source)) throw new Error(`${source.id} is not pseudo-random`);
  const last = Math.max(...expected.map(([index]) => index));

  const integers = source.openIntegers({ key: null, state });
  const wanted = new Map(expected);
  for (let index = 1; index <= last; index++) {
    const value = integers.next();
    if (wanted.has(index)) expect(value, `output ${index}`).toBe(wanted.get(index));
  }

  const { integers: parts } = source.recurrence.output;
  if (parts > 1) return; // their coordinates are checked against known-answer blocks below
  const kernels = instantiateKernels();
  const stream = source.open({ dimension: 1, n: last, randomisations: [], key: null, state }, kernels);
  const row = kernels.arena.allocate(last * 8 + 64);
  stream.fill(row, Math.ceil(last / 8) * 8, last);
  const coordinates = kernels.f64(row, last);
  for (const [index, value] of expected) {
    const coordinate =
      topBits === undefined
        ? coordinateOf(value, source.recurrence, USUAL)
        : (Number(value) + 0.5) / 2 ** topBits;
    expect(coordinates[index - 1], `coordinate ${index}`).toBe(coordinate);
  }
}

describe("congruential generators print their published outputs", () => {
  const named: Readonly<Record<string, string>> = {
    "minstd-16807-seed1": "minstd-16807",
    "minstd-48271-seed1": "minstd-48271",
    "randu-seed1": "randu",
  };
  for (const [id, source] of Object.entries(named)) test(`${source}: ${id}`, () => check(id, source, "1"));

  /** x_0 = 2^16 seed + 0x330E (srand48) where an entry says so, else the seed. */
  const state = ({ id, seed }: Setting): string =>
    /rand48/.test(id) ? (BigInt(seed) * 65536n + 0x330en).toString() : seed;
  const topBits: Readonly<Record<string, number>> = {
    "lrand48-31bit-seed0": 31,
    "lrand48-31bit-seed1": 31,
    "rand48-32bit-seed1": 32,
  };
  const generic = data.generators.filter(({ params }) => "a" in params && "c" in params && "m" in params);
  for (const entry of generic) {
    test(`congruential: ${entry.id}`, () => {
      const { a, c, m } = entry.params;
      const congruential = { modulus: m, multiplier: a, increment: c };
      const bits = topBits[entry.id];
      const spec = { name: "house", congruential, bits: bits === undefined ? "all" : `top ${bits}` };
      check(entry.id, spec, state(entry), bits);
    });
  }
});

describe("linear feedback generators print their published outputs", () => {
  test("mt19937: seed 5489 (the authors' init_genrand)", () => check("mt19937-seed5489", "mt19937", "5489"));
  test("mt19937: seed 1", () => check("mt19937-seed1", "mt19937", "1"));
  test("xoshiro256++: state 1,2,3,4", () =>
    check("xoshiro256plusplus-state1-2-3-4", "xoshiro256++", "1,2,3,4"));
  test("xoshiro256++: four splitmix64 outputs from 12345", () => {
    const { params } = setting("xoshiro256plusplus-splitmix12345");
    check("xoshiro256plusplus-splitmix12345", "xoshiro256++", String(params["state"]));
  });
});

describe("pcg64 prints its published outputs", () => {
  test("pcg64: initstate 42, initseq 54", () => check("pcg64-42-54", "pcg64", "42,54"));
  for (const id of ["pcg64-numpy-seed0", "pcg64-explicit-state"]) {
    test(`pcg64: ${id}`, () => {
      const { params } = setting(id);
      check(id, "pcg64", `state=${params["state"]},inc=${params["inc"]}`);
    });
  }
});

describe("philox4x32 prints its published outputs", () => {
  test("philox4x32: key 0, counter from 0", () =>
    check("philox4x32-10-key0-0-ctr0", "philox4x32", "0 0 0 0;0 0"));
  for (const { ctr, key, out } of data.known_answer_blocks.filter(({ name }) => name === "philox4x32-10")) {
    test(`philox4x32: known answer for counter ${ctr}, key ${key}`, () => {
      const { source } = parseSource("philox4x32");
      if (!isPseudoRandom(source)) throw new Error("not pseudo-random");
      const state = `${ctr};${key}`;
      const integers = source.openIntegers({ key: null, state });
      const words = out.split(" ").map((word) => BigInt(`0x${word}`));
      expect(words.map(() => integers.next())).toEqual(words);

      const kernels = instantiateKernels();
      const row = kernels.arena.allocate(16 * 8);
      source.open({ dimension: 1, n: 2, randomisations: [], key: null, state }, kernels).fill(row, 8, 2);
      const [a = 0n, b = 0n, c = 0n, d = 0n] = words;
      const joined = [(b << 32n) | a, (d << 32n) | c];
      expect([...kernels.f64(row, 2)]).toEqual(
        joined.map((word) => coordinateOf(word, source.recurrence, USUAL)),
      );
    });
  }
});

describe("jumps", () => {
  const affine = data.jumps.filter(({ kind }) => kind === "LCG");
  for (const jump of affine) {
    const text = (key: string): bigint => BigInt(String(jump[key]));
    test(`${jump["a"] as string} x + ${jump["c"] as string} mod ${jump["m"] as string}, ${jump.n} steps from ${jump["x0"] as string}`, () => {
      const map = { multiplier: text("a"), increment: text("c"), modulus: text("m") };
      const power = affinePower(map, text("n"));
      expect(power.multiplier).toBe(text("A"));
      expect(power.increment).toBe(text("C"));
      expect(applyAffine(power, text("x0"))).toBe(text("x_n"));
    });
  }

  test("xoshiro256: 2^192 steps (Blackman and Vigna's long jump)", () => {
    const jump = data.jumps.find(({ kind }) => kind.startsWith("xoshiro256"));
    const { source } = parseSource("xoshiro256++");
    if (!isPseudoRandom(source)) throw new Error("not pseudo-random");
    const words = (list: unknown): bigint[] => (list as string[]).map((word) => BigInt(word));
    const after = source.recurrence.advance?.(words(jump?.["state_before"]), 1n << 192n);
    expect(after).toEqual(words(jump?.["state_after"]));
  });

  /** PCG64(12345).state of NumPy 2.4.6, before the jump. */
  const start = "state=33261208707367790463622745601869196757,inc=268209174141567072605526753992732310247";
  for (const jump of data.jumps.filter(({ kind }) => kind.startsWith("PCG64 "))) {
    test(`pcg64: ${jump.n} steps from NumPy's seed 12345`, () => {
      const { source } = parseSource("pcg64");
      if (!isPseudoRandom(source)) throw new Error("not pseudo-random");
      const { recurrence } = source;
      const [low = 0n, high = 0n, ...increment] = recurrence.stateFromText(start);
      const after = recurrence.advance?.([low, high, ...increment], BigInt(jump.n)) ?? [];
      expect(((after[1] ?? 0n) << 64n) | (after[0] ?? 0n)).toBe(BigInt(String(jump["state"])));
      const outputs = recurrence.integers(after);
      for (const value of jump["next3"] as string[]) expect(outputs.next().value).toBe(BigInt(value));
    });
  }
});

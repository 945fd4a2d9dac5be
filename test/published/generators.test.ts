/**
 * Published and library outputs of the pseudo-random sources. Every value stands in data/generators.json with where it
 * comes from (GSL 2.7.1, libstdc++ 12, Boost.Random 1.74, NumPy 1.24.2, glibc, or a plain integer implementation of
 * the definition) and with the published values that it was confirmed by.
 */
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { USUAL } from "../../src/sources/pseudo-random.js";
import { coordinateOf } from "../sources/oracle.js";
import { check, data, pseudoRandomSource, settingOf, type Setting } from "./generator-data.js";

const word = (setting: string, name: string): string => String(settingOf(setting).params[name]);
const words = (setting: string, name = "state"): string => {
  const list = settingOf(setting).params[name];
  return typeof list === "string" ? list : (list ?? []).join(",");
};
const pcg64Words = (setting: string): string => `state=${word(setting, "state")},inc=${word(setting, "inc")}`;

/** srand48: the seed above the 16 bits 0x330E. */
const rand48 = (seed: bigint): string => (seed * 65536n + 0x330en).toString();

/** GSL's seeding of taus113 from 1: a congruential chain, with what each component needs added where it is too small. */
function taus113Seed(): string {
  const chain: bigint[] = [];
  for (const least of [2n, 8n, 16n, 128n]) {
    const next = (69069n * (chain.at(-1) ?? 1n)) % (1n << 32n);
    chain.push(next < least ? next + least : next);
  }
  return chain.join(",");
}

/** [source, setting of the data file, starting state, outputs that the library's seeding drops] */
const named: readonly (readonly [string, string, string, number?])[] = [
  ["randu", "randu-seed1", "1"],
  ["minstd-16807", "minstd-16807-seed1", "1"],
  ["minstd-48271", "minstd-48271-seed1", "1"],
  ["lcg-742938285", "fishman-moore-742938285-seed1", "1"],
  ["lcg-62089911", "fishman18-62089911-seed1", "1"],
  ["lcg-69069", "vax-69069-seed1", "1"],
  ["lcg-1103515245", "ansi-c-1103515245-seed1", "1"],
  ["lcg-1664525", "lcg-numrec-1664525-1013904223-seed0", "0"],
  ["lcg-6364136223846793005", "lcg-mmix-seed0", "0"],
  ["lcg-6364136223846793005", "lcg-mmix-seed1", "1"],
  ["drand48", "drand48-state48-seed0", rand48(0n)],
  ["drand48", "drand48-state48-seed1", rand48(1n)],
  ["lrand48", "lrand48-31bit-seed0", rand48(0n)],
  ["lrand48", "lrand48-31bit-seed1", rand48(1n)],
  ["mrand48", "rand48-32bit-seed1", rand48(1n)],
  ["wichmann-hill", "wichmann-hill-1982-seed1-2-3-int", "1,2,3"],
  ["lecuyer1988", "lecuyer1988-seed1-1", "1,1"],
  ["lecuyer1988", "lecuyer1988-seed12345-12345", "12345,12345"],
  ["mrg32k3a", "mrg32k3a-seed12345x6", "12345,12345,12345,12345,12345,12345"],
  ["mt19937", "mt19937-seed5489", "5489"],
  ["mt19937", "mt19937-seed1", "1"],
  ["mt19937-64", "mt19937-64-seed5489", "5489"],
  ["taus88", "taus88-341", "341,341,341"],
  ["taus88", "taus2-gsl-seed1", words("taus2-gsl-seed1", "s"), 6],
  ["lfsr113", "gsl-taus113-seed1", taus113Seed(), 10],
  ["xorshift64*", "xorshift64star-seed1", "1"],
  ["xorshift128", "xorshift128-marsaglia2003", "123456789,362436069,521288629,88675123"],
  ["xoroshiro128+", "xoroshiro128plus-state1-2", "1,2"],
  ["xoroshiro128**", "xoroshiro128starstar-state1-2", "1,2"],
  ["xoshiro256+", "xoshiro256plus-state1-2-3-4", "1,2,3,4"],
  ["xoshiro256+", "xoshiro256plus-splitmix12345", words("xoshiro256plus-splitmix12345")],
  ["xoshiro256++", "xoshiro256plusplus-state1-2-3-4", "1,2,3,4"],
  ["xoshiro256++", "xoshiro256plusplus-splitmix12345", words("xoshiro256plusplus-splitmix12345")],
  ["xoshiro256**", "xoshiro256starstar-state1-2-3-4", "1,2,3,4"],
  ["xoshiro256**", "xoshiro256starstar-splitmix12345", words("xoshiro256starstar-splitmix12345")],
  ["pcg32", "pcg32-42-54", "42,54"],
  ["pcg64", "pcg64-42-54", "42,54"],
  ["pcg64", "pcg64-numpy-seed0", pcg64Words("pcg64-numpy-seed0")],
  ["pcg64", "pcg64-explicit-state", pcg64Words("pcg64-explicit-state")],
  ["pcg64-dxsm", "pcg64dxsm-numpy-seed0", pcg64Words("pcg64dxsm-numpy-seed0")],
  ["sfc64", "sfc64-numpy-seed0", words("sfc64-numpy-seed0")],
  ["splitmix64", "splitmix64-seed1234567", "1234567"],
  ["splitmix64", "splitmix64-seed0", "0"],
  ["philox4x32", "philox4x32-10-key0-0-ctr0", "0 0 0 0;0 0"],
  ["philox4x64", "philox4x64-10-key0-0-ctr0", "0 0 0 0;0 0"],
  ["philox4x64", "philox4x64-10-key0-0-ctr1", "1 0 0 0;0 0"],
  ["threefry4x64", "threefry4x64-20-key0-ctr0", "0 0 0 0;0 0 0 0"],
  ["chacha8", "chacha8-zero-key", `${"0".repeat(64)};0;${"0".repeat(24)}`],
  ["chacha20", "chacha20-zero-key", `${"0".repeat(64)};0;${"0".repeat(24)}`],
  ["knuth-subtractive", "subtractive-55-24-mod1e9", "12345"],
  ["knuth-array", "knuth-ran_array-2002-seed310952", "310952"],
  ["ranlux24-base", "ranlux24_base-default", "19780503"],
  ["ranlux-3", "gsl-ranlux-seed1", "1"],
  ["ranlux-4", "gsl-ranlux389-seed1", "1"],
  ["ranlux24", "ranlux24-default", "19780503"],
  ["ranlux48-base", "ranlux48_base-default", "19780503"],
  ["ranlux48", "ranlux48-default", "19780503"],
  ["kiss99", "kiss99-defaults", "362436069,521288629,123456789,380116160"],
  ["kiss99", "kiss99-marsaglia-settable", "12345,65435,34221,12345", 256],
];

describe("sources print their published outputs", () => {
  for (const [spec, setting, state, dropped = 0] of named) {
    test(`${spec}: ${setting}`, () => check({ spec, setting, state, dropped }));
  }
});

describe("values that were printed with the generators", () => {
  test("mt19937: init_by_array of 0x123, 0x234, 0x345, 0x456 (mt19937ar.out of its authors, from memory; NumPy 2.4.6 agrees)", () => {
    const integers = pseudoRandomSource("mt19937").openIntegers({ key: null, state: "291,564,837,1110" });
    for (const value of [1067595299n, 955945823n, 477289528n, 4107218783n, 4228976476n]) {
      expect(integers.next()).toBe(value);
    }
  });

  test("mt19937-64: init_by_array64 of 0x12345, 0x23456, 0x34567, 0x45678 (mt19937-64.out of its authors, from memory)", () => {
    const state = "74565,144470,214375,284280";
    const integers = pseudoRandomSource("mt19937-64").openIntegers({ key: null, state });
    for (const value of [7266447313870364031n, 4946485549665804864n]) expect(integers.next()).toBe(value);
  });

  test("knuth-array: the check of Knuth's ran_array, 995235265, by 2010 blocks from seed 310952 (from memory)", () => {
    const integers = pseudoRandomSource("knuth-array").openIntegers({ key: null, state: "310952" });
    for (let k = 0; k < 2009 * 100; k++) integers.next();
    expect(integers.next()).toBe(995235265n);
  });

  test("r250: the GNU Scientific Library runs the recurrence backwards, x(n) = x(n-147) xor x(n-250)", () => {
    const source = pseudoRandomSource("r250");
    const [...start] = source.recurrence.stateFromText("1");
    const words = [...new Uint32Array(new BigUint64Array(start.slice(0, 125)).buffer)];
    for (let n = 250; n < 250 + 10_000; n++)
      words.push(((words[n - 147] ?? 0) ^ (words[n - 250] ?? 0)) >>> 0);
    const { first10, at } = settingOf("gsl-r250-seed1");
    expect(words.slice(250, 260).map(String)).toEqual(first10);
    expect(String(words.at(-1))).toBe(at["10000"]);

    const back = words.toReversed();
    const state = [...new BigUint64Array(Uint32Array.from(back.slice(0, 250)).buffer), 0n];
    const integers = source.recurrence.integers(state);
    for (const word of back.slice(250)) expect(integers.next().value).toBe(BigInt(word));
  });

  test("kiss64: the hundred millionth output, 1666297717051644203, of the posting of 2009 (from memory)", () => {
    const kernels = instantiateKernels();
    const source = pseudoRandomSource("kiss64");
    const state = "1234567890987654321,123456123456123456,362436362436362436,1066149217761810";
    const count = 10_000;
    const row = kernels.arena.allocate(count * 8);
    const request = { dimension: 1, n: 1e8, randomisations: [], key: null, state };
    const stream = source.open(request, kernels);
    for (let done = 0; done < 1e8; done += count) stream.fill(row, count, count);
    const last = kernels.f64(row, count)[count - 1];
    expect(last).toBe(coordinateOf(1666297717051644203n, source.recurrence, USUAL));
  });
});

describe("the user's own congruential generators print the same", () => {
  const state = ({ id, seed }: Setting): string => (/rand48/.test(id) ? rand48(BigInt(seed)) : seed);
  const bits: Readonly<Record<string, string>> = {
    "lrand48-31bit-seed0": "top 31",
    "lrand48-31bit-seed1": "top 31",
    "rand48-32bit-seed1": "top 32",
  };
  for (const setting of data.generators) {
    const { a: multiplier, c: increment, m: modulus } = setting.params;
    if (multiplier === undefined || increment === undefined || modulus === undefined) continue;
    test(`congruential: ${setting.id}`, () => {
      const congruential = { modulus, multiplier, increment };
      const spec = { name: "house", congruential, bits: bits[setting.id] ?? "all" };
      check({ spec, setting: setting.id, state: state(setting) });
    });
  }
});

describe("the user's own recursive generator prints the same as the library's", () => {
  test("recursive: 107374182 x(n-1) + 104480 x(n-5) mod 2^31 - 1, from the first five outputs of gsl-mrg-seed1", () => {
    const { first10, at } = settingOf("gsl-mrg-seed1");
    const spec = {
      name: "house",
      recursive: { modulus: "2^31 - 1", multipliers: [107374182, 0, 0, 0, 104480] },
    };
    const integers = pseudoRandomSource(spec).openIntegers({
      key: null,
      state: first10.slice(0, 5).join(","),
    });
    for (const value of first10.slice(5)) expect(integers.next()).toBe(BigInt(value));
    for (let index = 11; index < 10_000; index++) integers.next();
    expect(integers.next()).toBe(BigInt(at["10000"] ?? ""));
  });
});

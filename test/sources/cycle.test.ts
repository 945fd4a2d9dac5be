/** All starting states of a source: against streams opened at each of them, one by one. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { instantiateKernels, type Kernels } from "../../src/kernels/instance.js";
import { gcd } from "../../src/numeric/factor.js";
import { parseSource } from "../../src/sources/choice.js";
import type { PointStream, Source } from "../../src/sources/contract.js";
import { fullCycleOf } from "../../src/sources/cycle.js";
import { units } from "../../src/sources/states.js";

function points(stream: PointStream, count: number, kernels: Kernels): string[] {
  const { dimension } = stream;
  const stride = 8 * Math.ceil(count / 8);
  const pointer = kernels.arena.allocate(stride * dimension * 8);
  stream.fill(pointer, stride, count);
  const rows = kernels.f64(pointer, stride * dimension);
  return Array.from({ length: count }, (_, i) =>
    Array.from({ length: dimension }, (_, j) => rows[j * stride + i]).join(" "),
  );
}

/** The first point of a stream from each of the published states. */
function firstPoints(source: Source, states: readonly string[], dimension: number): string[] {
  const kernels = instantiateKernels();
  return states.flatMap((state) => {
    const mark = kernels.arena.mark();
    const stream = source.open({ dimension, n: 1, randomisations: [], key: null, state }, kernels);
    const [point = ""] = points(stream, 1, kernels);
    kernels.arena.release(mark);
    return [point];
  });
}

function cyclePoints(source: Source, dimension: number): string[] {
  const kernels = instantiateKernels();
  const cycle = fullCycleOf(source);
  return points(cycle.open(dimension, kernels), cycle.states, kernels);
}

const wholeNumbers = (from: number, to: number): string[] =>
  Array.from({ length: to - from }, (_, k) => String(from + k));

const coprimeTo = (m: number): string[] => wholeNumbers(1, m).filter((s) => gcd(BigInt(s), BigInt(m)) === 1n);

function own(mapping: Readonly<Record<string, unknown>>): Source {
  return parseSource({ name: "invented", ...mapping }).source;
}

/** modulus, multiplier, increment: full periods, several orbits, primes, powers of primes, several primes. */
const CONGRUENTIAL: readonly (readonly [number, number, number])[] = [
  [1024, 5, 1],
  [1000, 21, 7],
  [512, 9, 4],
  [2048, 11, 0],
  [2048, 17, 0],
  [1009, 11, 0],
  [1009, 10, 3],
  [729, 2, 0],
  [1331, 5, 0],
  [1001, 6, 0],
  [1440, 7, 0],
  [1536, 5, 0],
];

describe("the full cycle of a congruential source", () => {
  const usages: Readonly<Record<string, unknown>>[] = [
    {},
    { tuples: "strided 3" },
    { endpoint: "left" },
    { bits: "top 5" },
    { float32: true },
  ];
  for (const [modulus, multiplier, increment] of CONGRUENTIAL) {
    it(`of ${multiplier} x + ${increment} mod ${modulus} holds the first point of every state once`, () => {
      const states = increment === 0 ? coprimeTo(modulus) : wholeNumbers(0, modulus);
      for (const usage of usages) {
        const source = own({ congruential: { modulus, multiplier, increment }, ...usage });
        expect(cyclePoints(source, 4).sort()).toEqual(firstPoints(source, states, 4).sort());
      }
    });
  }

  it("of low bits is that of the generator modulo their power of two", () => {
    const low = own({
      congruential: { modulus: "2^64", multiplier: "6364136223846793005", increment: 1 },
      bits: "low 9",
    });
    const small = own({
      congruential: { modulus: 512, multiplier: Number(6364136223846793005n % 512n), increment: 1 },
      bits: "low 9",
    });
    expect(fullCycleOf(low).states).toBe(512);
    const states = wholeNumbers(0, 512).map((s) => String(BigInt(s) + 512n * 77n));
    expect(cyclePoints(low, 3).sort()).toEqual(firstPoints(low, states, 3).sort());
    expect(cyclePoints(low, 3)).toEqual(cyclePoints(small, 3));
  });

  it("of a multiplicative map modulo m has the units modulo m, each once (property)", () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 5000 }), (m) => {
        const { constant, weights, sizes } = units(BigInt(m));
        let states = [constant];
        sizes.forEach((size, l) => {
          const digits = Array.from({ length: Number(size) }, (_, digit) => BigInt(digit));
          states = states.flatMap((s) => digits.map((digit) => (s + digit * (weights[l] ?? 0n)) % BigInt(m)));
        });
        const found = states.map(Number).sort((a, b) => a - b);
        expect(found).toEqual(coprimeTo(m).map(Number));
      }),
      { seed: 4, numRuns: 200 },
    );
  });
});

describe("the full cycle of other sources", () => {
  it("of a recursive one holds every state but zero, or all with an increment", () => {
    for (const increment of [0, 4]) {
      const source = own({ recursive: { modulus: 31, multipliers: [7, -3], increment } });
      const states = wholeNumbers(increment === 0 ? 1 : 0, 31 * 31).map(
        (s) => `${Number(s) % 31},${Math.floor(Number(s) / 31)}`,
      );
      expect(cyclePoints(source, 4).sort()).toEqual(firstPoints(source, states, 4).sort());
    }
  });

  it("of xorshift32 and of any xorshift of 32 bits goes by the state", () => {
    const shifts = own({ xorshift: { bits: 32, shifts: [5, -9, 7] }, tuples: "strided 2" });
    const xorshift32 = parseSource("xorshift32").source;
    for (const source of [xorshift32, shifts]) {
      const kernels = instantiateKernels();
      const cycle = fullCycleOf(source);
      expect(cycle.states).toBe(2 ** 32 - 1);
      const stream = cycle.open(5, kernels);
      for (const first of [0, 250, 65_000, 123_456_789, 2 ** 32 - 1 - 300]) {
        stream.seek(first);
        const states = wholeNumbers(first + 1, first + 301);
        expect(points(stream, 300, kernels)).toEqual(firstPoints(source, states, 5));
      }
    }
  });

  it("has the same points however they are asked for", () => {
    for (const id of ["randu", "minstd-16807", "lcg-69069", "xorshift32"]) {
      const kernels = instantiateKernels();
      const cycle = fullCycleOf(parseSource(id).source);
      const stream = cycle.open(3, kernels);
      const first = cycle.states - 5000;
      stream.seek(first);
      const whole = points(stream, 5000, kernels);
      stream.seek(first);
      const parts = [
        ...points(stream, 1, kernels),
        ...points(stream, 2047, kernels),
        ...points(stream, 2952, kernels),
      ];
      expect(parts).toEqual(whole);
    }
  });
});

describe("a full cycle is refused", () => {
  const refusal = (source: Source): string => {
    try {
      fullCycleOf(source);
    } catch (error) {
      if (error instanceof RangeError) return error.message;
    }
    return "not refused";
  };

  it("where there are too many states, with their number and the limit", () => {
    expect(refusal(parseSource("drand48").source)).toBe(
      'source "drand48": it has 281,474,976,710,656 starting states, and a full cycle goes through at most 4,294,967,296; a study measures its bias over replicates instead',
    );
    expect(refusal(parseSource("mt19937").source)).toBe(
      'source "mt19937": its period is 2^19937 − 1, and a full cycle goes through at most 4,294,967,296 states; a study measures its bias over replicates instead',
    );
  });

  it("where there are none", () => {
    expect(refusal(parseSource("sobol").source)).toBe(
      'source "sobol": it has no starting states that could all be gone through; a study measures its bias over replicates instead',
    );
  });

  it("where they are not what replicates begin at", () => {
    const map = { congruential: { modulus: 1024, multiplier: 5, increment: 1 } };
    expect(refusal(own({ ...map, seeding: { published: { base: 1, stride: 1 } } }))).toMatch(
      /^source "invented": a full cycle averages over every state, and this source begins at given ones \(seeds 1, 2, 3, …\); leave its "seeding" out$/,
    );
    expect(refusal(own({ ...map, tuples: "per-coordinate" }))).toBe(
      'source "invented": with one stream per coordinate the combinations of states are too many for a full cycle; expected tuples "successive" or "strided k"',
    );
    expect(refusal(own({ congruential: { modulus: 1024, multiplier: 6, increment: 1 } }))).toBe(
      'source "invented": multiplier 6 and modulus 1024 have a common factor, so a run leaves some of its states for ever, and an average over all states is not one over its points',
    );
    expect(refusal(own({ recursive: { modulus: 32, multipliers: [7, 6] } }))).toBe(
      'source "invented": the last multiplier 6 and modulus 32 have a common factor, so a run leaves some of its states for ever, and an average over all states is not one over its points',
    );
  });
});

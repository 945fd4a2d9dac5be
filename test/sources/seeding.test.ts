// Published seeds, one given state, and coordinates in single precision, for sources of the user's own.
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";

const house = { modulus: "2^31", multiplier: 65539, increment: 0 };

interface Opened {
  readonly points: number[];
  readonly endpoints: number | undefined;
}

/** The first `n` points of `replicate`, one after the other. */
function open(spec: SourceSpec, replicate: number, n = 20, dimension = 3, state?: string): Opened {
  const kernels = instantiateKernels();
  const request = { dimension, n, key: null, replicate, ...(state === undefined ? {} : { state }) };
  const stream = parseSource(spec).open(request, kernels);
  const stride = Math.ceil(n / 8) * 8;
  const pointer = kernels.arena.allocate(stride * dimension * 8);
  stream.fill(pointer, stride, n);
  const rows = kernels.f64(pointer, stride * dimension);
  const points = Array.from({ length: n * dimension }, (_, k) => {
    return rows[(k % dimension) * stride + Math.floor(k / dimension)] ?? NaN;
  });
  return { points, endpoints: stream.endpointsHit?.() };
}

function message(act: () => unknown): string {
  try {
    act();
  } catch (error) {
    if (error instanceof RangeError || error instanceof TypeError) return error.message;
    throw error;
  }
  return "no error";
}

describe("published seeds", () => {
  test("replicate r starts at seed base + r stride", () => {
    const spec = { name: "house", source: "mt19937", seeding: { published: { base: 5000, stride: 163 } } };
    for (const replicate of [0, 1, 3, 250]) {
      const state = String(5000 + 163 * replicate);
      expect(open(spec, replicate).points).toEqual(open("mt19937", 0, 20, 3, state).points);
    }
    expect(parseSource(spec).source.title).toBe("Mersenne twister MT19937, seeds 5000, 5163, 5326, …");
  });

  test("the plain word means seeds 1, 2, 3, ...", () => {
    const spec = { name: "house", source: "minstd-16807", seeding: "published" };
    expect(open(spec, 6).points).toEqual(open("minstd-16807", 0, 20, 3, "7").points);
  });

  test("one stream per coordinate takes the seeds from there on", () => {
    const spec = {
      name: "house",
      source: "mt19937",
      tuples: "per-coordinate",
      seeding: { published: { base: 10, stride: 3 } },
    };
    const { points } = open(spec, 2);
    for (const j of [0, 1, 2]) {
      const own = open("mt19937", 0, 20, 1, String(16 + j)).points;
      expect(points.filter((_, k) => k % 3 === j)).toEqual(own);
    }
    expect(message(() => parseSource(spec).source.replicateSupply?.(4, 8))).toBe(
      'source.seeding: expected a stride of at least 4 for source "house", whose 4 coordinates take one seed each, found 3',
    );
  });

  test("the seeds that there are are counted", () => {
    const supply = (stride: number, base = 1) =>
      parseSource({
        name: "house",
        congruential: { modulus: 1021, multiplier: 65 },
        seeding: { published: { base, stride } },
      }).source.replicateSupply?.(3, 8).count;
    // valid states of a multiplicative generator modulo 1021: 1 to 1020
    expect([supply(1), supply(10), supply(1019), supply(1020), supply(1, 1020)]).toEqual([
      1020, 102, 2, 1, 1,
    ]);
  });

  test.each([
    [
      { seeding: { published: { stride: 0 } } },
      "source.seeding.published.stride: expected a whole number from 1 to 18446744073709551615, found 0",
    ],
    [
      { seeding: "fixed" },
      'source.seeding: expected "uniform-state", "published" (seeds 1, 2, 3, …) or { published: { base: 1, stride: 1 } }, found "fixed"',
    ],
    [
      { seeding: { published: { bas: 1 } } },
      'source.seeding.published: unknown key "bas", did you mean "base"?; allowed are base, stride',
    ],
    [{ seeding: "published", state: 1 }, 'source.seeding: expected none beside a state, found "published"'],
    [{ state: -1 }, "source.state: expected a starting state in the source's published form, found -1"],
    [{ float32: 1 }, "source.float32: expected true or false, found 1"],
  ])("%j is refused", (written, expected) => {
    expect(message(() => parseSource({ name: "house", congruential: house, ...written }))).toBe(expected);
  });

  test("a source that does not start from one whole number refuses published seeds", () => {
    expect(message(() => parseSource({ name: "house", source: "sfc64", seeding: "published" }))).toBe(
      'state: expected four words "a,b,c,counter" below 2^64 for source "sfc64", found "1"',
    );
  });
});

describe("one given state", () => {
  const spec = { name: "house", source: "mt19937", state: 5489 };

  test("every opening gives the same points, and the choice says so", () => {
    const choice = parseSource(spec);
    expect(choice.deterministic).toBe(true);
    expect(choice.source.title).toBe("Mersenne twister MT19937, state 5489");
    expect(open(spec, 0).points).toEqual(open("mt19937", 0, 20, 3, "5489").points);
    expect(open(spec, 9).points).toEqual(open(spec, 0).points);
  });

  test("the command line's own state comes before it", () => {
    expect(open(spec, 0, 20, 3, "1").points).toEqual(open("mt19937", 0, 20, 3, "1").points);
  });

  test("it is checked when the mapping is read", () => {
    expect(message(() => parseSource({ ...spec, state: "4294967296" }))).toBe(
      'state: expected a seed from 0 to 4294967295, or 2 to 624 of them as a key, for source "mt19937", found "4294967296"',
    );
  });
});

describe("single precision", () => {
  test("coordinates are rounded to binary32, and those that become 1 are counted", () => {
    // x + 1 mod 2^31 from 2^31 - 101 on: (k + 1/2) / 2^31 rounds to 1 where it is above 1 - 2^-25 (half of the last place)
    const spec = {
      name: "house",
      congruential: { modulus: "2^31", multiplier: 1, increment: 1 },
      state: "2147483547",
      float32: true,
    };
    const { points, endpoints } = open(spec, 0, 90, 1);
    const exact = open({ ...spec, float32: false }, 0, 90, 1).points;
    expect(points).toEqual(exact.map(Math.fround));
    const expected = exact.filter((u) => u > 1 - 2 ** -25).length;
    expect(expected).toBeGreaterThan(40);
    expect(endpoints).toBe(expected);
    expect(points.filter((u) => u === 1)).toHaveLength(expected);
  });

  test("the left endpoint counts its zeros; other streams have none to count", () => {
    const spec = {
      name: "house",
      congruential: { modulus: 16, multiplier: 5, increment: 3 },
      endpoint: "left",
      state: 0,
    };
    expect(open(spec, 0, 32, 1).endpoints).toBe(2);
    expect(open({ ...spec, endpoint: "middle" }, 0, 32, 1).endpoints).toBeUndefined();
  });
});

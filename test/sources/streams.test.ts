// Independent streams: where they begin, what is said of them, and what is refused.
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { parseSource } from "../../src/sources/choice.js";
import { Key } from "../../src/sources/key.js";
import { planStream, streamKey } from "../../src/sources/streams.js";

function plan(id: string, index: number, count: number, outputs = 1000n, state = false) {
  return planStream({ source: parseSource(id).source, index, count, outputs, state });
}

function message(act: () => unknown): string {
  try {
    act();
  } catch (error) {
    if (error instanceof RangeError) return error.message;
    throw error;
  }
  return "no error";
}

function points(id: string, jump?: bigint): number[] {
  const kernels = instantiateKernels();
  const request = { dimension: 1, n: 16, key: new Key("streams"), ...(jump === undefined ? {} : { jump }) };
  const stream = parseSource(id).open(request, kernels);
  const pointer = kernels.arena.allocate(16 * 8);
  stream.fill(pointer, 16, 16);
  return [...kernels.f64(pointer, 16)];
}

describe("streams by jump", () => {
  test("stream k begins k - 1 times 2^64 outputs into the sequence", () => {
    expect(plan("xoshiro256++", 3, 8)).toEqual({
      jump: 1n << 65n,
      note: "stream 3 of 8: xoshiro256++ begins 2 times 2^64 outputs into its sequence; no two streams share an output",
    });
    expect(plan("philox4x32", 1, 2).jump).toBe(0n);
  });

  test("a short period is shared out in odd distances", () => {
    // RANDU's period is 2^29; a quarter of it is even
    expect(plan("randu", 4, 4)).toEqual({
      jump: 3n * (2n ** 27n - 1n),
      note: "stream 4 of 4: randu begins 3 times 134217727 outputs into its sequence; no two streams share an output; distant streams of a congruential generator are correlated",
    });
  });

  test("a jump is as many outputs passed over", () => {
    for (const id of ["xoshiro256++", "randu", "mrg32k3a", "philox4x32", "pcg64"]) {
      expect(points(id, 5n).slice(0, 11)).toEqual(points(id).slice(5));
    }
  });

  test("streams longer than their room are refused", () => {
    expect(message(() => plan("randu", 1, 4, 2n ** 27n))).toBe(
      'stream: 4 streams of source "randu" have room for 134217727 outputs each, found 134217728; take fewer streams or points',
    );
  });
});

describe("streams by key", () => {
  test("each has a state of its own, and the probability of an overlap is said", () => {
    // N^2 L / period = 64 x 10^6 / (2^19937 - 1): log10 = 7.81 - 6001.64
    expect(plan("mt19937", 2, 8, 1_000_000n)).toEqual({
      jump: null,
      note: "stream 2 of 8: mt19937 starts each stream from a keyed state; the probability that two of them overlap within 1000000 outputs is below 1e-5993",
    });
    const key = new Key("streams");
    expect(streamKey(key, 1, 8).text).not.toBe(streamKey(key, 2, 8).text);
  });

  test("where the period is not known, so it is said", () => {
    expect(plan("sfc64", 1, 2).note).toContain("is not known, as its period is not");
  });

  test("a given state has no streams beside it", () => {
    expect(message(() => plan("mt19937", 1, 2, 10n, true))).toBe(
      'stream: source "mt19937" cannot jump, so its streams start from keys, found a state; leave the state out',
    );
  });
});

test("other sources have none", () => {
  expect(message(() => plan("sobol+owen", 1, 2))).toBe(
    'stream: expected a pseudo-random source for streams, found "sobol"; take another --seed for other points',
  );
});

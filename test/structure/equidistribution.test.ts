/** Dimensions of equidistribution against counting all states, and against ranks. */
import { describe, expect, test } from "vitest";
import { parseSource } from "../../src/sources/choice.js";
import { Key } from "../../src/sources/key.js";
import { isPseudoRandom } from "../../src/sources/pseudo-random.js";
import { findSource, sourceIds } from "../../src/sources/registry.js";
import { binaryPeriod } from "../../src/structure/binary-period.js";
import { equidistribution } from "../../src/structure/equidistribution.js";

interface Small {
  readonly stateBits: number;
  readonly width: number;
  readonly step: (state: number) => number;
  readonly output: (state: number) => number;
}

/** Random linear maps: rows of step and output as masks, from a fixed sequence. */
function random(stateBits: number, width: number, seed: number): Small {
  let x = seed;
  const next = (): number => {
    x = (Math.imul(x, 1664525) + 1013904223) >>> 0;
    return x >>> (32 - stateBits);
  };
  const map = (rows: readonly number[]) => (state: number) =>
    rows.reduce((word, mask, k) => word | (ones(mask & state) << k), 0);
  return {
    stateBits,
    width,
    step: map(Array.from({ length: stateBits }, next)),
    output: map(Array.from({ length: width }, next)),
  };
}

function ones(word: number): number {
  return [...word.toString(2)].filter((digit) => digit === "1").length % 2;
}

/** k(v) by definition: how often each tuple comes, over all states. */
function counted({ stateBits, width, step, output }: Small): number[] {
  return Array.from({ length: width }, (_, k) => {
    const v = k + 1;
    let t = 0;
    while (evenly(t + 1, v)) t++;
    return t;
  });
  function evenly(t: number, v: number): boolean {
    if (t * v > stateBits) return false;
    const counts = new Map<number, number>();
    for (let start = 0; start < 2 ** stateBits; start++) {
      let [state, tuple] = [start, 0];
      for (let j = 0; j < t; j++) {
        tuple = tuple * 2 ** v + (output(state) >>> (width - v));
        state = step(state);
      }
      counts.set(tuple, (counts.get(tuple) ?? 0) + 1);
    }
    return counts.size === 2 ** (t * v);
  }
}

function outputsOf({ stateBits, step, output }: Small, start: number): bigint[] {
  let state = start;
  return Array.from({ length: 2 * stateBits }, () => {
    const word = BigInt(output(state));
    state = step(state);
    return word;
  });
}

test("random linear generators of 8 to 11 bits: as counting says", () => {
  let known = 0;
  for (let seed = 1; seed <= 60; seed++) {
    const generator = random(8 + (seed % 4), 2 + (seed % 5), seed);
    const found = equidistribution(outputsOf(generator, 1), generator.width, generator.stateBits);
    if (found === null) continue;
    known++;
    expect([seed, found.dimensions]).toEqual([seed, counted(generator)]);
  }
  expect(known).toBeGreaterThan(10);
});

/** Rank over GF(2) of the top v bits of t outputs as functions of the state bits. */
function rank(columns: readonly (readonly bigint[])[], t: number, v: number, width: number): number {
  const basis: bigint[] = [];
  let size = 0;
  for (let j = 0; j < t; j++) {
    for (let bit = 0; bit < v; bit++) {
      let row = columns.reduce(
        (sum, outputs, k) => sum | ((((outputs[j] ?? 0n) >> BigInt(width - 1 - bit)) & 1n) << BigInt(k)),
        0n,
      );
      for (const other of basis) if ((row ^ other) < row) row ^= other;
      if (row === 0n) continue;
      basis.push(row);
      basis.sort((a, b) => (a > b ? -1 : 1));
      size++;
    }
  }
  return size;
}

describe("ranks of sources on the shelf", () => {
  test.each([
    ["xorshift32", 32, 32],
    ["xorshift128", 128, 32],
    ["{ xorshift: { bits: 64, shifts: [13, -7, 17] } }", 64, 64],
  ])("%s", (id, stateBits, width) => {
    const spec = id.startsWith("{") ? { name: "own", xorshift: { bits: 64, shifts: [13, -7, 17] } } : id;
    const { source } = parseSource(spec);
    if (!isPseudoRandom(source)) throw new Error(`${id} has no recurrence`);
    const { recurrence } = source;
    const words = stateBits / width;
    const run = (state: readonly bigint[], count: number): bigint[] => {
      const stream = recurrence.integers(state);
      return Array.from({ length: count }, () => stream.next().value);
    };
    const columns = Array.from({ length: stateBits }, (_, k) =>
      run(
        Array.from({ length: words }, (_, w) => (Math.floor(k / width) === w ? 1n << BigInt(k % width) : 0n)),
        stateBits,
      ),
    );
    const start = Array.from({ length: words }, (_, w) => BigInt(w + 1));
    const found = equidistribution(run(start, 2 * stateBits), width, stateBits);
    for (const v of [1, 2, 3, 5, 6, 8, 13, 16, 21, 32]) {
      const t = found?.dimensions[v - 1] ?? NaN;
      expect([v, rank(columns, t, v, width)]).toEqual([v, t * v]);
      expect(rank(columns, t + 1, v, width)).toBeLessThan((t + 1) * v);
    }
  });
});

describe("periods of linear maps", () => {
  test("all shifts of a word of 8 bits: full where running says so", () => {
    let full = 0;
    for (let code = 0; code < 343; code++) {
      const [a, b, c] = [1 + (code % 7), 1 + (Math.floor(code / 7) % 7), 1 + Math.floor(code / 49)];
      const step = (x: number): number => {
        const y = x ^ ((x << a) & 255);
        const z = y ^ (y >>> b);
        return z ^ ((z << c) & 255);
      };
      let [state, length] = [step(1), 1];
      for (; state !== 1 && length < 256; length++) state = step(state);
      const words = outputsOf({ stateBits: 8, width: 8, step, output: (x) => x }, 1);
      const { period } = binaryPeriod(words, 8, 1e6);
      expect([a, b, c, period]).toEqual([a, b, c, length === 255 ? 255n : null]);
      if (period !== null) full++;
    }
    expect(full).toBeGreaterThan(0);
  });
});

describe("sources that call themselves linear are so: words of a sum of states are sums of words", () => {
  const linear = sourceIds().filter((id) => {
    const source = findSource(id);
    return isPseudoRandom(source) && source.recurrence.binary !== undefined;
  });

  test.each(linear)("%s", (id) => {
    const source = findSource(id);
    if (!isPseudoRandom(source)) throw new Error(`${id} has no recurrence`);
    const { recurrence } = source;
    const [a, b] = ["a", "b"].map((key) => recurrence.stateFromKey(new Key(key)));
    // the last word of a long state is the place in it, the same in both
    const long = (a?.length ?? 0) > 4;
    const sum = a?.map((word, k) => (long && k === a.length - 1 ? word : word ^ (b?.[k] ?? 0n)));
    const [x, y, z] = [a, b, sum].map((state) => recurrence.binary?.words(state ?? []));
    for (let n = 0; n < 700; n++) {
      const [u, v, w] = [x, y, z].map((words) => words?.next().value ?? -1n);
      expect([n, w]).toEqual([n, (u ?? 0n) ^ (v ?? 0n)]);
    }
  });
});

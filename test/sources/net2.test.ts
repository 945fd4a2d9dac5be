import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import type { Randomisation } from "../../src/sources/contract.js";
import { Key } from "../../src/sources/key.js";
import { sobol } from "../../src/sources/sobol.js";
import { nodeBit, referenceHash, referenceOwen } from "./owen-reference.js";
import { digitsOf, pointsOf } from "./points.js";

const randomisations: Randomisation[] = ["digital-shift", "linear", "owen"];
const variants = [[], ...randomisations.map((name) => [name])].map((names) => ({
  names,
  title: ["sobol", ...names].join("+"),
}));

/** Digits of coordinates: words[i][j], 52 bits. */
function words(request: Parameters<typeof pointsOf>[1]): bigint[][] {
  return pointsOf(sobol, request).map((point) => point.map(digitsOf));
}

describe("fill", () => {
  it.each(variants)("any split and any start give the same points: $title", ({ names }) => {
    fc.assert(
      fc.property(
        fc.record({
          dimension: fc.integer({ min: 1, max: 12 }),
          first: fc.oneof(fc.nat(300), fc.integer({ min: 0, max: 2 ** 45 })),
          count: fc.integer({ min: 1, max: 150 }),
          block: fc.integer({ min: 1, max: 70 }),
          skip: fc.nat(60),
        }),
        ({ dimension, first, count, block, skip }) => {
          const common = { dimension, randomisations: names, key: "k" };
          const whole = pointsOf(sobol, { ...common, first, count: skip + count });
          expect(pointsOf(sobol, { ...common, first: first + skip, count, block })).toEqual(
            whole.slice(skip),
          );
        },
      ),
      { numRuns: 60, seed: 7 },
    );
  });

  it("equals the generating matrices times the Gray code of the index (BigInt)", () => {
    const { matrices, order } = sobol.generatingMatrices(40, 2 ** 52);
    expect(order).toBe("gray");
    fc.assert(
      fc.property(fc.bigInt({ min: 0n, max: 2n ** 52n - 1n }), fc.nat(39), (index, j) => {
        const gray = index ^ (index >> 1n);
        const matrix = matrices[j];
        if (matrix === undefined) throw new Error("missing matrix");
        let expected = 0n;
        for (let row = 0; row < 52; row++) {
          let digit = 0;
          for (let column = 0; column < 52; column++) {
            digit ^= matrix.get(row, column) & Number((gray >> BigInt(column)) & 1n);
          }
          expected = (expected << 1n) | BigInt(digit);
        }
        const point = words({ dimension: 40, first: Number(index), count: 1 })[0];
        expect(point?.[j]).toBe(expected);
      }),
      { numRuns: 60, seed: 8 },
    );
  });

  it("refuses what cannot be opened, with what is allowed", () => {
    const kernels = instantiateKernels();
    const open = (dimension: number, names: Randomisation[], key: Key | null) => () =>
      sobol.open({ dimension, n: 8, randomisations: names, key }, kernels);
    expect(open(21_202, [], null)).toThrow(
      'dimension: expected an integer from 1 to 21201 for source "sobol", found 21202',
    );
    expect(open(2, ["shift"], new Key("k"))).toThrow(
      'source: "sobol" does not take "shift"; expected "sobol" or "sobol+digital-shift", "sobol+linear", "sobol+owen"',
    );
    expect(open(2, ["owen"], null)).toThrow('source "sobol+owen" cannot be opened without a key');
    const stream = sobol.open({ dimension: 1, n: 8, randomisations: [], key: null }, kernels);
    expect(() => stream.seek?.(-1)).toThrow(RangeError);
    expect(() => stream.seek?.(2 ** 53)).toThrow(RangeError);
  });
});

describe("digital-shift and linear", () => {
  it("digital-shift xors one word per coordinate", () => {
    const plain = words({ dimension: 5, count: 64 });
    const shifted = words({ dimension: 5, count: 64, randomisations: ["digital-shift"], key: "a" });
    const shift = shifted[0] ?? [];
    expect(new Set(shift).size).toBe(5);
    expect(shifted).toEqual(plain.map((point) => point.map((k, j) => k ^ (shift[j] ?? 0n))));
  });

  it("linear is an affine map of the digits that keeps every prefix", () => {
    const plain = words({ dimension: 3, count: 512 });
    const scrambled = words({ dimension: 3, count: 512, randomisations: ["linear"], key: "b" });
    const images = [0, 1, 2].map(
      (j) => new Map(plain.map((point, i) => [point[j], scrambled[i]?.[j] ?? 0n])),
    );
    for (const image of images) {
      const origin = image.get(0n) ?? 0n;
      for (const [a, fa] of image) {
        for (const [b, fb] of [...image].slice(0, 20)) {
          if (a === undefined || b === undefined) continue;
          const sum = image.get(a ^ b);
          if (sum !== undefined) expect(sum).toBe(fa ^ fb ^ origin);
          expect(sharedDigits(fa, fb)).toBe(sharedDigits(a, b));
        }
      }
    }
  });
});

/** How many leading digits two words of 52 digits share. */
function sharedDigits(a: bigint, b: bigint): number {
  return 52 - (a === b ? 0 : (a ^ b).toString(2).length);
}

describe("owen", () => {
  const key = "owen reference";
  const dimension = 6;
  const keyWords = new Key(key).derive("owen").words32(18 * dimension);
  const keysOf = (j: number) => keyWords.subarray(18 * j, 18 * (j + 1));

  it("equals the scrambling written out node by node (BigInt)", () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 2 ** 52 - 40 }), (first) => {
        const plain = words({ dimension, first, count: 37 });
        const scrambled = words({ dimension, first, count: 37, randomisations: ["owen"], key });
        expect(scrambled).toEqual(plain.map((point) => point.map((k, j) => referenceOwen(k, keysOf(j)))));
      }),
      { numRuns: 25, seed: 9 },
    );
  });

  it("keeps prefixes: two points share exactly as many digits as before", () => {
    const plain = words({ dimension, count: 1024 });
    const scrambled = words({ dimension, count: 1024, randomisations: ["owen"], key: "nested" });
    for (let j = 0; j < dimension; j++) {
      for (let i = 0; i < 1024; i += 7) {
        for (let k = 0; k < i; k += 5) {
          const before = sharedDigits(plain[i]?.[j] ?? 0n, plain[k]?.[j] ?? 0n);
          expect(sharedDigits(scrambled[i]?.[j] ?? 0n, scrambled[k]?.[j] ?? 0n)).toBe(before);
        }
      }
    }
  });

  it("the kernel's hash is lowbias32 behind a round with two key words", () => {
    const kernels = instantiateKernels();
    const pointer = kernels.arena.allocate(8);
    const word = fc.nat(0xffffffff);
    fc.assert(
      fc.property(word, word, word, (prefix, k0, k1) => {
        kernels.u32(pointer, 2).set([k0, k1]);
        expect(kernels.exports.owenHash(prefix, pointer) >>> 0).toBe(referenceHash(prefix, k0, k1));
      }),
      { seed: 10 },
    );
  });

  it("a word is a one-to-one code of the functions of its 15 nodes", () => {
    const paths = [0, 1, 2, 3].flatMap((depth) =>
      Array.from({ length: 2 ** depth }, (_, at) => Array.from({ length: depth }, (__, q) => (at >> q) & 1)),
    );
    expect(paths).toHaveLength(15);
    // Linear in the word, so it is one to one when the images of the 15 used bits are independent.
    const used = Array.from({ length: 32 }, (_, bit) => bit).filter((bit) => (0x1111337f >>> bit) & 1);
    const basis: number[] = [];
    for (const bit of used) {
      let image = paths.reduce((sum, path, at) => sum | (nodeBit(2 ** bit, path) << at), 0);
      for (const known of basis) image = Math.min(image, image ^ known);
      expect(image).not.toBe(0);
      basis.push(image);
    }
    expect(basis).toHaveLength(15);
  });
});

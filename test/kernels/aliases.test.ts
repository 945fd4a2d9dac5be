import fc from "fast-check";
import { expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";

interface Wave {
  readonly phase: number;
  readonly indices: readonly number[];
  readonly entries: readonly number[];
}

const DIMENSION = 4;

/** Sums by the kernel, the points handed over in blocks of `block`. */
function sums(
  points: readonly number[][],
  values: readonly number[],
  waves: readonly Wave[],
  block: number,
): number[] {
  const kernels = instantiateKernels();
  const table = waves.flatMap(({ phase, indices, entries }) => [
    phase,
    indices.length,
    ...indices.flatMap((index, k) => [index, entries[k] ?? 0]),
  ]);
  const [x, f, t, out] = [block * DIMENSION, block, table.length, waves.length].map((length) =>
    kernels.arena.allocate(length * 8),
  ) as [number, number, number, number];
  kernels.f64(t, table.length).set(table);
  kernels.f64(out, waves.length).fill(0);
  for (let begin = 0; begin < points.length; begin += block) {
    const count = Math.min(block, points.length - begin);
    const rows = kernels.f64(x, block * DIMENSION);
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < DIMENSION; j++) rows[j * block + i] = points[begin + i]?.[j] ?? 0;
    }
    kernels.f64(f, count).set(values.slice(begin, begin + count));
    kernels.exports.aliasSums(x, block, count, f, 0.25, t, waves.length, out);
  }
  return [...kernels.f64(out, waves.length)];
}

const wave = fc.record({
  phase: fc.double({ min: 0, max: 1, noNaN: true }),
  indices: fc.uniqueArray(fc.integer({ min: 0, max: DIMENSION - 1 }), { minLength: 1, maxLength: DIMENSION }),
  entries: fc.array(fc.integer({ min: -1000, max: 1000 }), { minLength: DIMENSION, maxLength: DIMENSION }),
});
const unit = fc.double({ min: 0, max: 1, noNaN: true });

test("sums of value times wave are those of the platform's cosine", () => {
  const input = fc.record({
    waves: fc.array(wave, { minLength: 1, maxLength: 5 }),
    points: fc.array(fc.array(unit, { minLength: DIMENSION, maxLength: DIMENSION }), {
      minLength: 2,
      maxLength: 40,
    }),
  });
  fc.assert(
    fc.property(input, ({ waves, points }) => {
      const even = points.slice(0, 2 * Math.floor(points.length / 2));
      const values = even.map((_, i) => Math.sin(i));
      const found = sums(even, values, waves, 64);
      waves.forEach(({ phase, indices, entries }, k) => {
        const terms = even.map((u, i) => {
          const turns = indices.reduce((sum, index, e) => sum + (entries[e] ?? 0) * (u[index] ?? 0), -phase);
          return ((values[i] ?? 0) - 0.25) * Math.cos(2 * Math.PI * (turns - Math.round(turns)));
        });
        // 40 terms, turns up to 4000 with a rounding of 2^-41
        expect(found[k]).toBeCloseTo(
          terms.reduce((sum, term) => sum + term, 0),
          9,
        );
      });
    }),
    { numRuns: 50 },
  );
});

test("the size of blocks changes no bit", () => {
  const points = Array.from({ length: 512 }, (_, i) =>
    Array.from({ length: DIMENSION }, (__, j) => (i * (j + 7) * 0.618) % 1),
  );
  const values = points.map((_, i) => Math.cos(i));
  const waves = [{ phase: 0.3, indices: [0, 1, 3], entries: [9, -6, 1] }];
  expect(sums(points, values, waves, 64)).toEqual(sums(points, values, waves, 512));
});

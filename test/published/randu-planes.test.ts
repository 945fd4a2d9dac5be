/**
 * G. Marsaglia, "Random numbers fall mainly in the planes", Proceedings of the National Academy of Sciences 61 (1968)
 * 25-28: all triples of successive RANDU outputs lie on 15 planes, since 9 x(i) - 6 x(i+1) + x(i+2) = 0 mod 2^31.
 */
import { expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { parseSource } from "../../src/sources/choice.js";
import { makeKey } from "../../src/sources/key.js";

/** The values that 9 u - 6 v + w takes over triples of several streams. */
function combinations(id: string): Set<number> {
  const kernels = instantiateKernels();
  const points = 8192;
  const pointer = kernels.arena.allocate(points * 3 * 8);
  const found = new Set<number>();
  for (let replicate = 0; replicate < 4; replicate++) {
    const key = makeKey({ seed: 1, purpose: "points", problem: "planes", source: id, replicate });
    parseSource(id).open({ dimension: 3, n: points, key }, kernels).fill(pointer, points, points);
    const rows = kernels.f64(pointer, points * 3);
    for (let i = 0; i < points; i++) {
      found.add(9 * (rows[i] ?? NaN) - 6 * (rows[points + i] ?? NaN) + (rows[2 * points + i] ?? NaN));
    }
  }
  return found;
}

test("randu: 9 u - 6 v + w is one of the 15 whole numbers from -5 to 9 on every triple", () => {
  const values = [...combinations("randu")].sort((a, b) => a - b);
  expect(values).toEqual(Array.from({ length: 15 }, (_, k) => k - 5));
});

test("philox4x32: the same combination takes as many values as there are triples", () => {
  expect(combinations("philox4x32").size).toBe(4 * 8192);
});

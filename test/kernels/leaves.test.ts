// Leaf sums: the fixed order makes a cut leaf equal to one padded with zeros; non-finite values are found, not averaged.
import { describe, expect, it } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";

const kernels = instantiateKernels();
const STRIDE = 256;
const values = kernels.arena.allocate(2 * STRIDE * 8);
const out = kernels.arena.allocate(64 * 8);

function fill(count: number, at: (i: number) => number, channel = 0): void {
  const view = kernels.f64(values, 2 * STRIDE);
  for (let i = 0; i < count; i++) view[channel * STRIDE + i] = at(i);
}

describe("leafMoments", () => {
  it("gives sums and centred products of two channels", () => {
    fill(64, (i) => i + 1);
    fill(64, (i) => (i + 1) ** 2, 1);
    expect(kernels.exports.leafMoments(values, STRIDE, 2, 64, out)).toBe(-1);
    // Sums of the first 64 numbers, squares, cubes and fourth powers (Faulhaber); products = raw - sum * sum / 64.
    const [s1, s2, s3, s4] = [2080, 89440, 4326400, 223224352] as const;
    expect([...kernels.f64(out, 5)]).toEqual([
      s1,
      s2,
      s2 - (s1 * s1) / 64,
      s3 - (s1 * s2) / 64,
      s4 - (s2 * s2) / 64,
    ]);
  });

  it("treats a cut leaf as padded with zeros, to the bit", () => {
    for (const count of [1, 2, 7, 8, 9, 33, 63]) {
      fill(256, (i) => (i < count ? Math.sin(i + 1) * 10 ** (i % 7) : 0));
      kernels.exports.leafMoments(values, STRIDE, 1, 64, out);
      const padded = kernels.f64(out, 1)[0];
      fill(256, (i) => (i < count ? Math.sin(i + 1) * 10 ** (i % 7) : Number.NaN));
      expect(kernels.exports.leafMoments(values, STRIDE, 1, count, out)).toBe(-1);
      expect(kernels.f64(out, 1)[0]).toBe(padded);
    }
  });

  it("names the first point with a non-finite value and counts them", () => {
    fill(256, () => 1);
    const view = kernels.f64(values, 2 * STRIDE);
    view[70] = Number.POSITIVE_INFINITY;
    view[71] = Number.NEGATIVE_INFINITY;
    view[200] = Number.NaN;
    expect(kernels.exports.leafMoments(values, STRIDE, 1, 256, out)).toBe(70);
    expect(kernels.exports.countNonFinite(values, STRIDE, 1, 256)).toBe(3);
    expect(kernels.exports.countNonFinite(values, STRIDE, 1, 200)).toBe(2);
  });
});

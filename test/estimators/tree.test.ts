// The summation tree: any split of the leaves gives the same bits, and the moments are right.
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { channelMean, channelVariance, type Moments } from "../../src/estimators/moments.js";
import { MomentsTree } from "../../src/estimators/tree.js";
import { instantiateKernels } from "../../src/kernels/instance.js";

const kernels = instantiateKernels();

function momentsOf(values: readonly number[]): Moments {
  const sum = values.reduce((a, b) => a + b, 0);
  const mean = sum / values.length;
  const products = values.reduce((a, v) => a + (v - mean) ** 2, 0);
  return { n: values.length, channels: 1, values: Float64Array.of(sum, products) };
}

/** A row of moments in kernel memory. */
function rowOf({ values }: Moments): number {
  const row = kernels.arena.allocate(values.byteLength);
  kernels.f64(row, values.length).set(values);
  return row;
}

const leaves = fc.array(
  fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 64, maxLength: 64 }),
  {
    minLength: 1,
    maxLength: 40,
  },
);

describe("merging moments", () => {
  it("gives mean and variance of the union, with products of two channels (two-pass sums as reference)", () => {
    // Invented numbers; the reference is the textbook two-pass formula.
    const a = Array.from({ length: 64 }, (_, i) => Math.sin(i));
    const b = [3, 9, 27];
    const two = (x: readonly number[], y: readonly number[]): Moments => {
      const mx = x.reduce((s, v) => s + v, 0) / x.length;
      const my = y.reduce((s, v) => s + v, 0) / y.length;
      const cross = (p: readonly number[], mp: number, q: readonly number[], mq: number) =>
        p.reduce((s, v, i) => s + (v - mp) * ((q[i] as number) - mq), 0);
      const values = [
        mx * x.length,
        my * y.length,
        cross(x, mx, x, mx),
        cross(x, mx, y, my),
        cross(y, my, y, my),
      ];
      return { n: x.length, channels: 2, values: Float64Array.from(values) };
    };
    const squares = (x: readonly number[]) => x.map((v) => v * v);
    const tree = new MomentsTree(kernels, 2);
    tree.push({ level: 0, index: 0, moments: two(a, squares(a)) });
    const merged = tree.total(rowOf(two(b, squares(b))), 3) as Moments;
    const whole = two([...a, ...b], squares([...a, ...b]));
    expect(merged.n).toBe(67);
    for (const [i, value] of whole.values.entries()) expect(merged.values[i]).toBeCloseTo(value, 9);
  });

  it("says nothing of the variance of one point", () => {
    expect(channelVariance(momentsOf([3]))).toBeNull();
    expect(channelMean(momentsOf([3]))).toBe(3);
  });
});

describe("the summation tree", () => {
  it("has the same bits however its leaves are split into ranges", () => {
    fc.assert(
      fc.property(leaves, fc.array(fc.nat(39), { maxLength: 6 }), (rows, cuts) => {
        const whole = new MomentsTree(kernels, 1);
        for (const [index, row] of rows.entries()) whole.push({ level: 0, index, moments: momentsOf(row) });
        const ends = [...new Set([...cuts.filter((c) => c > 0 && c < rows.length), rows.length])].sort(
          (x, y) => x - y,
        );
        const joined = new MomentsTree(kernels, 1);
        let from = 0;
        for (const to of ends) {
          const part = new MomentsTree(kernels, 1);
          for (let index = from; index < to; index++) {
            part.push({ level: 0, index, moments: momentsOf(rows[index] as number[]) });
          }
          for (const node of part.nodes()) joined.push(node);
          from = to;
        }
        expect(joined.total()?.values).toEqual(whole.total()?.values);
      }),
    );
  });

  it("keeps at most one node per level, so memory is logarithmic in n", () => {
    const tree = new MomentsTree(kernels, 1);
    for (let index = 0; index < 1000; index++) {
      tree.push({ level: 0, index, moments: { n: 64, channels: 1, values: Float64Array.of(index, 1) } });
    }
    // 1000 = 1111101000 in binary: six ones, six maximal nodes.
    expect(tree.nodes().map((node) => node.level)).toEqual([9, 8, 7, 6, 5, 3]);
    expect(tree.nodes()[0]?.moments.n).toBe(64 * 512);
    expect(tree.total()?.n).toBe(64_000);
    expect(tree.total()?.values[0]).toBe(499_500);
  });

  it("is the mean of all leaves and a cut one, and nothing when empty", () => {
    const tree = new MomentsTree(kernels, 1);
    expect(tree.total()).toBeNull();
    expect(tree.total(rowOf(momentsOf([6])), 1)?.values).toEqual(Float64Array.of(6, 0));
    tree.push({ level: 0, index: 0, moments: momentsOf(Array.from({ length: 64 }, () => 1)) });
    const total = tree.total(rowOf(momentsOf([66])), 1) as Moments;
    expect(channelMean(total)).toBe(2);
    // 64 ones and 66: mean 2, squared deviations 64 + 64^2.
    expect(channelVariance(total)).toBe((64 + 4096) / 64);
  });
});

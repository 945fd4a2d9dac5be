import { expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { parseSource } from "../../src/sources/choice.js";
import { isDigitalNet, netOfSource } from "../../src/structure/net.js";
import { walshPhases } from "../../src/structure/walsh.js";
import { walshVectors } from "../../src/structure/walsh-vectors.js";

test.each([
  ["sobol", 3, 16],
  ["niederreiter", 5, 64],
  ["faure", 3, 27],
])(
  "Walsh functions that %s in %i coordinates with %i points takes for constants are 1 on each of them",
  (id, dimension, n) => {
    const choice = parseSource(id);
    const { source } = choice;
    if (!isDigitalNet(source)) throw new Error("no net");
    const net = netOfSource(source, dimension, n);
    const vectors = walshVectors(net);
    expect(vectors.length).toBeGreaterThan(100);
    const kernels = instantiateKernels();
    const stride = Math.ceil(n / 8) * 8;
    const at = kernels.arena.allocate(stride * dimension * 8);
    choice.open({ dimension, n, key: null }, kernels).fill(at, stride, n);
    const rows = kernels.f64(at, stride * dimension);
    // digits of a number of base 3 beyond those of a double's 52 bits are rounding
    const deepest = net.base === 2 ? 52 : 24;
    for (const { indices, entries } of vectors) {
      if (entries.some((k) => k >= net.base ** deepest)) continue;
      const phases = walshPhases(net.base, { indices, k: entries }, rows, stride, n);
      // all alike: what stands behind the digits of a net (the middle of the last cell) is the same for every point
      expect(new Set(phases).size).toBe(1);
    }
  },
);

test("digits that no point shows stand in every coordinate, the first of them before most of what is longer", () => {
  const { source } = parseSource("sobol");
  if (!isDigitalNet(source)) throw new Error("no net");
  const vectors = walshVectors(netOfSource(source, 2, 16));
  for (const j of [0, 1]) expect(vectors.slice(0, 20)).toContainEqual({ indices: [j], entries: [16] });
});

/** Counter-based generators where a word of the counter wraps, and where the whole counter does. */
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { USUAL } from "../../src/sources/pseudo-random.js";
import { pseudoRandomSource } from "../published/generator-data.js";
import { coordinateOf, wordsOf } from "./oracle.js";

const chachaKey = "00112233445566778899aabbccddeeff".repeat(2);

/** Source and states whose next blocks cross a boundary. */
const crossings: Readonly<Record<string, readonly string[]>> = {
  philox4x32: [
    "fffffffd 0 0 0;1 2",
    "fffffffa ffffffff 0 0;1 2",
    "fffffffe ffffffff ffffffff 0;1 2",
    "fffffff9 ffffffff ffffffff ffffffff;1 2",
  ],
  philox4x64: [
    "fffffffffffffffd 0 0 0;1 2",
    "fffffffffffffffe ffffffffffffffff ffffffffffffffff ffffffffffffffff;1 2",
  ],
  threefry4x64: [
    "ffffffffffffffff ffffffffffffffff 0 0;1 2 3 4",
    "fffffffffffffffe ffffffffffffffff ffffffffffffffff ffffffffffffffff;1 2 3 4",
  ],
  chacha8: [`${chachaKey};4294967294;${"0".repeat(24)}`, `${chachaKey};4294967293;ffffffff${"1".repeat(16)}`],
  chacha20: [`${chachaKey};4294967290;${"0".repeat(24)}`],
};

for (const [id, states] of Object.entries(crossings)) {
  describe(id, () => {
    test.each(states)("from %s", (state) => {
      const { recurrence, ...source } = pseudoRandomSource(id);
      const count = 203;
      const kernels = instantiateKernels();
      const row = kernels.arena.allocate(208 * 8);
      const request = { dimension: 1, n: count, randomisations: [], key: null, state };
      const stream = source.open(request, kernels);
      const start = recurrence.stateFromText(state);
      const words = wordsOf(recurrence, start);
      const expected = Array.from({ length: count }, () =>
        coordinateOf(words.next().value, recurrence, USUAL),
      );
      // in one go, and in pieces that cut blocks
      stream.fill(row, 208, count);
      expect([...kernels.f64(row, count)]).toEqual(expected);
      for (let index = 0; index < count; index += 29) {
        stream.seek?.(index);
        stream.fill(row, 208, Math.min(29, count - index));
        expect([...kernels.f64(row, Math.min(29, count - index))]).toEqual(expected.slice(index, index + 29));
      }
    });
  });
}

/** Known-answer blocks of the counter-based generators; where they come from stands in data/generators.json. */
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { USUAL } from "../../src/sources/pseudo-random.js";
import { coordinateOf } from "../sources/oracle.js";
import { data, pseudoRandomSource } from "./generator-data.js";

/** Source and the name of its blocks. */
const blocks: Readonly<Record<string, string>> = {
  philox4x32: "philox4x32-10",
  philox4x64: "philox4x64-10",
  threefry4x64: "threefry4x64-20",
};

for (const [id, name] of Object.entries(blocks)) {
  describe(id, () => {
    for (const { ctr, key, out } of data.known_answer_blocks.filter((block) => block.name === name)) {
      test(`counter ${ctr}, key ${key}`, () => {
        checkBlock(
          id,
          `${ctr};${key}`,
          out.split(" ").map((word) => BigInt(`0x${word}`)),
        );
      });
    }
  });
}

describe("chacha20", () => {
  for (const { name, key, counter, nonce, out_serialized: bytes } of data.known_answer_blocks) {
    if (nonce === undefined || bytes === undefined) continue;
    test(name, () => {
      const words = new Uint32Array(Uint8Array.from(Buffer.from(bytes, "hex")).buffer);
      checkBlock("chacha20", `${key};${counter};${nonce}`, [...words].map(BigInt));
    });
  }
});

/** The integers of a block and the coordinates that the kernel makes of them. */
function checkBlock(id: string, state: string, printed: readonly bigint[]): void {
  const source = pseudoRandomSource(id);
  const { recurrence } = source;
  const integers = source.openIntegers({ key: null, state });
  expect(printed.map(() => integers.next())).toEqual(printed);

  const words = recurrence.output.integers === 1 ? printed : joinPairs(printed);
  const kernels = instantiateKernels();
  const row = kernels.arena.allocate(16 * 8);
  const request = { dimension: 1, n: words.length, randomisations: [], key: null, state };
  source.open(request, kernels).fill(row, 8, words.length);
  const expected = words.map((word) => coordinateOf(word, recurrence, USUAL));
  expect([...kernels.f64(row, words.length)]).toEqual(expected);
}

/** 64-bit integers of 32-bit words, the first one low. */
function joinPairs(words: readonly bigint[]): bigint[] {
  return words.flatMap((word, k) => (k % 2 === 0 ? [((words[k + 1] ?? 0n) << 32n) | word] : []));
}

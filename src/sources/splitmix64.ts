/**
 * splitmix64: G. L. Steele, D. Lea and C. H. Flood, "Fast splittable pseudorandom number generators", Proceedings of
 * OOPSLA 2014, 453-472, with D. Stafford's variant 13 of the output mix. A counter in steps of the golden ratio whose
 * values are mixed. Good for: filling the states of other generators, any index at once. Bad at: every 64-bit value
 * appears exactly once in its period of 2^64, so a run of some 2^32 outputs lacks the repeats that chance would bring.
 *
 * Starting states: uniform below 2^64. The published form is the one word.
 */
import { pseudoRandom } from "./pseudo-random.js";
import { equalWords, parseWords } from "./published-state.js";

const SIZE = 1n << 64n;
const GOLDEN = 0x9e3779b97f4a7c15n;

export const splitMix64 = pseudoRandom({
  about: {
    id: "splitmix64",
    title: "splitmix64",
    citation:
      "G. L. Steele, D. Lea, C. H. Flood, Fast splittable pseudorandom number generators, Proceedings of OOPSLA 2014, 453-472",
    method: "counter-based",
    outputBits: 64,
    period: SIZE,
    knownStructure: null,
  },
  output: { modulus: SIZE, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: (key) => [...key.words64(1)],
  stateFromText: (text) =>
    parseWords(text, { id: "splitmix64", words: equalWords(1, SIZE), allowed: "a number below 2^64" }),
  kernel: (exports) => exports.fillSplitMix64,
  *integers([state = 0n]) {
    for (;;) {
      state = (state + GOLDEN) % SIZE;
      let z = ((state ^ (state >> 30n)) * 0xbf58476d1ce4e5b9n) % SIZE;
      z = ((z ^ (z >> 27n)) * 0x94d049bb133111ebn) % SIZE;
      yield z ^ (z >> 31n);
    }
  },
  advance: ([state = 0n], words) => [(state + words * GOLDEN) % SIZE],
});

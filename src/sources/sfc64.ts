/**
 * SFC64, "small fast counting": C. Doty-Humphrey (2010), published as source code. Three words mixed without
 * multiplication, and a counter that keeps every cycle at 2^64 outputs or more; the exact period is not known. Good
 * for: speed, sound output. Bad at: it cannot jump, and how far two streams are apart is a matter of chance.
 *
 * Starting states: a, b, c uniform, the counter 1, then twelve outputs dropped (the author's seeding). The published
 * form is the four words "a,b,c,counter", from which the next output is made.
 */
import { pseudoRandom, type State } from "./pseudo-random.js";
import { equalWords, parseWords } from "./published-state.js";

const SIZE = 1n << 64n;

/** Outputs that the author's seeding drops. */
const DROPPED = 12;

function step([a = 0n, b = 0n, c = 0n, counter = 0n]: State): { word: bigint; next: State } {
  const word = (a + b + counter) % SIZE;
  const turned = ((c << 24n) | (c >> 40n)) % SIZE;
  return {
    word,
    next: [b ^ (b >> 11n), (c + (c << 3n)) % SIZE, (turned + word) % SIZE, (counter + 1n) % SIZE],
  };
}

export const sfc64 = pseudoRandom({
  about: {
    id: "sfc64",
    title: "SFC64, small fast counting",
    citation: "C. Doty-Humphrey, small fast counting generator, published as source code (2010)",
    method: "chaotic with counter",
    outputBits: 64,
    period: null,
    knownStructure: null,
  },
  output: { modulus: SIZE, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: (key) => {
    let state: State = [...key.words64(3), 1n];
    for (let k = 0; k < DROPPED; k++) state = step(state).next;
    return state;
  },
  stateFromText: (text) =>
    parseWords(text, {
      id: "sfc64",
      words: equalWords(4, SIZE),
      allowed: 'four words "a,b,c,counter" below 2^64',
    }),
  kernel: (exports) => exports.fillSfc64,
  *integers(start) {
    for (let state = start; ;) {
      const { word, next } = step(state);
      yield word;
      state = next;
    }
  },
});

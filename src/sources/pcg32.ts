/**
 * PCG32 (XSH-RR 64/32): M. E. O'Neill, "PCG: a family of simple fast space-efficient statistically good algorithms for
 * random number generation", Harvey Mudd College, HMC-CS-2014-0905 (2014). A congruential recurrence modulo 2^64; the
 * output is taken from the state before the step: its high bits folded, and turned by the top five. Each coordinate is
 * one 32-bit output. Good for: small jobs, jumps anywhere. Bad at: two streams that differ in the increment alone are
 * correlated; 32 bits of resolution.
 *
 * Starting states: state uniform below 2^64, increment uniform over the odd numbers. The published form is
 * "initstate,initseq" of the author's seeding.
 */
import { affinePower, applyAffine, type Affine } from "../numeric/affine.js";
import { pseudoRandom, type State } from "./pseudo-random.js";
import { equalWords, parseWords } from "./published-state.js";

const MULTIPLIER = 6364136223846793005n;
const SIZE = 1n << 64n;

function mapOf([, increment = 0n]: State): Affine {
  return { multiplier: MULTIPLIER, increment, modulus: SIZE };
}

export const pcg32 = pseudoRandom({
  about: {
    id: "pcg32",
    title: "PCG32 (XSH-RR 64/32)",
    citation:
      "M. E. O'Neill, PCG: a family of simple fast space-efficient statistically good algorithms for random number generation, Harvey Mudd College, HMC-CS-2014-0905 (2014)",
    method: "permuted congruential",
    outputBits: 32,
    period: SIZE,
    knownStructure: null,
  },
  output: { modulus: 1n << 32n, bytes: 4, zeroless: false, integers: 1 },
  stateFromKey: (key) => {
    const [state = 0n, increment = 0n] = key.words64(2);
    return [state, increment | 1n];
  },
  stateFromText: (text) => {
    const allowed = `"initstate,initseq", two numbers below 2^64, like "42,54",`;
    const form = { id: "pcg32", words: equalWords(2, SIZE), allowed };
    const [initstate = 0n, initseq = 0n] = parseWords(text, form);
    const increment = (2n * initseq + 1n) % SIZE;
    return [applyAffine(mapOf([0n, increment]), (increment + initstate) % SIZE), increment];
  },
  kernel: (exports) => exports.fillPcg32,
  *integers(start) {
    const map = mapOf(start);
    for (let [state = 0n] = start; ; state = applyAffine(map, state)) {
      const folded = (((state >> 18n) ^ state) >> 27n) & 0xffffffffn;
      const turn = state >> 59n;
      yield ((folded >> turn) | (folded << (32n - turn))) & 0xffffffffn;
    }
  },
  advance: (state, words) => [applyAffine(affinePower(mapOf(state), words), state[0] ?? 0n), state[1] ?? 0n],
});

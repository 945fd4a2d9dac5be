/**
 * PCG64 (XSL-RR 128/64): M. E. O'Neill, "PCG: a family of simple fast space-efficient statistically good algorithms
 * for random number generation", Harvey Mudd College, HMC-CS-2014-0905 (2014). A congruential recurrence modulo 2^128
 * whose halves are folded together and rotated by the top six bits; each output is taken from the state after the
 * step. Good for: sound streams that can jump anywhere. Bad at: two streams of one multiplier whose increments differ
 * are not independent by construction (their states differ by an affine map); the key sets state and increment both.
 *
 * Starting states: state uniform below 2^128, increment uniform over the odd numbers below 2^128. The published form
 * is "initstate,initseq" of the author's seeding, or "state=...,inc=..." for the words themselves.
 */
import { affinePower, applyAffine } from "../numeric/affine.js";
import { fromKey, fromText, mapOf, pack, stateOf } from "./pcg64-state.js";
import { pseudoRandom } from "./pseudo-random.js";

const MULTIPLIER = 47026247687942121848144207491837523525n;
const WORD = (1n << 64n) - 1n;

export const pcg64 = pseudoRandom({
  about: {
    id: "pcg64",
    title: "PCG64 (XSL-RR 128/64)",
    citation:
      "M. E. O'Neill, PCG: a family of simple fast space-efficient statistically good algorithms for random number generation, Harvey Mudd College, HMC-CS-2014-0905 (2014)",
    method: "permuted congruential",
    outputBits: 64,
    period: 1n << 128n,
    knownStructure: null,
  },
  output: { modulus: 1n << 64n, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: fromKey,
  stateFromText: (text) => fromText(text, "pcg64", MULTIPLIER),
  kernel: (exports) => exports.fillPcg64,
  *integers(start) {
    const map = mapOf(start, MULTIPLIER);
    for (let state = applyAffine(map, stateOf(start)); ; state = applyAffine(map, state)) {
      const folded = (state >> 64n) ^ (state & WORD);
      const turn = state >> 122n;
      yield ((folded >> turn) | (folded << (64n - turn))) & WORD;
    }
  },
  advance: (state, words) => {
    const map = mapOf(state, MULTIPLIER);
    return pack(applyAffine(affinePower(map, words), stateOf(state)), map.increment);
  },
});

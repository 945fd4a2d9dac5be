/**
 * PCG64 DXSM: M. E. O'Neill's PCG family (HMC-CS-2014-0905, 2014) with the output function "double xorshift multiply"
 * and a 64-bit multiplier, added by the same author in 2019. The output is taken from the state before the step. Good
 * for: the same as PCG64, with an output that mixes better where two streams share their low state bits. Bad at:
 * nothing known here.
 *
 * Starting states as for PCG64.
 */
import { affinePower, applyAffine } from "../numeric/affine.js";
import { fromKey, fromText, mapOf, pack, stateOf } from "./pcg64-state.js";
import { pseudoRandom } from "./pseudo-random.js";

const MULTIPLIER = 0xda942042e4dd58b5n;
const WORD = (1n << 64n) - 1n;

export const pcg64Dxsm = pseudoRandom({
  about: {
    id: "pcg64-dxsm",
    title: "PCG64 DXSM",
    citation:
      "M. E. O'Neill, PCG: a family of simple fast space-efficient statistically good algorithms for random number generation, Harvey Mudd College, HMC-CS-2014-0905 (2014); output function of 2019",
    method: "permuted congruential",
    outputBits: 64,
    period: 1n << 128n,
    knownStructure: null,
  },
  output: { modulus: 1n << 64n, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: fromKey,
  stateFromText: (text) => fromText(text, "pcg64-dxsm", MULTIPLIER),
  kernel: (exports) => exports.fillPcg64Dxsm,
  *integers(start) {
    const map = mapOf(start, MULTIPLIER);
    for (let state = stateOf(start); ; state = applyAffine(map, state)) {
      let word = state >> 64n;
      word ^= word >> 32n;
      word = (word * MULTIPLIER) & WORD;
      word ^= word >> 48n;
      yield (word * ((state & WORD) | 1n)) & WORD;
    }
  },
  advance: (state, words) => {
    const map = mapOf(state, MULTIPLIER);
    return pack(applyAffine(affinePower(map, words), stateOf(state)), map.increment);
  },
});

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
import { affinePower, applyAffine, type Affine } from "../numeric/affine.js";
import { pseudoRandom, type State } from "./pseudo-random.js";

const MULTIPLIER = 47026247687942121848144207491837523525n;
const SIZE = 1n << 128n;
const WORD = (1n << 64n) - 1n;

function pack(state: bigint, increment: bigint): State {
  return [state & WORD, state >> 64n, increment & WORD, increment >> 64n];
}

function stateOf([low = 0n, high = 0n]: State): bigint {
  return (high << 64n) | low;
}

function mapOf([, , low = 0n, high = 0n]: State): Affine {
  return { multiplier: MULTIPLIER, increment: (high << 64n) | low, modulus: SIZE };
}

/** The author's seeding: from state 0 one step, add `initstate`, one more step. */
function seeded(initstate: bigint, initseq: bigint): State {
  const increment = (2n * initseq + 1n) % SIZE;
  const map = { multiplier: MULTIPLIER, increment, modulus: SIZE };
  return pack(applyAffine(map, (increment + initstate) % SIZE), increment);
}

function parse(text: string): State {
  const [, seed, sequence] = /^(\d+)\s*,\s*(\d+)$/.exec(text) ?? [];
  if (seed !== undefined && sequence !== undefined) {
    const [initstate, initseq] = [BigInt(seed), BigInt(sequence)];
    if (initstate < SIZE && initseq < SIZE) return seeded(initstate, initseq);
  }
  const [, words, inc] = /^state=(\d+)\s*,\s*inc=(\d+)$/.exec(text) ?? [];
  if (words !== undefined && inc !== undefined) {
    const [state, increment] = [BigInt(words), BigInt(inc)];
    if (state < SIZE && increment < SIZE && increment % 2n === 1n) return pack(state, increment);
  }
  throw new RangeError(
    `state: expected "initstate,initseq" or "state=...,inc=..." (inc odd), numbers below 2^128, for source "pcg64", found "${text}"`,
  );
}

export const pcg64 = pseudoRandom({
  about: {
    id: "pcg64",
    title: "PCG64 (XSL-RR 128/64)",
    citation:
      "M. E. O'Neill, PCG: a family of simple fast space-efficient statistically good algorithms for random number generation, Harvey Mudd College, HMC-CS-2014-0905 (2014)",
    method: "permuted congruential",
    outputBits: 64,
    period: SIZE,
    knownStructure: null,
  },
  output: { modulus: 1n << 64n, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: (key) => {
    const [a = 0n, b = 0n, c = 0n, d = 0n] = key.words64(4);
    return [a, b, c | 1n, d];
  },
  stateFromText: parse,
  kernel: (exports) => exports.fillPcg64,
  *integers(start) {
    const map = mapOf(start);
    for (let state = applyAffine(map, stateOf(start)); ; state = applyAffine(map, state)) {
      const folded = (state >> 64n) ^ (state & WORD);
      const turn = state >> 122n;
      yield ((folded >> turn) | (folded << (64n - turn))) & WORD;
    }
  },
  advance: (state, words) => {
    const map = mapOf(state);
    return pack(applyAffine(affinePower(map, words), stateOf(state)), map.increment);
  },
});

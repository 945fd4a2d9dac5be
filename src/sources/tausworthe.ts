/**
 * Combined Tausworthe generators: taus88, P. L'Ecuyer, "Maximally equidistributed combined Tausworthe generators",
 * Mathematics of Computation 65 (1996) 203-213; LFSR113, "Tables of maximally equidistributed combined LFSR
 * generators", ibid. 68 (1999) 261-269. Three and four short linear registers over GF(2), added bit by bit. Good for:
 * provable equidistribution in little space. Bad at: linearity over GF(2). Starting words must exceed 1, 7, 15 (and
 * 127): below that a register stays 0.
 */
import { f2Linear } from "./f2-linear.js";
import { pseudoRandom, type State } from "./pseudo-random.js";

const MASK = (1n << 32n) - 1n;

interface Register {
  readonly keep: bigint;
  readonly up: bigint;
  readonly across: bigint;
  readonly down: bigint;
}

function stepOf(registers: readonly Register[]): (state: State) => State {
  return (state) =>
    registers.map(({ keep, up, across, down }, k) => {
      const s = state[k] ?? 0n;
      return (((s & keep) << up) & MASK) ^ ((((s << across) & MASK) ^ s) >> down);
    });
}

function sum(state: State): bigint {
  return state.reduce((total, word) => total ^ word, 0n);
}

/** The product of 2^k - 1 over the registers' lengths, which have no common factor. */
function periodOf(...lengths: bigint[]): bigint {
  return lengths.reduce((product, length) => product * ((1n << length) - 1n), 1n);
}

export const taus88 = pseudoRandom(
  f2Linear({
    about: {
      id: "taus88",
      title: "Combined Tausworthe, taus88",
      citation:
        "P. L'Ecuyer, Maximally equidistributed combined Tausworthe generators, Mathematics of Computation 65 (1996) 203-213",
      method: "linear feedback",
      outputBits: 32,
      period: periodOf(31n, 29n, 28n),
      knownStructure: "linear over GF(2)",
    },
    words: 3,
    wordBits: 32,
    degree: 88,
    least: [2n, 8n, 16n],
    step: stepOf([
      { keep: 0xfffffffen, up: 12n, across: 13n, down: 19n },
      { keep: 0xfffffff8n, up: 4n, across: 2n, down: 25n },
      { keep: 0xfffffff0n, up: 17n, across: 3n, down: 11n },
    ]),
    output: sum,
    linear: "outputs",
    outputFrom: "after",
    kernel: (exports) => exports.fillTaus88,
  }),
);

export const lfsr113 = pseudoRandom(
  f2Linear({
    about: {
      id: "lfsr113",
      title: "Combined Tausworthe, LFSR113",
      citation:
        "P. L'Ecuyer, Tables of maximally equidistributed combined LFSR generators, Mathematics of Computation 68 (1999) 261-269",
      method: "linear feedback",
      outputBits: 32,
      period: periodOf(31n, 29n, 28n, 25n),
      knownStructure: "linear over GF(2)",
    },
    words: 4,
    wordBits: 32,
    degree: 113,
    least: [2n, 8n, 16n, 128n],
    step: stepOf([
      { keep: 0xfffffffen, up: 18n, across: 6n, down: 13n },
      { keep: 0xfffffff8n, up: 2n, across: 2n, down: 27n },
      { keep: 0xfffffff0n, up: 7n, across: 13n, down: 21n },
      { keep: 0xffffff80n, up: 13n, across: 3n, down: 12n },
    ]),
    output: sum,
    linear: "outputs",
    outputFrom: "after",
    kernel: (exports) => exports.fillLfsr113,
  }),
);

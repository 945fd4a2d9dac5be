/**
 * Multiply-with-carry and KISS: G. Marsaglia, postings to sci.stat.math and others of 20 January 1999 (`mwc`, `kiss99`) and
 * to comp.lang.c of 28 February 2009 (`kiss64`). Multiply-with-carry: x <- a x + carry, the carry kept; KISS adds a xorshift
 * and a congruential generator. Good for: being short to write and long in period. Bad at: the xorshift of `kiss99`, with the
 * shifts (17, 13, 5) of that posting, is not of full period (G. Rose, "KISS: a bit too simple", Cryptography and
 * Communications 10 (2018) 123-137), so how long a cycle is depends on the seed; `mwc` is two 16-bit halves side by side.
 *
 * Starting states: words uniform over those that do not stand still. The published form is the words: "z,w",
 * "z,w,jsr,jcong", "x,c,y,z".
 */
import type { FillWords, GeneratorExports } from "../kernels/generator-exports.js";
import { pseudoRandom, type PseudoRandomSource, type State } from "./pseudo-random.js";
import { parseWords, type WordRange } from "./published-state.js";

const MASK32 = (1n << 32n) - 1n;
const MASK64 = (1n << 64n) - 1n;

interface Member {
  readonly id: string;
  readonly title: string;
  readonly citation: string;
  readonly period: bigint | null;
  readonly knownStructure: string | null;
  readonly bits: 32 | 64;
  /** Ranges of the words; their ends are the states that stand still. */
  readonly words: readonly WordRange[];
  readonly form: string;
  readonly step: (state: State) => State;
  readonly output: (state: State) => bigint;
  readonly kernel: (exports: GeneratorExports) => FillWords;
}

function member({ bits, words, form, step, output, kernel, ...about }: Member): PseudoRandomSource {
  return pseudoRandom({
    about: { ...about, method: "multiply with carry", outputBits: bits },
    output: { modulus: 1n << BigInt(bits), bytes: bits === 32 ? 4 : 8, zeroless: false, integers: 1 },
    stateFromKey: (key) =>
      words.map(({ least, below }, k) => least + key.derive(`word ${k}`).below(below - least)),
    stateFromText: (text) => {
      const limits = words.map(({ least, below }) => `${least} to ${below - 1n}`).join(", ");
      return parseWords(text, { id: about.id, words, allowed: `"${form}" (${limits})` });
    },
    kernel,
    *integers(start) {
      for (let state = step(start); ; state = step(state)) yield output(state);
    },
  });
}

/** Words of a 16-bit multiply-with-carry generator: 0 and a 2^16 - 1 stand still, larger ones lie before the cycle. */
function carrying(multiplier: bigint): WordRange {
  return { least: 1n, below: multiplier * 65536n - 1n };
}

function carry(x: bigint, multiplier: bigint): bigint {
  return multiplier * (x & 65535n) + (x >> 16n);
}

const [Z, W] = [carrying(36969n), carrying(18000n)];
const ALL32: WordRange = { least: 0n, below: 1n << 32n };
const NONZERO32: WordRange = { least: 1n, below: 1n << 32n };

/** Each half runs through the powers of 2^-16 modulo a 2^16 - 1, a safe prime: half of all residues. */
const [PERIOD_Z, PERIOD_W] = [36969n * 32768n - 1n, 18000n * 32768n - 1n];

export const mwc = member({
  id: "mwc",
  title: "Marsaglia's multiply-with-carry of 1999",
  citation: "G. Marsaglia, Random numbers for C, posting to sci.stat.math (20 January 1999)",
  period: PERIOD_Z * PERIOD_W,
  knownStructure: "two 16-bit congruential generators side by side",
  bits: 32,
  words: [Z, W],
  form: "z,w",
  step: ([z = 0n, w = 0n]) => [carry(z, 36969n), carry(w, 18000n)],
  output: ([z = 0n, w = 0n]) => ((z << 16n) + w) & MASK32,
  kernel: (exports) => exports.fillMwc,
});

export const kiss99 = member({
  id: "kiss99",
  title: "Marsaglia's KISS of 1999",
  citation: "G. Marsaglia, Random numbers for C, posting to sci.stat.math (20 January 1999)",
  period: null,
  knownStructure: null,
  bits: 32,
  words: [Z, W, NONZERO32, ALL32],
  form: "z,w,jsr,jcong",
  step: ([z = 0n, w = 0n, jsr = 0n, jcong = 0n]) => {
    const a = jsr ^ ((jsr << 17n) & MASK32);
    const b = a ^ (a >> 13n);
    return [
      carry(z, 36969n),
      carry(w, 18000n),
      b ^ ((b << 5n) & MASK32),
      (69069n * jcong + 1234567n) & MASK32,
    ];
  },
  output: ([z = 0n, w = 0n, jsr = 0n, jcong = 0n]) => (((((z << 16n) + w) & MASK32) ^ jcong) + jsr) & MASK32,
  kernel: (exports) => exports.fillKiss99,
});

const ALL64: WordRange = { least: 0n, below: 1n << 64n };

export const kiss64 = member({
  id: "kiss64",
  title: "Marsaglia's KISS of 2009, 64 bits",
  citation: "G. Marsaglia, 64-bit KISS RNGs, posting to comp.lang.c (28 February 2009)",
  period: null,
  knownStructure: null,
  bits: 64,
  // the carry is below the multiplier 2^58 + 1; x = 0 with carry 0 stands still
  words: [
    { least: 1n, below: 1n << 64n },
    { least: 0n, below: 1n << 58n },
    { least: 1n, below: 1n << 64n },
    ALL64,
  ],
  form: "x,c,y,z",
  step: ([x = 0n, c = 0n, y = 0n, z = 0n]) => {
    const t = ((x << 58n) + c) & MASK64;
    const sum = (x + t) & MASK64;
    const a = y ^ ((y << 13n) & MASK64);
    const b = a ^ (a >> 17n);
    return [
      sum,
      (x >> 6n) + (sum < t ? 1n : 0n),
      b ^ ((b << 43n) & MASK64),
      (6906969069n * z + 1234567n) & MASK64,
    ];
  },
  output: ([x = 0n, , y = 0n, z = 0n]) => (x + y + z) & MASK64,
  kernel: (exports) => exports.fillKiss64,
});

/**
 * Knuth's two subtractive lagged Fibonacci generators.
 *
 * `knuth-subtractive`: x(n) = x(n-55) - x(n-24) mod 10^9, D. E. Knuth, The Art of Computer Programming, vol. 2, 2nd ed.
 * (1981), 3.2.2 and 3.6, known from many textbooks and spreadsheets. `knuth-array`: x(n) = x(n-100) - x(n-37) mod 2^30 with
 * 100 of every 1009 words used, ibid. 3rd ed., ninth printing (2002), 3.6. Good for: speed without multiplication (the
 * first), sound output (the second, by what it throws away). Bad at: without the throwing away, x(n), x(n-24) and x(n-55)
 * lie on two planes, and sums over the lags are badly spread.
 *
 * Starting states: words uniform, not all even. The published form is a seed: of `IN55` with three warm-up rounds, and
 * of `ran_start`.
 */
import { pseudoRandom, type State } from "./pseudo-random.js";
import { equalWords, parseWords } from "./published-state.js";
import type { Key } from "./key.js";

const BILLION = 1_000_000_000n;
const SIZE = 1n << 30n;
const LONG = 100;
const SHORT = 37;

/** Words below `modulus`, not all even: an all-even state never becomes odd again. */
function uniformWords(key: Key, count: number, modulus: bigint): bigint[] {
  for (let attempt = 0; ; attempt++) {
    const words = [...key.derive(`attempt ${attempt}`).words64(count)].map((word) => word % modulus);
    if (words.some((word) => word % 2n === 1n)) return words;
  }
}

function subtract(a: bigint, b: bigint, modulus: bigint): bigint {
  return a >= b ? a - b : a - b + modulus;
}

/** Knuth's IN55: the differences 1, j - 1, ... put at steps of 21, then three rounds of the recurrence. */
function seed55(seed: bigint): State {
  const words = Array.from({ length: 55 }, () => 0n);
  words[54] = seed;
  let [previous, difference] = [seed, 1n];
  for (let i = 1; i < 55; i++) {
    words[((21 * i) % 55) - 1] = difference;
    [previous, difference] = [difference, subtract(previous, difference, BILLION)];
  }
  for (let step = 0; step < 3 * 55; step++) {
    const k = step % 55;
    words[k] = subtract(words[k] ?? 0n, words[(k + 31) % 55] ?? 0n, BILLION);
  }
  return [...words, 0n];
}

export const knuthSubtractive = pseudoRandom({
  about: {
    id: "knuth-subtractive",
    title: "Knuth's subtractive generator, lags 55 and 24",
    citation: "D. E. Knuth, The Art of Computer Programming, vol. 2, 2nd ed. (1981), 3.2.2 and 3.6",
    method: "lagged Fibonacci",
    outputBits: 29,
    period: null,
    knownStructure: "x(n) - x(n-55) + x(n-24) is 0 or 1: triples at these lags lie on two planes",
  },
  linear: {
    multipliers: Array.from({ length: 55 }, (_, k) => (k === 54 ? 1n : k === 23 ? BILLION - 1n : 0n)),
    increment: 0n,
    modulus: BILLION,
    note: null,
  },
  output: { modulus: BILLION, bytes: 8, zeroless: false, integers: 1 },
  stateFromKey: (key) => [...uniformWords(key, 55, BILLION), 0n],
  stateFromText: (text) => {
    const form = { id: "knuth-subtractive", words: equalWords(1, BILLION), allowed: "a seed below 10^9" };
    return seed55(parseWords(text, form)[0] ?? 0n);
  },
  kernel: (exports) => exports.fillSubtractive55,
  *integers(state) {
    const words = state.slice(0, 55);
    for (let k = Number(state[55] ?? 0n); ; k = (k + 1) % 55) {
      const word = subtract(words[k] ?? 0n, words[(k + 31) % 55] ?? 0n, BILLION);
      words[k] = word;
      yield word;
    }
  },
});

/**
 * Knuth's ran_start: powers of a polynomial in the shift operator by squaring, driven by the bits of the seed, so that the
 * streams of different seeds lie at least 2^70 apart.
 */
function seedArray(seed: bigint): State {
  let x: bigint[] = [];
  let fill = (seed + 2n) & (SIZE - 2n);
  for (let j = 0; j < LONG; j++) {
    x.push(fill);
    fill <<= 1n;
    if (fill >= SIZE) fill -= SIZE - 2n;
  }
  x[1] = (x[1] ?? 0n) + 1n;
  let bits = seed & (SIZE - 1n);
  for (let left = 69; left > 0;) {
    // the square: coefficients two places apart, then reduced by the recurrence from the top
    const square = Array.from({ length: 2 * LONG - 1 }, (_, j) => (j % 2 === 0 ? (x[j / 2] ?? 0n) : 0n));
    for (let j = 2 * LONG - 2; j >= LONG; j--) {
      for (const to of [j - (LONG - SHORT), j - LONG]) {
        square[to] = subtract(square[to] ?? 0n, square[j] ?? 0n, SIZE);
      }
    }
    x = square.slice(0, LONG);
    if (bits % 2n === 1n) {
      const top = x.pop() ?? 0n;
      x.unshift(top);
      x[SHORT] = subtract(x[SHORT] ?? 0n, top, SIZE);
    }
    if (bits > 0n) bits >>= 1n;
    else left--;
  }
  let words = [...x.slice(SHORT), ...x.slice(0, SHORT)];
  for (let k = 0; k < 10; k++) words = runOn(words, 2 * LONG - 1);
  return packArray(words, 0);
}

/** The 100 words that stand `steps` places later. */
function runOn(words: readonly bigint[], steps: number): bigint[] {
  const run = [...words];
  for (let k = 0; k < steps; k++) {
    run.push(subtract(run[k] ?? 0n, run[k + LONG - SHORT] ?? 0n, SIZE));
  }
  return run.slice(steps);
}

/** The kernel's layout: words two by two, then the index of the next. */
function packArray(words: readonly bigint[], index: number): State {
  const pairs = Array.from(
    { length: LONG / 2 },
    (_, k) => (words[2 * k] ?? 0n) | ((words[2 * k + 1] ?? 0n) << 32n),
  );
  return [...pairs, BigInt(index)];
}

export const knuthArray = pseudoRandom({
  about: {
    id: "knuth-array",
    title: "Knuth's array generator of 2002, lags 100 and 37",
    citation: "D. E. Knuth, The Art of Computer Programming, vol. 2, 3rd ed., ninth printing (2002), 3.6",
    method: "lagged Fibonacci",
    outputBits: 30,
    period: (1n << 29n) * ((1n << 100n) - 1n),
    knownStructure: null,
  },
  output: { modulus: SIZE, bytes: 4, zeroless: false, integers: 1 },
  stateFromKey: (key) => packArray(uniformWords(key, LONG, SIZE), 0),
  stateFromText: (text) => {
    const allowed = "a seed from 0 to 1073741821";
    return seedArray(
      parseWords(text, { id: "knuth-array", words: equalWords(1, SIZE - 2n), allowed })[0] ?? 0n,
    );
  },
  kernel: (exports) => exports.fillKnuthArray,
  *integers(state) {
    let words = state.slice(0, LONG / 2).flatMap((pair) => [pair & 0xffffffffn, pair >> 32n]);
    for (let index = Number(state[LONG / 2] ?? 0n); ; index = 0) {
      yield* words.slice(index);
      words = runOn(words, 1009);
    }
  },
});

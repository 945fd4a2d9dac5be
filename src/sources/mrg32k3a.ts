/**
 * MRG32k3a: P. L'Ecuyer, "Good parameters and implementations for combined multiple recursive random number
 * generators", Operations Research 47 (1999) 159-164. Two recurrences of order 3 modulo primes below 2^32,
 *
 *     x(n) = 1403580 x(n-2) - 810728 x(n-3) mod 4294967087,  y(n) = 527612 y(n-1) - 1370589 y(n-3) mod 4294944443,
 *
 * combined as z = x - y mod 4294967087, taken from 1 ... 4294967087. The paper's own conversion: z / 4294967088, which
 * lies between 2.3e-10 and 1 - 2.3e-10. Good for: many long streams by jumps; good lattices up to 45 dimensions. Bad
 * at: resolution below 2^-32.
 *
 * Starting states: uniform over three words below the first modulus and three below the second, neither three all 0.
 * The published form is the six words, "12345,12345,12345,12345,12345,12345", oldest first.
 */
import { applyMatrix, powerMatrix, type Matrix } from "../numeric/matrix-mod.js";
import { combined } from "./linear.js";
import { pseudoRandom, type State } from "./pseudo-random.js";
import { equalWords, parseWords } from "./published-state.js";

export const M1 = 4294967087n;
export const M2 = 4294944443n;

/** One step of each component on (oldest, middle, newest). */
export const A1: Matrix = [
  [0n, 1n, 0n],
  [0n, 0n, 1n],
  [M1 - 810728n, 1403580n, 0n],
];
export const A2: Matrix = [
  [0n, 1n, 0n],
  [0n, 0n, 1n],
  [M2 - 1370589n, 0n, 527612n],
];

function valid(words: State): boolean {
  return words.slice(0, 3).some((word) => word > 0n) && words.slice(3).some((word) => word > 0n);
}

export const mrg32k3a = pseudoRandom({
  about: {
    id: "mrg32k3a",
    title: "Combined multiple recursive, MRG32k3a",
    citation:
      "P. L'Ecuyer, Good parameters and implementations for combined multiple recursive random number generators, Operations Research 47 (1999) 159-164",
    method: "multiple recursive",
    outputBits: 32,
    period: ((M1 ** 3n - 1n) * (M2 ** 3n - 1n)) / 2n,
    knownStructure: null,
  },
  output: { modulus: M1 + 1n, bytes: 8, zeroless: true, integers: 1 },
  stateFromKey: (key) => {
    for (let attempt = 0; ; attempt++) {
      const words = [M1, M1, M1, M2, M2, M2].map((m, k) =>
        key.derive(`word ${k}, attempt ${attempt}`).below(m),
      );
      if (valid(words)) return words;
    }
  },
  stateFromText: (text) =>
    parseWords(text, {
      id: "mrg32k3a",
      words: [...equalWords(3, M1), ...equalWords(3, M2)],
      allowed: `six words, three below ${M1} and three below ${M2}, neither three all 0, like "12345,12345,12345,12345,12345,12345",`,
      valid,
    }),
  linear: combined(
    [
      { multipliers: [0n, 1403580n, M1 - 810728n], modulus: M1 },
      { multipliers: [527612n, 0n, M2 - 1370589n], modulus: M2 },
    ],
    "the output z / 4294967088 differs from x / m1 - y / m2 by less than 6e-6",
  ),
  kernel: (exports) => exports.fillMrg32k3a,
  *integers(start) {
    let [x, y] = [start.slice(0, 3), start.slice(3)];
    for (;;) {
      [x, y] = [applyMatrix(A1, x, M1), applyMatrix(A2, y, M2)];
      const difference = ((x[2] ?? 0n) - (y[2] ?? 0n) + M1) % M1;
      yield difference === 0n ? M1 : difference;
    }
  },
  advance: (state, words) => [
    ...applyMatrix(powerMatrix(A1, words, M1), state.slice(0, 3), M1),
    ...applyMatrix(powerMatrix(A2, words, M2), state.slice(3), M2),
  ],
});

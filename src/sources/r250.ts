/**
 * R250: S. Kirkpatrick and E. P. Stoll, "A very fast shift-register sequence random number generator", Journal of
 * Computational Physics 40 (1981) 517-526: x(n) = x(n-103) xor x(n-250) on 32-bit words. Good for: nothing today, but it
 * was used for decades. Bad at: three-point correlations; it gave wrong energies of the Ising model (A. M. Ferrenberg, D.
 * P. Landau and Y. J. Wong, "Monte Carlo simulations: hidden errors from good random number generators", Physical Review
 * Letters 69 (1992) 3382-3384).
 *
 * Starting states: 250 uniform words. The published form is a seed of the GNU Scientific Library: words by 69069 x mod 2^32,
 * then every seventh one, from the fourth on, gets a lower triangle of bits so that the 32 columns are independent.
 */
import { pseudoRandom, type State } from "./pseudo-random.js";
import { equalWords, parseWords } from "./published-state.js";

const N = 250;
const LAG = 103;

/** The kernel's layout: words two by two, then the index of the oldest. */
function pack(words: Uint32Array): State {
  return [...new BigUint64Array(words.buffer, words.byteOffset, N / 2), 0n];
}

function fromSeed(seed: number): State {
  const words = new Uint32Array(N);
  let x = seed === 0 ? 1 : seed;
  for (let i = 0; i < N; i++) words[i] = x = Math.imul(69069, x) >>> 0;
  for (let bit = 0; bit < 32; bit++) {
    const k = 7 * bit + 3;
    words[k] = ((words[k] ?? 0) & (0xffffffff >>> bit)) | (0x80000000 >>> bit);
  }
  return pack(words);
}

export const r250 = pseudoRandom({
  about: {
    id: "r250",
    title: "R250 shift register",
    citation:
      "S. Kirkpatrick, E. P. Stoll, A very fast shift-register sequence random number generator, Journal of Computational Physics 40 (1981) 517-526",
    method: "lagged Fibonacci",
    outputBits: 32,
    period: (1n << 250n) - 1n,
    knownStructure: "x(n) is the exclusive or of two earlier outputs: strong three-point correlations",
  },
  output: { modulus: 1n << 32n, bytes: 4, zeroless: false, integers: 1 },
  stateFromKey: (key) => pack(key.words32(N)),
  stateFromText: (text) => {
    const form = { id: "r250", words: equalWords(1, 1n << 32n), allowed: "a seed below 2^32" };
    return fromSeed(Number(parseWords(text, form)[0] ?? 0n));
  },
  binary: { stateBits: 32 * N, of: "outputs", wordBits: 32, registers: 32, words: integers },
  kernel: (exports) => exports.fillR250,
  integers,
});

function* integers(state: State): Generator<bigint, never> {
  const words = new Uint32Array(new BigUint64Array(state.slice(0, N / 2)).buffer);
  for (let k = Number(state[N / 2] ?? 0n); ; k = (k + 1) % N) {
    const word = ((words[k] ?? 0) ^ (words[(k + N - LAG) % N] ?? 0)) >>> 0;
    words[k] = word;
    yield BigInt(word);
  }
}

/**
 * Subtract with borrow, and RANLUX: G. Marsaglia and A. Zaman, "A new class of random number generators", Annals of Applied
 * Probability 1 (1991) 462-480; M. Lüscher, "A portable high-quality random number generator for lattice field theory
 * simulations", Computer Physics Communications 79 (1994) 100-110, who keeps some of every p words and drops the others;
 * luxury levels of F. James, ibid. 111-114: p = 24, 48, 97, 223, 389 with 24 kept. x(n) = x(n-s) - x(n-r) - borrow mod 2^b,
 * in 24 bits (r = 24, s = 10) and in 48 bits (r = 12, s = 5). `ranlux24` and `ranlux48` keep 23 of 223 and 11 of 389 (ISO/IEC
 * 14882, C++). Good for: soundness that rests on chaos theory at the higher levels. Bad at: speed there; without dropping,
 * tuples lie on the few planes of a congruential generator of huge modulus (S. Tezuka, P. L'Ecuyer and R. Couture, ACM
 * Transactions on Modeling and Computer Simulation 3 (1993) 315-331).
 *
 * Starting states: words uniform, borrow 0 (all words 0, or all 2^b - 1 with a borrow, never come up). The published form is
 * a seed of 40014 x mod 2147483563 (19780503 by default in C++), one output a word, or two, the first one low; James fills
 * the words from the newest, C++ from the oldest.
 */
import { inverseMod } from "../numeric/factor.js";
import type { LinearRecurrence } from "./linear.js";
import { pseudoRandom, type PseudoRandomSource, type State } from "./pseudo-random.js";
import { equalWords, parseWords } from "./published-state.js";

/** Words kept of every block. */
interface Luxury {
  readonly kept: number;
  readonly block: number;
  /** Whether seeding begins with the oldest word (C++) or the newest (James). */
  readonly first: "oldest" | "newest";
}

interface Lags {
  readonly long: number;
  readonly short: number;
  readonly bits: number;
}

/** Places for words, oldest first, in the kernel's layout; then borrow and the words given out of a block. */
const PLACES = 24;

function pack(words: readonly bigint[], borrow: bigint): State {
  const empty = Array.from({ length: PLACES - words.length }, () => 0n);
  return [...words, ...empty, borrow, 0n];
}

function fromSeed(seed: bigint, { long, bits }: Lags, first: Luxury["first"]): State {
  let x = seed % 2147483563n;
  if (x === 0n) x = 19780503n;
  const next = (): bigint => (x = (40014n * x) % 2147483563n);
  const mask = (1n << BigInt(bits)) - 1n;
  const words = Array.from({ length: long }, () => (bits > 32 ? next() + (next() << 32n) : next()) & mask);
  return pack(first === "oldest" ? words : words.toReversed(), words.at(-1) === 0n ? 1n : 0n);
}

/**
 * The congruential generator whose outputs w / m begin with the words as their first digits in base 2^b: multiplier 1 / 2^b,
 * modulus m = 2^(rb) - 2^(sb) + 1 (Tezuka, L'Ecuyer and Couture, 1993).
 */
function equivalent({ long, short, bits }: Lags, { kept, block }: Luxury): LinearRecurrence {
  const modulus = (1n << BigInt(long * bits)) - (1n << BigInt(short * bits)) + 1n;
  return {
    multipliers: [inverseMod(1n << BigInt(bits), modulus)],
    increment: 0n,
    modulus,
    note: `Subtract with borrow as its equivalent congruential generator: outputs are the first ${bits} bits of its fractions, so a plane h is blurred by up to |h|₁ / 2^${bits}.`,
    words: long,
    ...(kept === block ? { lags: [0, long - short, long] } : { luxury: { kept, block } }),
  };
}

function subtractWithBorrow(
  id: string,
  title: string,
  period: bigint,
  lags: Lags,
  luxury: Luxury,
): PseudoRandomSource {
  const { long, short, bits } = lags;
  const size = 1n << BigInt(bits);
  return pseudoRandom({
    about: {
      id,
      title,
      citation:
        "M. Lüscher, A portable high-quality random number generator for lattice field theory simulations, Computer Physics Communications 79 (1994) 100-110",
      method: "subtract with borrow",
      outputBits: bits,
      period,
      knownStructure:
        luxury.block < 200
          ? "x(n) - x(n-s) + x(n-r) is nearly 0 or 1: tuples at these lags lie near few planes"
          : null,
    },
    output: { modulus: size, bytes: 8, zeroless: false, integers: 1 },
    stateFromKey: (key) => {
      const words = [...key.words64(long)].map((word) => word % size);
      return pack(words.some((word) => word > 0n) ? words : [1n, ...words.slice(1)], 0n);
    },
    stateFromText: (text) => {
      const form = { id, words: equalWords(1, 1n << 32n), allowed: "a seed below 2^32" };
      return fromSeed(parseWords(text, form)[0] ?? 0n, lags, luxury.first);
    },
    linear: equivalent(lags, luxury),
    constants: [long, short, bits, luxury.block, luxury.kept].map(BigInt),
    kernel: (exports) => exports.fillSubtractWithBorrow,
    *integers(state) {
      const words = state.slice(0, long);
      let [borrow, given] = [state[PLACES] ?? 0n, Number(state[PLACES + 1])];
      let index = 0;
      const step = (): bigint => {
        const x = (words[(index + long - short) % long] ?? 0n) - (words[index] ?? 0n) - borrow;
        borrow = x < 0n ? 1n : 0n;
        const word = x < 0n ? x + size : x;
        words[index] = word;
        index = (index + 1) % long;
        return word;
      };
      for (;;) {
        if (given === luxury.kept) {
          for (let k = luxury.kept; k < luxury.block; k++) step();
          given = 0;
        }
        given++;
        yield step();
      }
    },
  });
}

const NARROW: Lags = { long: 24, short: 10, bits: 24 };
const WIDE: Lags = { long: 12, short: 5, bits: 48 };

/** The order of 2^24, and of 2^48, modulo 2^576 - 2^240 + 1. */
const PERIOD24 = ((1n << 576n) - (1n << 240n)) / 48n;
const PERIOD48 = PERIOD24 / 2n;

/** A level of James: 24 of `block` words. */
function level(number: number, block: number): PseudoRandomSource {
  const title = `RANLUX, luxury level ${number} (24 of ${block} words)`;
  return subtractWithBorrow(`ranlux-${number}`, title, PERIOD24, NARROW, {
    kept: 24,
    block,
    first: "newest",
  });
}

export const ranlux0 = level(0, 24);
export const ranlux1 = level(1, 48);
export const ranlux2 = level(2, 97);
export const ranlux3 = level(3, 223);
export const ranlux4 = level(4, 389);

export const ranlux24Base = subtractWithBorrow(
  "ranlux24-base",
  "Subtract with borrow, 24 bits, all words",
  PERIOD24,
  NARROW,
  { kept: 24, block: 24, first: "oldest" },
);

export const ranlux24 = subtractWithBorrow(
  "ranlux24",
  "Subtract with borrow, 24 bits, 23 of 223 words",
  PERIOD24,
  NARROW,
  { kept: 23, block: 223, first: "oldest" },
);

export const ranlux48Base = subtractWithBorrow(
  "ranlux48-base",
  "Subtract with borrow, 48 bits, all words",
  PERIOD48,
  WIDE,
  { kept: 12, block: 12, first: "oldest" },
);

export const ranlux48 = subtractWithBorrow(
  "ranlux48",
  "Subtract with borrow, 48 bits, 11 of 389 words",
  PERIOD48,
  WIDE,
  { kept: 11, block: 389, first: "oldest" },
);

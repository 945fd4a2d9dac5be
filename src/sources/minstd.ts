/**
 * The multiplicative generators modulo the prime 2^31 - 1 known as "minimal standard": multiplier 16807 = 7^5
 * (P. A. W. Lewis, A. S. Goodman and J. M. Miller 1969; S. K. Park and K. W. Miller, "Random number generators: good
 * ones are hard to find", Communications of the ACM 31 (1988) 1192-1201) and 48271 (Park, Miller and P. K. Stockmeyer,
 * "Another test for detecting correlations", ibid. 36 (1993) 105-110). Full period, every state from 1 to 2^31 - 2.
 * Good for: small jobs that must be repeated anywhere. Bad at: long runs (the period is used up in a second) and
 * integrands that feel successive pairs at scales below 1/16807. Coordinates are x / (2^31 - 1).
 */
import { congruential } from "./congruential.js";
import { pseudoRandom } from "./pseudo-random.js";

const modulus = (1n << 31n) - 1n;

export const minstd16807 = pseudoRandom(
  congruential(
    {
      id: "minstd-16807",
      title: "Minimal standard, 16807 mod 2^31 - 1",
      citation:
        "S. K. Park, K. W. Miller, Random number generators: good ones are hard to find, Communications of the ACM 31 (1988) 1192-1201",
      method: "congruential",
      outputBits: 31,
      period: modulus - 1n,
      knownStructure: "pairs of successive outputs lie on lines 1/16807 apart; short period",
    },
    { multiplier: 16807n, increment: 0n, modulus },
  ),
);

export const minstd48271 = pseudoRandom(
  congruential(
    {
      id: "minstd-48271",
      title: "Minimal standard, 48271 mod 2^31 - 1",
      citation:
        "S. K. Park, K. W. Miller, P. K. Stockmeyer, Another test for detecting correlations, Communications of the ACM 36 (1993) 105-110",
      method: "congruential",
      outputBits: 31,
      period: modulus - 1n,
      knownStructure: "tuples lie on a lattice of 2^31 - 1 points; short period",
    },
    { multiplier: 48271n, increment: 0n, modulus },
  ),
);

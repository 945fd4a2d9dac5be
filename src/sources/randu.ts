/**
 * RANDU: x <- 65539 x mod 2^31, odd states, as it stood in scientific subroutine packages of the 1960s. Its fault is
 * the best known of all: 65539 = 2^16 + 3, so x(i + 2) = 6 x(i + 1) - 9 x(i) mod 2^31, and all triples of successive
 * outputs lie on 15 planes (G. Marsaglia, "Random numbers fall mainly in the planes", Proceedings of the National
 * Academy of Sciences 61 (1968) 25-28). Good for: showing that a tool can find a fault. Bad at: any integral of three
 * or more coordinates. Coordinates are x / 2^31.
 */
import { congruential } from "./congruential.js";
import { pseudoRandom } from "./pseudo-random.js";

export const randu = pseudoRandom(
  congruential(
    {
      id: "randu",
      title: "RANDU, 65539 mod 2^31",
      citation:
        "G. Marsaglia, Random numbers fall mainly in the planes, Proceedings of the National Academy of Sciences 61 (1968) 25-28",
      method: "congruential",
      outputBits: 31,
      period: 1n << 29n,
      knownStructure: "all triples of successive outputs lie on 15 planes",
    },
    { multiplier: 65539n, increment: 0n, modulus: 1n << 31n },
  ),
);

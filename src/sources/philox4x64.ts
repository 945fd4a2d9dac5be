/**
 * Philox4x64-10: J. K. Salmon, M. A. Moraes, R. O. Dror and D. E. Shaw, "Parallel random numbers: as easy as 1, 2, 3",
 * Proceedings of SC11 (2011), article 16. A keyed bijection of 256-bit counters by ten rounds of 64-bit multiplication and
 * exclusive or. Good for: any index at once, independent streams by 128-bit keys. Bad at: speed, where the machine has no
 * 128-bit product; not for cryptography.
 */
import { counterBased } from "./counter-based.js";
import { pseudoRandom } from "./pseudo-random.js";

const WORD = (1n << 64n) - 1n;

export const philox4x64 = pseudoRandom(
  counterBased({
    about: {
      id: "philox4x64",
      title: "Philox4x64-10",
      citation:
        "J. K. Salmon, M. A. Moraes, R. O. Dror, D. E. Shaw, Parallel random numbers: as easy as 1, 2, 3, Proceedings of SC11 (2011), article 16",
    },
    keyWords: 2,
    block: ([x0 = 0n, x1 = 0n, x2 = 0n, x3 = 0n], [k0 = 0n, k1 = 0n]) => {
      for (let round = 0; round < 10; round++) {
        const [p, q] = [x0 * 0xd2e7470ee14c6c93n, x2 * 0xca5a826395121157n];
        [x0, x1, x2, x3] = [(q >> 64n) ^ x1 ^ k0, q & WORD, (p >> 64n) ^ x3 ^ k1, p & WORD];
        k0 = (k0 + 0x9e3779b97f4a7c15n) & WORD;
        k1 = (k1 + 0xbb67ae8584caa73bn) & WORD;
      }
      return [x0, x1, x2, x3];
    },
    kernel: (exports) => exports.fillPhilox4x64,
  }),
);

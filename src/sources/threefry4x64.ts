/**
 * Threefry4x64-20: J. K. Salmon, M. A. Moraes, R. O. Dror and D. E. Shaw, "Parallel random numbers: as easy as 1, 2, 3",
 * Proceedings of SC11 (2011), article 16, after the Threefish cipher. A keyed bijection of 256-bit counters by twenty
 * rounds of addition, rotation and exclusive or. Good for: any index at once, where multiplication is slow. Bad at:
 * nothing known here; fewer rounds than the cipher has, so not for cryptography.
 */
import { counterBased } from "./counter-based.js";
import { rotl64 } from "./f2-linear.js";
import { pseudoRandom } from "./pseudo-random.js";

const WORD = (1n << 64n) - 1n;

/** Rotations of rounds 0 to 7, which repeat (table 2 of the paper). */
const ROTATIONS = [
  [14n, 16n],
  [52n, 57n],
  [23n, 40n],
  [5n, 37n],
  [25n, 33n],
  [46n, 12n],
  [58n, 22n],
  [32n, 32n],
] as const;

export const threefry4x64 = pseudoRandom(
  counterBased({
    about: {
      id: "threefry4x64",
      title: "Threefry4x64-20",
      citation:
        "J. K. Salmon, M. A. Moraes, R. O. Dror, D. E. Shaw, Parallel random numbers: as easy as 1, 2, 3, Proceedings of SC11 (2011), article 16",
    },
    keyWords: 4,
    block: (counter, key) => {
      const schedule = [...key, key.reduce((sum, word) => sum ^ word, 0x1bd11bdaa9fc1a22n)];
      const x = counter.map((word, k) => (word + (schedule[k] ?? 0n)) & WORD);
      for (let round = 0; round < 20; round++) {
        // words 1 and 3 change places from round to round
        const [b, d] = round % 2 === 0 ? [1, 3] : [3, 1];
        const [first, second] = ROTATIONS[round % 8] ?? ROTATIONS[0];
        x[0] = ((x[0] ?? 0n) + (x[b] ?? 0n)) & WORD;
        x[b] = rotl64(x[b] ?? 0n, first) ^ x[0];
        x[2] = ((x[2] ?? 0n) + (x[d] ?? 0n)) & WORD;
        x[d] = rotl64(x[d] ?? 0n, second) ^ x[2];
        if (round % 4 !== 3) continue;
        const turn = (round + 1) / 4;
        for (let k = 0; k < 4; k++) x[k] = ((x[k] ?? 0n) + (schedule[(turn + k) % 5] ?? 0n)) & WORD;
        x[3] = ((x[3] ?? 0n) + BigInt(turn)) & WORD;
      }
      return x;
    },
    kernel: (exports) => exports.fillThreefry4x64,
  }),
);

// Linear matrix scrambling in base 2: J. Matousek, "On the L2-discrepancy for anchored boxes", Journal of Complexity 14
// (1998) 527-556. Each generating matrix C becomes L C with L random, lower triangular and with ones on the diagonal, so
// that the first digits of the points remain a permutation of themselves interval by interval.
//
// The columns of L come from xoshiro256++ (./xoshiro), seeded for each coordinate with 256 bits of the stream's key. A
// product L v is looked up by nibbles of v (13 tables of 16 words a coordinate): 13 xors rather than up to 52.
import { next, seed } from "./xoshiro";

const RECORD: usize = 448;
const STEPS: usize = 16;

// Entry 16 g + v: the product of L with the vector whose nibble g, counted from the most significant digits, is v.
const products = memory.data(13 * 16 * 8, 16);

/** Multiplies all step words of the `dimension` records by matrices drawn from the seeds (32 bytes each). */
export function net2Scramble(records: usize, dimension: i32, seeds: usize): void {
  for (let j = 0; j < dimension; j++) {
    seed(seeds + (<usize>j << 5));
    for (let g = 0; g < 13; g++) {
      let table = products + (<usize>g << 7);
      store<u64>(table, 0);
      for (let q = 0; q < 4; q++) {
        // the column of digit 4 g + q: a one in its own place, random digits below it
        let own: u64 = 1 << <u64>(51 - 4 * g - q);
        store<u64>(table + (<usize>(8 >> q) << 3), own | (next() & (own - 1)));
      }
      for (let v = 3; v < 16; v++) {
        let rest = v & (v - 1);
        if (rest == 0) continue;
        let sum = load<u64>(table + (<usize>rest << 3)) ^ load<u64>(table + (<usize>(v ^ rest) << 3));
        store<u64>(table + (<usize>v << 3), sum);
      }
    }
    let steps = records + <usize>j * RECORD + STEPS;
    for (let l: usize = 0; l < 52; l++) store<u64>(steps + (l << 3), product(load<u64>(steps + (l << 3))));
  }
}

function product(v: u64): u64 {
  let sum: u64 = 0;
  for (let g = 0; g < 13; g++) {
    let nibble = <usize>((v >> <u64>(48 - 4 * g)) & 15);
    sum ^= load<u64>(products + (<usize>g << 7) + (nibble << 3));
  }
  return sum;
}

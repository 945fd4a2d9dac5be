// A list of linear steps on the rows of a block, in place: correlation, factors and paths of normal inputs.
//
// Each step makes one output row: a constant and a sum of coefficients times rows, either of the block as it stands or of
// outputs made before it. Eight points are taken through the whole list at once; only then do the outputs replace rows of
// the block. Good for: triangular and full matrices, sums along a path and Brownian bridges alike. Bad at: full matrices of
// many hundred rows, where a blocked product would use the cache better.
import { add, mul } from "../vector";

/** Bytes that an output of eight points takes. */
const EIGHT: usize = 64;
/** Marks a term that reads an earlier output. */
const EARLIER: u32 = 0x80000000;

/**
 * `pointer` is the block, its rows `stride` values apart (a multiple of 8); whole groups of eight points are changed.
 * `table`: number of steps; then for each step row and number of terms (two 32-bit words), the constant, and for each
 * term row (or EARLIER + index of an earlier step) and 0 (two words) and the coefficient. `scratch` (aligned to 16) has
 * 64 bytes for each step.
 */
export function linearBlock(pointer: usize, stride: i32, count: i32, table: usize, scratch: usize): void {
  let steps = <i32>load<f64>(table);
  let row = <usize>stride << 3;
  for (let i = 0; i < count; i += 8) {
    let x = pointer + (<usize>i << 3);
    let at = table + 8;
    let out = scratch;
    for (let k = 0; k < steps; k++) {
      let terms = load<u32>(at, 4);
      let s0 = v128.load_splat<f64>(at + 8);
      let s1 = s0;
      let s2 = s0;
      let s3 = s0;
      at += 16;
      for (; terms > 0; terms--) {
        let word = load<u32>(at);
        let from = word & EARLIER ? scratch + <usize>(word & ~EARLIER) * EIGHT : x + <usize>word * row;
        let c = v128.load_splat<f64>(at + 8);
        s0 = add(s0, mul(c, v128.load(from)));
        s1 = add(s1, mul(c, v128.load(from, 16)));
        s2 = add(s2, mul(c, v128.load(from, 32)));
        s3 = add(s3, mul(c, v128.load(from, 48)));
        at += 16;
      }
      v128.store(out, s0);
      v128.store(out, s1, 16);
      v128.store(out, s2, 32);
      v128.store(out, s3, 48);
      out += EIGHT;
    }
    at = table + 8;
    out = scratch;
    for (let k = 0; k < steps; k++) {
      let to = x + <usize>load<u32>(at) * row;
      v128.store(to, v128.load(out));
      v128.store(to, v128.load(out, 16), 16);
      v128.store(to, v128.load(out, 32), 32);
      v128.store(to, v128.load(out, 48), 48);
      at += 16 + (<usize>load<u32>(at, 4) << 4);
      out += EIGHT;
    }
  }
}

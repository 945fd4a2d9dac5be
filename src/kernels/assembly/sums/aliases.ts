// Sums of f times cosines of plane waves: what the Fourier coefficients of an integrand at chosen vectors are estimated by.
//
// The cosine of a whole turn is taken as the sine of 1/4 - |p|, p the phase reduced to [-1/2, 1/2], by the power series of
// the sine to the 17th power (M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions (1964), 4.3.65), whose
// rest is below (pi/2)^19 / 19! = 5e-14 on this range: far below the noise of any estimate, and without a table look-up.
import { add, mul, splat, sub } from "../vector";

const LEAF: i32 = 64;

const C = memory.data<f64>(
  [
    0.25, 0.25,
    6.283185307179586, 6.283185307179586, // 2 pi
    -0.16666666666666666, -0.16666666666666666, // -1 / 3!
    0.008333333333333333, 0.008333333333333333,
    -0.0001984126984126984, -0.0001984126984126984,
    0.0000027557319223985893, 0.0000027557319223985893,
    -2.505210838544172e-8, -2.505210838544172e-8,
    1.6059043836821613e-10, 1.6059043836821613e-10,
    -7.647163731819816e-13, -7.647163731819816e-13,
    2.8114572543455206e-15, 2.8114572543455206e-15, // 1 / 17!
  ],
  16,
);

/** cos 2 pi p for any p whose nearest whole number is exact. */
@inline
function cosineOfTurns(p: v128): v128 {
  let q = f64x2.abs(sub(p, f64x2.nearest(p)));
  let x = mul(sub(v128.load(C), q), v128.load(C, 16));
  let z = mul(x, x);
  let s = add(v128.load(C, 128), mul(z, v128.load(C, 144)));
  s = add(v128.load(C, 112), mul(z, s));
  s = add(v128.load(C, 96), mul(z, s));
  s = add(v128.load(C, 80), mul(z, s));
  s = add(v128.load(C, 64), mul(z, s));
  s = add(v128.load(C, 48), mul(z, s));
  s = add(v128.load(C, 32), mul(z, s));
  return add(x, mul(mul(x, z), s));
}

/**
 * Adds to out[k], for each of `vectors` waves, the sum over `count` points (a multiple of 2) of
 * (value - centre) cos 2 pi (h.x - phase). Coordinate j of point i stands at x + (j * stride + i) * 8. A wave is the
 * doubles: phase, number of entries, then for each entry its coordinate and h. Sums go by leaves of 64 points, so that
 * the size of blocks (multiples of 64) changes no bit.
 */
export function aliasSums(
  x: usize, stride: i32, count: i32, values: usize, centre: f64, waves: usize, vectors: i32, out: usize,
): void {
  let middle = splat(centre);
  for (let k = 0; k < vectors; k++) {
    let phase = splat(load<f64>(waves));
    let entries = <i32>load<f64>(waves, 8);
    let first = waves + 16;
    for (let begin = 0; begin < count; begin += LEAF) {
      let end = min(count, begin + LEAF);
      let sum = splat(0);
      for (let i = begin; i < end; i += 2) {
        let turns = f64x2.neg(phase);
        let entry = first;
        for (let e = 0; e < entries; e++) {
          let row = x + (<usize>(<i32>load<f64>(entry) * stride + i) << 3);
          turns = add(turns, mul(v128.load64_splat(entry, 8), v128.load(row)));
          entry += 16;
        }
        let f = sub(v128.load(values + (<usize>i << 3)), middle);
        sum = add(sum, mul(f, cosineOfTurns(turns)));
      }
      let total = f64x2.extract_lane(sum, 0) + f64x2.extract_lane(sum, 1);
      store<f64>(out, load<f64>(out) + total);
    }
    waves = first + (<usize>entries << 4);
    out += 8;
  }
}

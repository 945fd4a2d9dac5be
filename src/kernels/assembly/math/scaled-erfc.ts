// Scaled complementary error function exp(z^2) erfc(z), 0 <= z <= 27.5: the slowly varying factor of erfc and of the
// normal distribution function. z + 1 is cut into sixteen equal parts of each binade; each part has its polynomial of
// degree 9 in the distance from its middle (own table, Chebyshev interpolants).
import { add, mul, splat, sub } from "../vector";
import { firsts, seconds } from "./lanes";
import { ERFCX_ROWS } from "./tables/error-function";

const ONE = memory.data<f64>([1.0], 16);
const PART = memory.data<u64>([
  0xffff000000000000, // exponent and the four leading bits of the significand: which part
  0x0000800000000000, // half a part
], 16);

/** exp(z^2) erfc(z) for 0 <= z <= 27.5. */
@inline
export function scaledErfc(z: v128): v128 {
  let one = v128.load_splat<f64>(ONE);
  let u = add(z, one);
  let middle = v128.or(v128.and(u, v128.load_splat<u64>(PART)), v128.load_splat<u64>(PART + 8));
  let h = sub(z, sub(middle, one));
  let i = ERFCX_ROWS + <usize>((i32x4.extract_lane(u, 1) >> 16) - 0x3ff0) * 80;
  let j = ERFCX_ROWS + <usize>((i32x4.extract_lane(u, 3) >> 16) - 0x3ff0) * 80;
  let a = v128.load(i, 64), b = v128.load(j, 64);
  let p = add(firsts(a, b), mul(h, seconds(a, b)));
  a = v128.load(i, 48);
  b = v128.load(j, 48);
  p = add(firsts(a, b), mul(h, add(seconds(a, b), mul(h, p))));
  a = v128.load(i, 32);
  b = v128.load(j, 32);
  p = add(firsts(a, b), mul(h, add(seconds(a, b), mul(h, p))));
  a = v128.load(i, 16);
  b = v128.load(j, 16);
  p = add(firsts(a, b), mul(h, add(seconds(a, b), mul(h, p))));
  a = v128.load(i);
  b = v128.load(j);
  return add(firsts(a, b), mul(h, add(seconds(a, b), mul(h, p))));
}

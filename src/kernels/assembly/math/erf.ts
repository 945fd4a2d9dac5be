// Error function erf(x) = 2/sqrt(pi) * integral of exp(-t^2) from 0 to x.
//
// Odd; for |x| the row of the nearest n/16 gives erf(n/16 + h) as a polynomial of degree 8 in h (own table, Chebyshev
// interpolants), the value at n/16 kept as a pair. One path for all arguments: beyond 6 the nearest double is 1.
// Good for: relative accuracy everywhere, zero and subnormals included. Bad at: 1 - erf(x), for which there is erfc.
// NaN gives NaN.
import { add, mul, sub } from "../vector";
import { firsts, seconds } from "./lanes";
import { ERF_ROWS } from "./tables/error-function";

const NUMBERS = memory.data<f64>([
  6.0,
  422212465065984.0, // 1.5 * 2^48: adding it rounds to a multiple of 1/16 and leaves 16 times the result in the low bits
  -0.0,
], 16);

@inline
function number(k: usize): v128 {
  return v128.load_splat<f64>(NUMBERS + (k << 3));
}

/** erf of two numbers; see docs/kernels.md for the measured error. */
export function vec_erf(x: v128): v128 {
  let y = f64x2.pmin(number(0), f64x2.abs(x)); // NaN becomes 6 here and comes back at the end
  let t = add(y, number(1));
  let h = sub(y, sub(t, number(1)));
  let i = ERF_ROWS + <usize>(i32x4.extract_lane(t, 0) & 127) * 80;
  let j = ERF_ROWS + <usize>(i32x4.extract_lane(t, 2) & 127) * 80;
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
  p = add(firsts(a, b), add(seconds(a, b), mul(h, p)));
  p = v128.or(p, v128.and(x, number(2)));
  return v128.bitselect(x, p, f64x2.ne(x, x));
}

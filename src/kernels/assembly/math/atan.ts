// Arctangent of x and of y/x in the right quadrant.
//
// atan x = atan c + atan((x - c) / (1 + c x)), with c = p/q the middle of one of 194 cells of |x| (the outer ones have
// c = 0 and infinity) and atan c from a table in two parts; the second term is at most 2^-6, so that its rounding errors
// hardly count. Table-lookup form of the addition theorem as in P. T. P. Tang, "Table-lookup algorithms for elementary
// functions and their error analysis", Proceedings of the 10th IEEE Symposium on Computer Arithmetic (1991) 232-236.
// Good for: every x within 0.6 ulp. atan2, within 1 ulp, takes y and x themselves: only its smallest angles are the
// plain quotient of the two.
import { add, div, mul, sub } from "../vector";
import { upper } from "./doubledouble";
import { both, firsts, seconds, signOf, withSign } from "./lanes";
import { ATAN_TABLE } from "./tables/atan";

const C = memory.data<f64>(
  [
    1.7976931348623157e308, 1.7976931348623157e308, // largest number
    64, 64, // beginning of the last cell
    0.015624999999999998, 0.015624999999999998, // end of the first cell: the number before 2^-6
    0.3333333333333333, 0.3333333333333333, // (z - atan z) / z^3 in z^2 for |z| <= 2^-6; error 2^-67
    -0.19999999999966742, -0.19999999999966742,
    0.14285713605926809, 0.14285713605926809,
    -0.11106664569532416, -0.11106664569532416,
    3.141592653589793, 3.141592653589793, // pi
    1.2246467991473532e-16, 1.2246467991473532e-16,
    3.0549363634996047e-151, 3.0549363634996047e-151, // 2^-500
    3.273390607896142e150, 3.273390607896142e150, // 2^500
  ],
  16,
);

/** Address of the entry for |x| clamped to the cells; 16271 is the word in front of the first octave. */
@inline
function entry(clamped: v128, lane: i32): usize {
  let high = lane == 0 ? i32x4.extract_lane(clamped, 1) : i32x4.extract_lane(clamped, 3);
  return ATAN_TABLE + (<usize>((high >>> 16) - 16271) << 5);
}

@inline
function clamp(a: v128): v128 {
  return f64x2.pmin(f64x2.pmax(a, v128.load(C, 32)), v128.load(C, 16));
}

/** z - atan z. */
@inline
function tail(z: v128): v128 {
  let s = mul(z, z);
  let p = add(v128.load(C, 80), mul(s, v128.load(C, 96)));
  return mul(mul(z, s), add(v128.load(C, 48), mul(s, add(v128.load(C, 64), mul(s, p)))));
}

/** Arctangent of finite a >= 0. */
@inline
function core(a: v128): v128 {
  let c = clamp(a);
  let i = entry(c, 0), j = entry(c, 1);
  let i0 = v128.load(i), j0 = v128.load(j), i1 = v128.load(i, 16), j1 = v128.load(j, 16);
  let p = firsts(i0, j0), q = seconds(i0, j0);
  let z = div(sub(mul(a, q), p), add(q, mul(a, p)));
  return add(firsts(i1, j1), add(z, sub(seconds(i1, j1), tail(z))));
}

export function atan_special(x: v128): v128 {
  let a = f64x2.pmin(f64x2.abs(x), v128.load(C)); // the arctangent of the largest number is pi/2
  let value = withSign(core(v128.bitselect(a, f64x2.splat(0), f64x2.eq(a, a))), signOf(x));
  return v128.bitselect(x, value, f64x2.ne(x, x));
}

/** Arctangent of x. */
export function vec_atan(x: v128): v128 {
  let a = f64x2.abs(x);
  if (both(f64x2.le(a, v128.load(C)))) return withSign(core(a), signOf(x));
  return atan_special(x);
}

/** Angle of (x, y), y >= 0, whose magnitudes lie between 2^-500 and 2^500. */
@inline
function angle(y: v128, x: v128): v128 {
  let a = f64x2.abs(x);
  let c = clamp(div(y, a));
  let i = entry(c, 0), j = entry(c, 1);
  let i0 = v128.load(i), j0 = v128.load(j), i1 = v128.load(i, 16), j1 = v128.load(j, 16);
  let p = firsts(i0, j0), q = seconds(i0, j0), high = firsts(i1, j1), low = seconds(i1, j1);
  let top = upper(a);
  let numerator = sub(sub(mul(y, q), mul(p, top)), mul(p, sub(a, top)));
  let z = div(numerator, add(mul(a, q), mul(y, p)));
  // left half-plane: pi - (high + low + atan z)
  let left = f64x2.lt(x, f64x2.splat(0));
  let pi = v128.load(C, 112);
  let h = sub(pi, high);
  let l = sub(add(sub(sub(pi, h), high), v128.load(C, 128)), low);
  let flip = v128.and(left, f64x2.splat(-0.0));
  let rest = v128.xor(sub(z, tail(z)), flip);
  return add(v128.bitselect(h, high, left), add(rest, v128.bitselect(l, low, left)));
}

@inline
function inRange(a: v128): v128 {
  return v128.and(f64x2.ge(a, v128.load(C, 144)), f64x2.le(a, v128.load(C, 160)));
}

/** Angle of (x, y) whatever they are. */
function anyAngle(y: f64, x: f64): f64 {
  if (x != x || y != y) return NaN;
  let b = abs(y), a = abs(x);
  let left = reinterpret<i64>(x) < 0;
  let value: f64;
  if (a == Infinity && b == Infinity) a = b = 1;
  let largest = max(a, b);
  let scale = largest > 3.273390607896142e150 ? 2.409919865102884e-181 : largest < 3.0549363634996047e-151 ? 4.149515568880993e180 : 1.0; // 2^-600, 2^600
  let bs = b * scale, as = a * scale;
  if (b == 0 || bs < as * 7.888609052210118e-31) {
    // below 2^-100: the quotient itself, or pi
    value = left ? 3.141592653589793 : b == 0 ? 0.0 : b / a;
  } else if (as < bs * 7.888609052210118e-31) {
    value = 1.5707963267948966;
  } else {
    value = f64x2.extract_lane(angle(f64x2.splat(bs), f64x2.splat(left ? -as : as)), 0);
  }
  return copysign(value, y);
}

export function atan2_special(y: v128, x: v128): v128 {
  let first = anyAngle(f64x2.extract_lane(y, 0), f64x2.extract_lane(x, 0));
  let second = anyAngle(f64x2.extract_lane(y, 1), f64x2.extract_lane(x, 1));
  return f64x2.replace_lane(f64x2.splat(first), 1, second);
}

/** Angle of the point (x, y), from -pi to pi, with the conventions of IEEE 754-2019 for zeros and infinities. */
export function vec_atan2(y: v128, x: v128): v128 {
  let b = f64x2.abs(y);
  if (both(v128.and(inRange(b), inRange(f64x2.abs(x))))) return withSign(angle(b, x), signOf(y));
  return atan2_special(y, x);
}

// Sine, cosine and tangent.
//
// x = k pi/64 + r with pi/64 in three parts (W. J. Cody and W. Waite, "Software Manual for the Elementary Functions",
// Prentice-Hall 1980, chapter 8), the first two of 35 bits so that their products with |k| < 2^18 are exact; then
// sin(a + r) = sin a + cos a sin r - sin a (1 - cos r) with sin a, cos a from a table of 128 angles (P. T. P. Tang,
// "Table-lookup algorithms for elementary functions and their error analysis", Proceedings of the 10th IEEE Symposium on
// Computer Arithmetic (1991) 232-236). The cosine is the sine 32 entries further on.
// Good for: every x; |x| <= 8192 on the fast path, beyond it by huge-angle.ts. Within 0.6 ulp, the tangent 2 ulp.
import { add, div, mul, sub } from "../vector";
import { REST, hugeAngle } from "./huge-angle";
import { both, firsts, seconds } from "./lanes";
import { SINE_TABLE } from "./tables/sine";

const C = memory.data<f64>(
  [
    8192, 8192,
    20.371832715762604, 20.371832715762604, // 64 / pi
    6755399441055744, 6755399441055744, // 1.5 * 2^52: adding it rounds to an integer
    0.049087385212260415, 0.049087385212260415, // pi/64, 35 bits
    8.010450472707245e-14, 8.010450472707245e-14, // the next 35 bits
    1.0256261071479689e-23, 1.0256261071479689e-23, // the rest
    0.16666666666666666, 0.16666666666666666, // (r - sin r) / r^3, relative error of sin r: 2^-65
    -0.008333333332769715, -0.008333333332769715,
    0.00019841020588573112, 0.00019841020588573112,
    0.49999999999999983, 0.49999999999999983, // (1 - cos r) / r^2, error of cos r: 2^-63
    -0.04166666666159411, -0.04166666666159411,
    0.001388866456176926, 0.001388866456176926,
  ],
  16,
);

/** Sine, the sine a quarter turn on, and the quotient of the two. */
const SINE: i32 = 0;
const COSINE: i32 = 1;
const TANGENT: i32 = 2;

@inline
function offset(index: v128, lane: i32, ahead: i32): i32 {
  let k = lane == 0 ? i32x4.extract_lane(index, 0) : i32x4.extract_lane(index, 2);
  return ((k + ahead) & 127) << 5;
}

/**
 * The sine of k pi/64 plus an angle whose sine is r - lack and whose cosine is 1 - versine; `ahead` is added to k. Near the zeros sin a + (+-r) is
 * the whole result but for small terms, so that sum is taken first and with its error. Written so that -0 gives -0.
 */
@inline
function turned(index: v128, ahead: i32, r: v128, lack: v128, versine: v128): v128 {
  let i = SINE_TABLE + <usize>offset(index, 0, ahead), j = SINE_TABLE + <usize>offset(index, 1, ahead);
  let i0 = v128.load(i), j0 = v128.load(j), i1 = v128.load(i, 16), j1 = v128.load(j, 16);
  let s = firsts(i0, j0), unit = seconds(i1, j1);
  let signed = mul(r, unit);
  let h = add(s, signed);
  let small = sub(mul(s, versine), mul(seconds(i0, j0), sub(r, lack)));
  small = sub(add(mul(unit, lack), small), firsts(i1, j1));
  return sub(h, add(sub(sub(h, s), signed), small));
}

/** The function `kind` of k pi/64 + r - lack, |lack| far below |r| or below 2^-60. */
@inline
function finish(index: v128, r: v128, lack: v128, kind: i32): v128 {
  let z = mul(r, r);
  let cubic = add(v128.load(C, 96), mul(z, add(v128.load(C, 112), mul(z, v128.load(C, 128)))));
  lack = add(mul(mul(r, z), cubic), lack);
  let versine = mul(z, add(v128.load(C, 144), mul(z, add(v128.load(C, 160), mul(z, v128.load(C, 176))))));
  if (kind == SINE) return turned(index, 0, r, lack, versine);
  if (kind == COSINE) return turned(index, 32, r, lack, versine);
  return div(turned(index, 0, r, lack, versine), turned(index, 32, r, lack, versine));
}

/** For |x| <= 8192. */
@inline
function core(x: v128, kind: i32): v128 {
  let index = add(mul(x, v128.load(C, 16)), v128.load(C, 32));
  let k = sub(index, v128.load(C, 32));
  let t = sub(x, mul(k, v128.load(C, 48)));
  let w = mul(k, v128.load(C, 64));
  let r = sub(t, w);
  let lack = add(sub(w, sub(t, r)), mul(k, v128.load(C, 80)));
  return finish(index, r, lack, kind);
}

@inline
function isPlain(x: v128): bool {
  return both(f64x2.le(f64x2.abs(x), v128.load(C)));
}

@inline
function special(x: v128, kind: i32): v128 {
  let plain = f64x2.le(f64x2.abs(x), v128.load(C));
  let y = core(v128.and(x, plain), kind);
  let k0 = hugeAngle(f64x2.extract_lane(x, 0));
  let r0 = load<f64>(REST), l0 = load<f64>(REST, 8);
  let k1 = hugeAngle(f64x2.extract_lane(x, 1));
  let r1 = load<f64>(REST), l1 = load<f64>(REST, 8);
  let index = i64x2.replace_lane(i64x2.splat(<i64>k0), 1, <i64>k1);
  let r = f64x2.replace_lane(f64x2.splat(r0), 1, r1);
  let lack = f64x2.neg(f64x2.replace_lane(f64x2.splat(l0), 1, l1));
  let value = v128.bitselect(y, finish(index, r, lack, kind), plain);
  // infinity minus infinity, and NaN, have no sine
  return v128.bitselect(value, f64x2.splat(NaN), f64x2.lt(f64x2.abs(x), f64x2.splat(Infinity)));
}

// The rare paths are exported so that the optimiser keeps them as calls: a spliced kernel carries its fast path only.
export function sin_special(x: v128): v128 {
  return special(x, SINE);
}

/** Sine of x in radians. */
export function vec_sin(x: v128): v128 {
  if (isPlain(x)) return core(x, SINE);
  return sin_special(x);
}

export function cos_special(x: v128): v128 {
  return special(x, COSINE);
}

/** Cosine of x in radians. */
export function vec_cos(x: v128): v128 {
  if (isPlain(x)) return core(x, COSINE);
  return cos_special(x);
}

export function tan_special(x: v128): v128 {
  return special(x, TANGENT);
}

/** Tangent of x in radians. */
export function vec_tan(x: v128): v128 {
  if (isPlain(x)) return core(x, TANGENT);
  return tan_special(x);
}

// e^x and e^x - 1.
//
// Table-driven after P. T. P. Tang, "Table-driven implementation of the exponential function in IEEE floating-point
// arithmetic", ACM Transactions on Mathematical Software 15 (1989) 144-157: x = n ln2/128 + r, |r| <= ln2/256,
// e^x = 2^(n/128) (1 + p(r)) with 2^(j/128) from a table of 128 high and low parts.
// Good for: every x, within 0.52 ulp (expm1: 1 ulp) where the result is normal, 1 ulp more where it is subnormal.
import { add, mul, sub } from "../vector";
import { fastSumError } from "./doubledouble";
import { both, firsts, scaled, seconds, signOf, withSign } from "./lanes";
import { EXP_TABLE } from "./tables/exp";

const C = memory.data<f64>(
  [
    690, 690, // up to here no step of e^x or e^-x leaves the normal numbers
    184.6649652337873, 184.6649652337873, // 128 / ln 2
    6755399441055744, 6755399441055744, // 1.5 * 2^52: adding it rounds to an integer
    0.005415212347998022, 0.005415212347998022, // ln2/128, leading 35 bits: n times this is exact
    1.2655086083325438e-13, 1.2655086083325438e-13, // the rest of ln2/128
    0.4999999999999906, 0.4999999999999906, // (e^r - 1 - r) / r^2; relative error of e^r - 1: 2^-55.2
    0.16666666666666533, 0.16666666666666533,
    0.04166667686916893, 0.04166667686916893,
    0.00833333479083362, 0.00833333479083362,
    -760, -760, // clamps of the rare path
    720, 720,
    1, 1,
  ],
  16,
);

/** n + 1.5 * 2^52 with n = x * 128 / ln 2 rounded. */
@inline
export function expIndex(x: v128): v128 {
  return add(mul(x, v128.load(C, 16)), v128.load(C, 32));
}

/** r = x - n ln2/128. */
@inline
export function expRest(x: v128, index: v128): v128 {
  let n = sub(index, v128.load(C, 32));
  return sub(sub(x, mul(n, v128.load(C, 48))), mul(n, v128.load(C, 64)));
}

/** e^r - 1 - r. */
@inline
export function expTail(r: v128): v128 {
  let r2 = mul(r, r);
  let low = add(v128.load(C, 80), mul(r, v128.load(C, 96)));
  let high = add(v128.load(C, 112), mul(r, v128.load(C, 128)));
  return mul(r2, add(low, mul(r2, high)));
}

@inline
export function expEntry(index: v128, lane: i32): v128 {
  let n = lane == 0 ? i32x4.extract_lane(index, 0) : i32x4.extract_lane(index, 2);
  return v128.load(EXP_TABLE + <usize>((n & 127) << 4));
}

/** e^(x + low) for |x| <= 690 and |low| so small that it matters to first order only. */
@inline
export function expCoreLow(x: v128, low: v128): v128 {
  let index = expIndex(x);
  let a = expEntry(index, 0), b = expEntry(index, 1);
  let s = i64x2.add(seconds(a, b), i64x2.shl(index, 45));
  let r = add(expRest(x, index), low);
  return add(s, mul(s, add(r, add(expTail(r), firsts(a, b)))));
}

/** e^x for |x| <= 690. */
@inline
export function expCore(x: v128): v128 {
  let index = expIndex(x);
  let a = expEntry(index, 0), b = expEntry(index, 1);
  let s = i64x2.add(seconds(a, b), i64x2.shl(index, 45));
  let r = expRest(x, index);
  return add(s, mul(s, add(r, add(expTail(r), firsts(a, b)))));
}

/** True where both lanes may go through expCore; false for NaN. */
@inline
export function expIsPlain(x: v128): bool {
  return both(f64x2.le(f64x2.abs(x), v128.load(C)));
}

/** e^(x + low) * 2^shift for every x, to infinity and through the subnormals to 0; NaN stays NaN. */
export function expAnywhere(x: v128, low: v128, shift: i32): v128 {
  let y = f64x2.pmin(f64x2.pmax(x, v128.load(C, 144)), v128.load(C, 160));
  let index = expIndex(y);
  let a = expEntry(index, 0), b = expEntry(index, 1);
  let n0 = i32x4.extract_lane(index, 0), n1 = i32x4.extract_lane(index, 2);
  let j = i64x2.replace_lane(i64x2.splat(<i64>(n0 & 127) << 45), 1, <i64>(n1 & 127) << 45);
  let s = i64x2.add(seconds(a, b), j);
  let r = add(expRest(y, index), low);
  let value = add(s, mul(s, add(r, add(expTail(r), firsts(a, b)))));
  return v128.bitselect(x, scaled(value, (n0 >> 7) + shift, (n1 >> 7) + shift), f64x2.ne(x, x));
}

// The rare paths are exported so that the optimiser keeps them as calls: a spliced kernel carries its fast path only.
export function exp_special(x: v128): v128 {
  return expAnywhere(x, f64x2.splat(0), 0);
}

/** e^x. */
export function vec_exp(x: v128): v128 {
  if (expIsPlain(x)) return expCore(x);
  return exp_special(x);
}

/** e^x - 1 for |x| <= 690, full relative precision near 0. */
@inline
export function expm1Core(x: v128): v128 {
  let index = expIndex(x);
  let a = expEntry(index, 0), b = expEntry(index, 1);
  let s = i64x2.add(seconds(a, b), i64x2.shl(index, 45));
  let n = sub(index, v128.load(C, 32));
  let exact = sub(x, mul(n, v128.load(C, 48))), rest = mul(n, v128.load(C, 64));
  let r = sub(exact, rest);
  // s (1 + r + tail) - 1 = (s - 1) + r + ((s - 1) r + s tail): near 0 only the small last term has roundings of note.
  let one = v128.load(C, 176);
  let h = sub(s, one), g = add(h, one);
  let low = sub(sub(s, g), sub(one, sub(g, h)));
  let sum = add(h, exact);
  low = sub(add(low, fastSumError(h, exact, sum)), rest);
  let e = firsts(a, b);
  low = add(low, add(mul(h, r), mul(s, add(expTail(r), add(e, mul(e, r))))));
  return withSign(add(sum, low), signOf(x));
}

export function expm1_special(x: v128): v128 {
  let high = f64x2.pmin(x, v128.load(C));
  let y = expm1Core(f64x2.pmax(high, f64x2.neg(v128.load(C))));
  let beyond = v128.not(f64x2.le(f64x2.abs(x), v128.load(C)));
  let z = withSign(sub(exp_special(x), v128.load(C, 176)), signOf(x));
  return v128.bitselect(z, y, beyond);
}

/** e^x - 1. */
export function vec_expm1(x: v128): v128 {
  if (expIsPlain(x)) return expm1Core(x);
  return expm1_special(x);
}

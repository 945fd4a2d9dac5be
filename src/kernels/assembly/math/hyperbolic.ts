// Hyperbolic sine, cosine and tangent.
//
// With E = e^|x| - 1: sinh |x| = (E + E/(E + 1))/2, tanh |x| = D/(D + 2) where D = e^(2|x|) - 1, cosh x = (e^|x| + e^-|x|)/2
// (identities; the first two after FDLIBM 5.3, Sun Microsystems 1993). No cancellation anywhere, since expm1 is accurate near 0.
// Good for: every x within 2 ulp; beyond |x| = 690 half an exponential, which ends in infinity where the result does.
import { add, div, mul } from "../vector";
import { expAnywhere, expCore, expIsPlain, expm1Core } from "./exp";
import { signOf, withSign } from "./lanes";

const C = memory.data<f64>([690, 690, 0.5, 0.5, 1, 1, 2, 2], 16);

@inline
function sineOf(a: v128): v128 {
  let e = expm1Core(a);
  return mul(v128.load(C, 16), add(e, div(e, add(e, v128.load(C, 32)))));
}

@inline
function cosineOf(a: v128): v128 {
  let e = expCore(a);
  return mul(v128.load(C, 16), add(e, div(v128.load(C, 32), e)));
}

@inline
function tangentOf(a: v128): v128 {
  let d = expm1Core(add(a, a));
  return div(d, add(d, v128.load(C, 48)));
}

/** `plain` where |x| <= 690, e^|x| / 2 elsewhere and for NaN. */
@inline
function beyond(a: v128, plain: v128): v128 {
  return v128.bitselect(plain, expAnywhere(a, f64x2.splat(0), -1), f64x2.le(a, v128.load(C)));
}

// The rare paths are exported so that the optimiser keeps them as calls: a spliced kernel carries its fast path only.
export function sinh_special(x: v128): v128 {
  let a = f64x2.abs(x);
  return withSign(beyond(a, sineOf(f64x2.pmin(a, v128.load(C)))), signOf(x));
}

/** Hyperbolic sine of x. */
export function vec_sinh(x: v128): v128 {
  if (expIsPlain(x)) return withSign(sineOf(f64x2.abs(x)), signOf(x));
  return sinh_special(x);
}

export function cosh_special(x: v128): v128 {
  let a = f64x2.abs(x);
  return beyond(a, cosineOf(f64x2.pmin(a, v128.load(C))));
}

/** Hyperbolic cosine of x. */
export function vec_cosh(x: v128): v128 {
  if (expIsPlain(x)) return cosineOf(f64x2.abs(x));
  return cosh_special(x);
}

export function tanh_special(x: v128): v128 {
  let half = mul(v128.load(C), v128.load(C, 16));
  let value = withSign(tangentOf(f64x2.pmin(f64x2.abs(x), half)), signOf(x));
  return v128.bitselect(x, value, f64x2.ne(x, x));
}

/** Hyperbolic tangent of x. */
export function vec_tanh(x: v128): v128 {
  let a = f64x2.abs(x);
  if (expIsPlain(add(a, a))) return withSign(tangentOf(a), signOf(x));
  return tanh_special(x);
}

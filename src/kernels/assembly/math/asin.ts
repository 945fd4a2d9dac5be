// Arcsine and arccosine.
//
// asin s = s + s z P(z), z = s^2 <= 1/4; above 1/2 by asin x = pi/2 - 2 asin sqrt((1 - x)/2), with the rounding error of
// the root carried along (the classical reduction: W. J. Cody and W. Waite, "Software Manual for the Elementary
// Functions", Prentice-Hall 1980, chapter 10). Both ranges share one polynomial, so that there is no branch.
// Good for: |x| <= 1 within 1 ulp; NaN elsewhere.
import { add, div, mul, sub } from "../vector";
import { productError } from "./doubledouble";
import { signOf, withSign } from "./lanes";

const C = memory.data<f64>(
  [
    1, 1,
    0.5, 0.5,
    2.2250738585072014e-308, 2.2250738585072014e-308, // keeps 0/0 away at |x| = 1
    1.5707963267948966, 1.5707963267948966, // pi/2
    6.123233995736766e-17, 6.123233995736766e-17,
    3.141592653589793, 3.141592653589793, // pi
    1.2246467991473532e-16, 1.2246467991473532e-16,
    0.16666666666666669, 0.16666666666666669, // (asin s - s) / s^3 in s^2 <= 1/4; relative error of asin s: 2^-57
    0.07499999999998433, 0.07499999999998433,
    0.044642857146355436, 0.044642857146355436,
    0.030381944138530792, 0.030381944138530792,
    0.0223721729421645, 0.0223721729421645,
    0.01735239272057948, 0.01735239272057948,
    0.013971212977324232, 0.013971212977324232,
    0.01147917738229329, 0.01147917738229329,
    0.01032281454438744, 0.01032281454438744,
    0.005457505952877555, 0.005457505952877555,
    0.017400881373986626, 0.017400881373986626,
    -0.014851889888344275, -0.014851889888344275,
    0.02875785317504976, 0.02875785317504976,
  ],
  16,
);

/** (asin s - s) / s = z P(z), in pairs of terms to shorten the chain. */
@inline
function tail(z: v128): v128 {
  let z2 = mul(z, z);
  let z4 = mul(z2, z2);
  let a = add(v128.load(C, 112), mul(z, v128.load(C, 128)));
  let b = add(v128.load(C, 144), mul(z, v128.load(C, 160)));
  let c = add(v128.load(C, 176), mul(z, v128.load(C, 192)));
  let d = add(v128.load(C, 208), mul(z, v128.load(C, 224)));
  let e = add(v128.load(C, 240), mul(z, v128.load(C, 256)));
  let f = add(v128.load(C, 272), mul(z, v128.load(C, 288)));
  let low = add(a, mul(z2, b)), middle = add(c, mul(z2, d));
  let high = add(add(e, mul(z2, f)), mul(z4, v128.load(C, 304)));
  return mul(z, add(low, mul(z4, add(middle, mul(z4, high)))));
}

/** What sqrt(z) lacks, given s = sqrt(z) rounded. */
@inline
function rootError(z: v128, s: v128): v128 {
  let p = mul(s, s);
  return div(sub(sub(z, p), productError(s, s, p)), add(add(s, s), v128.load(C, 32)));
}

/** Arcsine of x. */
export function vec_asin(x: v128): v128 {
  let a = f64x2.abs(x);
  let large = f64x2.gt(a, v128.load(C, 16));
  let reflected = mul(sub(v128.load(C), a), v128.load(C, 16));
  let z = v128.bitselect(reflected, mul(a, a), large);
  let s = v128.bitselect(f64x2.sqrt(reflected), a, large);
  let p = mul(s, tail(z));
  let twice = add(s, s), quarter = v128.load(C, 48);
  let h = sub(quarter, twice);
  let rest = add(rootError(reflected, s), p);
  let low = sub(add(sub(sub(quarter, h), twice), v128.load(C, 64)), add(rest, rest));
  return withSign(v128.bitselect(add(h, low), add(s, p), large), signOf(x));
}

/** Arccosine of x. */
export function vec_acos(x: v128): v128 {
  let a = f64x2.abs(x), sign = signOf(x);
  let large = f64x2.gt(a, v128.load(C, 16));
  let reflected = mul(sub(v128.load(C), a), v128.load(C, 16));
  let z = v128.bitselect(reflected, mul(a, a), large);
  let root = f64x2.sqrt(reflected);
  let s = v128.bitselect(add(root, root), a, large);
  let p = mul(s, tail(z));
  let error = rootError(reflected, root);
  let rest = add(p, v128.and(add(error, error), large));
  // middle: pi/2 -+ asin a; left: pi - 2 asin root; right: 0 + 2 asin root
  let left = v128.and(large, f64x2.lt(x, f64x2.splat(0)));
  let base = v128.bitselect(v128.load(C, 80), v128.andnot(v128.load(C, 48), large), left);
  let low = v128.bitselect(v128.load(C, 96), v128.andnot(v128.load(C, 64), large), left);
  let flip = v128.and(v128.xor(large, sign), f64x2.splat(-0.0));
  s = v128.xor(s, flip);
  let h = sub(base, s);
  return add(h, add(sub(sub(base, h), s), sub(low, v128.xor(rest, flip))));
}

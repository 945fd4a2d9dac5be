// x to the power y, with the special cases of IEEE 754-2019, section 9.2.1, for real results: a negative base needs an
// integer exponent, else NaN.
//
// e^(y log x) with log x to 68 bits (log-double.ts), so that the 10 bits which the exponential loses are there to be lost.
// Good for: the full range within 0.52 ulp, 1 ulp where the result is subnormal.
import { mul } from "../vector";
import { ANY_POWER, POWER, logThen } from "./log-double";
import { logBias, logIsPlain } from "./log";

const C = memory.data<f64>(
  [
    1, 1,
    2.2250738585072014e-308, 2.2250738585072014e-308, // smallest normal number
    18014398509481984, 18014398509481984, // 2^54
    54, 54,
    1e300, 1e300, // as good as infinity for an exponent: the nearest logarithm to 0 is 1.1e-16
    1.7976931348623157e308, 1.7976931348623157e308, // largest number
  ],
  16,
);

export function pow_special(x: v128, y: v128): v128 {
  let one = v128.load(C), zero = f64x2.splat(0), infinity = f64x2.splat(Infinity);
  let base = f64x2.abs(x);
  // |x|^y for finite base > 0
  let ordinary = v128.and(f64x2.gt(base, zero), f64x2.le(base, v128.load(C, 80)));
  let b = v128.bitselect(base, one, ordinary);
  let tiny = f64x2.lt(b, v128.load(C, 16));
  b = v128.bitselect(mul(b, v128.load(C, 32)), b, tiny);
  let limit = v128.load(C, 64);
  let e = f64x2.pmin(f64x2.pmax(y, f64x2.neg(limit)), limit);
  let value = logThen(b, f64x2.add(logBias(), v128.and(tiny, v128.load(C, 48))), e, zero, ANY_POWER);
  // 0 and infinity as bases
  let up = v128.xor(f64x2.lt(y, zero), f64x2.gt(base, one));
  value = v128.bitselect(value, v128.and(infinity, up), ordinary);
  // the sign of the base
  let whole = f64x2.eq(f64x2.trunc(y), y);
  let half = mul(y, f64x2.splat(0.5));
  let odd = v128.and(whole, f64x2.ne(f64x2.trunc(half), half));
  value = v128.or(value, v128.and(v128.and(odd, x), f64x2.splat(-0.0)));
  let refused = v128.andnot(v128.and(f64x2.lt(x, zero), ordinary), whole);
  value = v128.bitselect(f64x2.splat(NaN), value, refused);
  // NaN, and the two cases that win over it
  value = v128.bitselect(f64x2.add(x, y), value, v128.or(f64x2.ne(x, x), f64x2.ne(y, y)));
  return v128.bitselect(one, value, v128.or(f64x2.eq(y, zero), f64x2.eq(x, one)));
}

/** x^y. */
export function vec_pow(x: v128, y: v128): v128 {
  if (logIsPlain(x)) return logThen(x, logBias(), y, f64x2.splat(0), POWER);
  return pow_special(x, y);
}

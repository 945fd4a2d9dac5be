// Cube root: e^(log|x| / 3) with the logarithm to 68 bits (log-double.ts), and the sign of x.
// Good for: every x within 0.51 ulp; cubes of whole numbers give whole numbers.
import { add, mul } from "../vector";
import { signOf, withSign } from "./lanes";
import { logBias, logIsPlain } from "./log";
import { ROOT, logThen } from "./log-double";

const C = memory.data<f64>(
  [
    0.3333333333333333, 0.3333333333333333, // 1/3
    1.850371707708594e-17, 1.850371707708594e-17,
    2.2250738585072014e-308, 2.2250738585072014e-308, // smallest normal number
    18014398509481984, 18014398509481984, // 2^54
    54, 54,
    1.7976931348623157e308, 1.7976931348623157e308, // largest number
  ],
  16,
);

export function cbrt_special(x: v128): v128 {
  let a = f64x2.abs(x);
  let tiny = f64x2.lt(a, v128.load(C, 32));
  let b = v128.bitselect(mul(a, v128.load(C, 48)), a, tiny);
  let bias = add(logBias(), v128.and(tiny, v128.load(C, 64)));
  let value = withSign(logThen(b, bias, v128.load(C), v128.load(C, 16), ROOT), signOf(x));
  let ordinary = v128.and(f64x2.gt(a, f64x2.splat(0)), f64x2.le(a, v128.load(C, 80)));
  return v128.bitselect(value, x, ordinary);
}

/** Cube root of x, with the sign of x. */
export function vec_cbrt(x: v128): v128 {
  let a = f64x2.abs(x);
  if (logIsPlain(a)) return withSign(logThen(a, logBias(), v128.load(C), v128.load(C, 16), ROOT), signOf(x));
  return cbrt_special(x);
}

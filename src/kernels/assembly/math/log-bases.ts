// Logarithms to base 2 and 10: log x to 68 bits (log-double.ts) times 1/log 2 or 1/log 10 in double-double.
// Good for: every x > 0 within 0.51 ulp; whole powers of the base give whole numbers.
import { add, mul } from "../vector";
import { logBias, logIsPlain, logLimits } from "./log";
import { PRODUCT, logThen } from "./log-double";

const C = memory.data<f64>(
  [
    1.4426950408889634, 1.4426950408889634, // 1 / log 2
    2.0355273740931033e-17, 2.0355273740931033e-17,
    0.4342944819032518, 0.4342944819032518, // 1 / log 10
    1.098319650216765e-17, 1.098319650216765e-17,
    2.2250738585072014e-308, 2.2250738585072014e-308, // smallest normal number
    18014398509481984, 18014398509481984, // 2^54
    54, 54,
  ],
  16,
);

@inline
function anywhere(x: v128, factor: v128, low: v128): v128 {
  let tiny = f64x2.lt(x, v128.load(C, 64));
  let y = v128.bitselect(mul(x, v128.load(C, 80)), x, tiny);
  return logLimits(x, logThen(y, add(logBias(), v128.and(tiny, v128.load(C, 96))), factor, low, PRODUCT));
}

export function log2_special(x: v128): v128 {
  return anywhere(x, v128.load(C), v128.load(C, 16));
}

/** log x / log 2. */
export function vec_log2(x: v128): v128 {
  if (logIsPlain(x)) return logThen(x, logBias(), v128.load(C), v128.load(C, 16), PRODUCT);
  return log2_special(x);
}

export function log10_special(x: v128): v128 {
  return anywhere(x, v128.load(C, 32), v128.load(C, 48));
}

/** log x / log 10. */
export function vec_log10(x: v128): v128 {
  if (logIsPlain(x)) return logThen(x, logBias(), v128.load(C, 32), v128.load(C, 48), PRODUCT);
  return log10_special(x);
}

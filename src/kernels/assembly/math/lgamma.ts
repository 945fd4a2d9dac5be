// Logarithm of the gamma function for x >= 0.
//
// From 3/4 to 12: (x - 1)(x - 2) times a table of polynomials for log gamma(x) / ((x - 1)(x - 2)), so the relative
// accuracy holds through the zeros at 1 and 2. Below 3/4: log gamma(1 + x) - log x. From 12 on: Stirling's series
// (x - 1/2)(log x - 1) + (log(2 pi) - 1) / 2 + ... (DLMF 5.11.1).
// Good for: relative accuracy on the whole half-line. Bad at: x < 0, where it gives NaN, as mathjs does.
// 0 and -0 give +infinity, +infinity gives +infinity, NaN gives NaN.
import { nearestEighth, polynomial12, stirlingRest } from "./gamma-parts";
import { vec_log } from "./log";
import { LGAMMA_ROWS } from "./tables/gamma-function";

@inline
function log(x: f64): f64 {
  return f64x2.extract_lane(vec_log(f64x2.splat(x)), 0);
}

/** log gamma(x) / ((x - 1)(x - 2)) for 0.75 <= x <= 12. */
@inline
function slope(x: f64): f64 {
  let c = nearestEighth(x);
  let h = x - c;
  let row = LGAMMA_ROWS + (<usize>(c * 8.0) - 6) * 112;
  return load<f64>(row) + h * (load<f64>(row, 8) + h * polynomial12(h, row + 16));
}

export function lgammaOne(x: f64): f64 {
  if (x >= 0.75) {
    if (x < 12.0) return (x - 1.0) * ((x - 2.0) * slope(x));
    if (x == Infinity) return x;
    return (x - 0.5) * (log(x) - 1.0) + (0.41893853320467267 + stirlingRest(x)); // (log(2 pi) - 1) / 2
  }
  if (x >= 0.0) return x * ((x - 1.0) * slope(1.0 + x)) - log(x);
  return NaN;
}

/** log gamma of two numbers; see docs/kernels.md for the measured error. */
export function vec_lgamma(x: v128): v128 {
  return f64x2(lgammaOne(f64x2.extract_lane(x, 0)), lgammaOne(f64x2.extract_lane(x, 1)));
}

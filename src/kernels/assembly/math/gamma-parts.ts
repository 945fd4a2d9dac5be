// What the gamma function and its logarithm share: rows of the tables and the remainder of Stirling's series.
//
// Scalar: the cases of the two functions differ too much between lanes for two-lane code to gain anything.
import { STIRLING_ROW } from "./tables/gamma-function";

/** Polynomial with the twelve coefficients at `at`, lowest power first; two interleaved Horner chains. */
@inline
export function polynomial12(h: f64, at: usize): f64 {
  let h2 = h * h;
  let p = load<f64>(at, 80) + h * load<f64>(at, 88);
  p = load<f64>(at, 64) + h * load<f64>(at, 72) + h2 * p;
  p = load<f64>(at, 48) + h * load<f64>(at, 56) + h2 * p;
  p = load<f64>(at, 32) + h * load<f64>(at, 40) + h2 * p;
  p = load<f64>(at, 16) + h * load<f64>(at, 24) + h2 * p;
  return load<f64>(at) + h * load<f64>(at, 8) + h2 * p;
}

/** The multiple of 1/8 next to x, for 0 <= x < 2^40. */
@inline
export function nearestEighth(x: f64): f64 {
  return x + 844424930131968.0 - 844424930131968.0; // 1.5 * 2^52 / 8
}

/** log gamma(x) - ((x - 1/2) log x - x + log(2 pi) / 2) for x >= 11.5 (DLMF 5.11.1, eight terms: 1e-18 left). */
export function stirlingRest(x: f64): f64 {
  let y = 1.0 / x;
  let z = y * y;
  let s = load<f64>(STIRLING_ROW, 48) + z * load<f64>(STIRLING_ROW, 56);
  s = load<f64>(STIRLING_ROW, 40) + z * s;
  s = load<f64>(STIRLING_ROW, 32) + z * s;
  s = load<f64>(STIRLING_ROW, 24) + z * s;
  s = load<f64>(STIRLING_ROW, 16) + z * s;
  s = load<f64>(STIRLING_ROW, 8) + z * s;
  s = load<f64>(STIRLING_ROW) + z * s;
  return y * s;
}

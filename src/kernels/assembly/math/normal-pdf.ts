// Density of the standard normal distribution, exp(-x^2 / 2) / sqrt(2 pi), with x^2 in two parts (gaussian.ts).
//
// Good for: relative accuracy down to the subnormals (|x| = 38.6). NaN gives NaN.
import { mul } from "../vector";
import { biasedHalfGaussian } from "./gaussian";

const NUMBERS = memory.data<f64>([
  38.7, // the density is below half the smallest subnormal from 38.58 on
  0.3989422804014327, // 1 / sqrt(2 pi)
  7.458340731200207e-155, // 2^-512
], 16);

@inline
function number(k: usize): v128 {
  return v128.load_splat<f64>(NUMBERS + (k << 3));
}

/** Standard normal density of two numbers; see docs/kernels.md for the measured error. */
export function vec_normalPdf(x: v128): v128 {
  let t = f64x2.pmin(number(0), f64x2.abs(x)); // NaN becomes 38.7 here and comes back at the end
  let y = mul(mul(biasedHalfGaussian(t), number(1)), number(2));
  return v128.bitselect(x, y, f64x2.ne(x, x));
}

// Distribution function of the standard normal distribution, erfc(-x / sqrt(2)) / 2 (DLMF 7.18 and 7.2.2 put together).
//
// For x <= 0 it is exp(-x^2 / 2) times half the scaled erfc of |x| / sqrt(2); x^2 is taken in two parts from x itself,
// so rounding x / sqrt(2) touches only the slowly varying factor. For x > 0 it is one minus that.
// Good for: the left tail down to the subnormals (x = -38.5). Bad at: the right tail, which ends at 1 near x = 8.3;
// use normalCdf(-x) for its complement. NaN gives NaN.
import { mul, sub } from "../vector";
import { biasedHalfGaussian } from "./gaussian";
import { scaledErfc } from "./scaled-erfc";

const NUMBERS = memory.data<f64>([
  38.6, // the left tail is below half the smallest subnormal from 38.49 on
  0.7071067811865476, // sqrt(1/2)
  3.7291703656001034e-155, // 2^-513: half, and the factor of the Gaussian undone
  1.0,
  0.0,
], 16);

@inline
function number(k: usize): v128 {
  return v128.load_splat<f64>(NUMBERS + (k << 3));
}

/** Standard normal distribution function of two numbers; see docs/kernels.md for the measured error. */
export function vec_normalCdf(x: v128): v128 {
  let t = f64x2.pmin(number(0), f64x2.abs(x)); // NaN becomes 38.6 here and comes back at the end
  let y = mul(mul(biasedHalfGaussian(t), scaledErfc(mul(t, number(1)))), number(2));
  y = v128.bitselect(sub(number(3), y), y, f64x2.gt(x, number(4)));
  return v128.bitselect(x, y, f64x2.ne(x, x));
}

// Complementary error function erfc(x) = 1 - erf(x) = 2/sqrt(pi) * integral of exp(-t^2) from x to infinity.
//
// erfc(x) = exp(-x^2) * (exp(x^2) erfc(x)) for x >= 0, the first factor with x^2 in two parts, the second from a table
// of polynomials; erfc(-x) = 2 - erfc(x) (DLMF 7.4.2). One path for all arguments.
// Good for: the far tail, down to the subnormals (x = 27.2); there the last rounding is that of the subnormal.
// NaN gives NaN.
import { mul, sub } from "../vector";
import { biasedGaussian } from "./gaussian";
import { scaledErfc } from "./scaled-erfc";

const NUMBERS = memory.data<f64>([
  27.3, // erfc is below half the smallest subnormal from 27.23 on
  7.458340731200207e-155, // 2^-512
  2.0,
  0.0,
], 16);

@inline
function number(k: usize): v128 {
  return v128.load_splat<f64>(NUMBERS + (k << 3));
}

/** erfc of two numbers; see docs/kernels.md for the measured error. */
export function vec_erfc(x: v128): v128 {
  let z = f64x2.pmin(number(0), f64x2.abs(x)); // NaN becomes 27.3 here and comes back at the end
  let y = mul(mul(biasedGaussian(z), scaledErfc(z)), number(1));
  y = v128.bitselect(sub(number(2), y), y, f64x2.lt(x, number(3)));
  return v128.bitselect(x, y, f64x2.ne(x, x));
}

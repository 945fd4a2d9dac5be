// Gamma function.
//
// From 1 to 12 a table of polynomials for the row k/8 next to x; on from 12 with n the integer next to x, h = x - n:
// gamma(n + h) = gamma(n) exp(h log n + d), where d = (n + h - 1/2) log(1 + h/n) - h + (difference of the rests of
// Stirling's series), so the exponent is small and gamma(n) comes from a table with a power of two of its own.
// gamma(x) = gamma(1 + x) / x below 1; gamma(-a) = -pi / (a sin(pi a) gamma(a)) for a > 0 (DLMF 5.5.3 with 5.5.1).
// Good for: relative accuracy between the poles; exact or correctly rounded factorials. Bad at: close to a pole the
// value is as uncertain as x itself. As in mathjs the poles 0, -1, -2, ... give +infinity; -infinity and NaN give NaN.
import { productError } from "./doubledouble";
import { expCoreLow } from "./exp";
import { nearestEighth, polynomial12, stirlingRest } from "./gamma-parts";
import { ENTROPY_ROW, FACTORIAL_ROWS, GAMMA_ROWS, LOG_ROW, SINE_ROW } from "./tables/gamma-function";

/** gamma(x) for 1 <= x <= 12. */
@inline
function middle(x: f64): f64 {
  let c = nearestEighth(x);
  let h = x - c;
  let row = GAMMA_ROWS + (<usize>(c * 8.0) - 8) * 112;
  return load<f64>(row) + (load<f64>(row, 8) + h * polynomial12(h, row + 16));
}

/** Row of n, the integer next to x, 12 <= x <= 190. */
@inline
function factorialRow(n: f64): usize {
  return FACTORIAL_ROWS + (<usize>n - 12) * 40;
}

/** gamma(x) / 2^e for 12 <= x <= 190, where 2^e is in the row of n, the integer next to x; between 0.07 and 28. */
function large(x: f64, n: f64, row: usize): f64 {
  let h = x - n;
  let u = h / n;
  // (n + h) log(1 + u) - h = h u (1/2 - u/6 + ...), twelve terms: 1e-18 left at |u| = 1/24
  let d = u * (h * polynomial12(u, ENTROPY_ROW) - 0.5 * polynomial12(u, LOG_ROW)) + (stirlingRest(x) - load<f64>(row, 32));
  // h log n in two parts: the leading 24 bits of h times the leading bits of log n are exact
  let head = reinterpret<f64>(reinterpret<u64>(h) & 0xffffffffe0000000);
  let logHead = load<f64>(row, 16);
  let p = head * logHead;
  let q = (h - head) * logHead + h * load<f64>(row, 24) + d;
  let high = p + q;
  let low = q - (high - p);
  if (abs(q) > abs(p)) low = p - (high - q);
  return load<f64>(row) * f64x2.extract_lane(expCoreLow(f64x2.splat(high), f64x2.splat(low)), 0);
}

/** y 2^e, |e| < 2000, rounded once. */
@inline
function scaled(y: f64, e: i32): f64 {
  let half = e >> 1;
  return y * reinterpret<f64>(<u64>(half + 1023) << 52) * reinterpret<f64>(<u64>(e - half + 1023) << 52);
}

/** Error of p = x * y. */
@inline
function errorOf(x: f64, y: f64, p: f64): f64 {
  return f64x2.extract_lane(productError(f64x2.splat(x), f64x2.splat(y), f64x2.splat(p)), 0);
}

/**
 * pi / (a sin(pi a) v) for a > 0, not an integer, v about 1. Three rounding errors (of the sine's leading sum and the
 * two products) are collected and taken back to first order: 3.6 ulp without this, 2.5 with it.
 */
function reflection(a: f64, v: f64): f64 {
  let n = nearest(a);
  let r = a - n;
  let z = r * r;
  let p = load<f64>(SINE_ROW, 56) + z * load<f64>(SINE_ROW, 64);
  p = load<f64>(SINE_ROW, 48) + z * p;
  p = load<f64>(SINE_ROW, 40) + z * p;
  p = load<f64>(SINE_ROW, 32) + z * p;
  p = load<f64>(SINE_ROW, 24) + z * p;
  p = load<f64>(SINE_ROW, 16) + z * p;
  p = load<f64>(SINE_ROW, 8) + z * p;
  p = r * (z * (load<f64>(SINE_ROW) + z * p));
  let s = r + p;
  let t = a * s;
  let d = t * v;
  let rest = v * (a * (r - s + p) + errorOf(a, s, t)) + errorOf(t, v, d);
  let y = 1.0 / d;
  y -= y * (y * rest);
  return <i32>n & 1 ? -y : y;
}

/** gamma(-a) for a > 0, not an integer. */
function reflected(a: f64): f64 {
  if (a < 8.673617379884035e-19) return -1.0 / a; // 2^-60: the next term is 2^-60 of it
  if (a > 190.0) return <u64>a & 1 ? 0.0 : -0.0; // below half the smallest subnormal; beyond 2^52 all are integers
  if (a < 1.0) return -a * reflection(a, middle(1.0 + a));
  if (a < 12.0) return -reflection(a, middle(a));
  let n = nearest(a);
  let row = factorialRow(n);
  return scaled(-reflection(a, large(a, n, row)), -<i32>load<f64>(row, 8));
}

export function gammaOne(x: f64): f64 {
  if (x >= 1.0) {
    if (x < 12.0) return middle(x);
    if (x >= 172.0) return Infinity;
    let n = nearest(x);
    let row = factorialRow(n);
    return scaled(large(x, n, row), <i32>load<f64>(row, 8));
  }
  if (x > 0.0) return x < 8.673617379884035e-19 ? 1.0 / x : middle(1.0 + x) / x;
  if (x == -Infinity) return NaN;
  if (x == nearest(x)) return Infinity;
  return x < 0.0 ? reflected(-x) : x;
}

/** gamma of two numbers; see docs/kernels.md for the measured error. */
export function vec_gamma(x: v128): v128 {
  return f64x2(gammaOne(f64x2.extract_lane(x, 0)), gammaOne(f64x2.extract_lane(x, 1)));
}

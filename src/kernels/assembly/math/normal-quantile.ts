// Quantile of the standard normal distribution, the inverse of its distribution function.
//
// M. J. Wichura, "Algorithm AS 241: The percentage points of the normal distribution", Applied Statistics 37 (1988)
// 477-484, routine PPND16: three rational functions of degree 7/7, the central one for |p - 1/2| <= 0.425 in
// q = p - 1/2, the outer two in r = sqrt(-log min(p, 1 - p)) with their border at r = 5 (p = 1.4e-11).
//
// Good for: p down to the smallest subnormal; odd about 1/2 as far as 1 - p is a double.
// Bad at: the upper tail ends at 8.2, as nothing between 1 - 2^-53 and 1 is a double.
// p = 0 gives -infinity, p = 1 gives +infinity; p outside [0, 1] and NaN give NaN.
import { add, div, mul, sub } from "../vector";
import { logCore, logIsPlain, log_special } from "./log";

// Each table: numerator from the highest power down to the constant, then the denominator likewise.
const CENTRAL = memory.data<f64>([
  2509.0809287301226727, 33430.575583588128105, 67265.770927008700853, 45921.953931549871457,
  13731.693765509461125, 1971.5909503065514427, 133.14166789178437745, 3.387132872796366608,
  5226.495278852545925, 28729.085735721942674, 39307.89580009271061, 21213.794301586595867,
  5394.1960214247511077, 687.1870074920579083, 42.313330701600911252, 1.0,
], 16);
const MIDDLE = memory.data<f64>([
  7.7454501427834140764e-4, 2.27238449892691845833e-2, 2.4178072517745061177e-1, 1.27045825245236838258,
  3.64784832476320460504, 5.7694972214606914055, 4.6303378461565452959, 1.42343711074968357734,
  1.05075007164441684324e-9, 5.475938084995344946e-4, 1.51986665636164571966e-2, 1.4810397642748007459e-1,
  6.8976733498510000455e-1, 1.6763848301838038494, 2.05319162663775882187, 1.0,
], 16);
const FAR = memory.data<f64>([
  2.01033439929228813265e-7, 2.71155556874348757815e-5, 1.2426609473880784386e-3, 2.6532189526576123093e-2,
  2.9656057182850489123e-1, 1.7848265399172913358, 5.4637849111641143699, 6.6579046435011037772,
  2.04426310338993978564e-15, 1.4215117583164458887e-7, 1.8463183175100546818e-5, 7.868691311456132591e-4,
  1.48753612908506148525e-2, 1.3692988092273580531e-1, 5.9983220655588793769e-1, 1.0,
], 16);
const LIMITS = memory.data<f64>([0.5, 0.425, 0.180625, 1.0, 1.6, 5.0, Infinity, -0.0], 16);

@inline
function limit(k: usize): v128 {
  return v128.load_splat<f64>(LIMITS + (k << 3));
}

/** Degree-7 polynomial by Horner's rule; coefficients at `table`, highest power first. */
@inline
function polynomial7(r: v128, table: usize): v128 {
  let s = add(mul(v128.load_splat<f64>(table), r), v128.load_splat<f64>(table + 8));
  s = add(mul(s, r), v128.load_splat<f64>(table + 16));
  s = add(mul(s, r), v128.load_splat<f64>(table + 24));
  s = add(mul(s, r), v128.load_splat<f64>(table + 32));
  s = add(mul(s, r), v128.load_splat<f64>(table + 40));
  s = add(mul(s, r), v128.load_splat<f64>(table + 48));
  return add(mul(s, r), v128.load_splat<f64>(table + 56));
}

/** p - 1/2, exact for p >= 1/4. */
@inline
export function fromMiddle(p: v128): v128 {
  return sub(p, limit(0));
}

/** All ones in the lanes that belong to a tail; NaN does not. */
@inline
export function inTail(q: v128): v128 {
  return f64x2.gt(f64x2.abs(q), limit(1));
}

/** The quantile where |q| <= 0.425 (and NaN where q is NaN). */
@inline
export function centralQuantile(q: v128): v128 {
  let r = sub(limit(2), mul(q, q));
  return div(mul(q, polynomial7(r, CENTRAL)), polynomial7(r, CENTRAL + 64));
}

function farQuantile(r: v128): v128 {
  let t = sub(r, limit(5));
  let y = div(polynomial7(t, FAR), polynomial7(t, FAR + 64));
  return v128.bitselect(r, y, f64x2.eq(r, limit(6)));
}

/** The quantile where |q| > 0.425. */
@inline
export function tailQuantile(p: v128, q: v128): v128 {
  let m = f64x2.pmin(p, sub(limit(3), p));
  let r = f64x2.sqrt(f64x2.neg(logIsPlain(m) ? logCore(m) : log_special(m)));
  let t = sub(r, limit(4));
  let y = div(polynomial7(t, MIDDLE), polynomial7(t, MIDDLE + 64));
  let far = f64x2.gt(r, limit(5));
  if (v128.any_true(far)) y = v128.bitselect(farQuantile(r), y, far);
  // The rational functions give |quantile|: put the sign of q on it.
  return v128.or(y, v128.and(q, limit(7)));
}

// Exported so that the optimiser keeps it as a call: a spliced kernel carries the central part only.
export function normalQuantile_special(p: v128): v128 {
  return tailQuantile(p, fromMiddle(p));
}

/** Standard normal quantiles of two probabilities; relative error below 1e-15 from p = 5e-324 on. */
export function vec_normalQuantile(p: v128): v128 {
  let q = fromMiddle(p);
  let y = centralQuantile(q);
  let tail = inTail(q);
  if (v128.any_true(tail)) y = v128.bitselect(normalQuantile_special(p), y, tail);
  return y;
}

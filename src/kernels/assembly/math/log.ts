// Natural logarithm of x and of 1 + x.
//
// Table-driven and free of divisions, after P. T. P. Tang, "Table-driven implementation of the logarithm function in
// IEEE floating-point arithmetic", ACM Transactions on Mathematical Software 16 (1990) 378-400: x = 2^k m,
// 0.705 <= m < 1.41, r = m (1/c) - 1 with c from 128 cells, log x = k ln2 + log c + log(1 + r). 1/c has at most 22 bits,
// so r is exact in two parts; around 1, c = 1 and r = m - 1, which keeps full relative precision there.
// Good for: every x > 0 within 0.52 ulp, subnormals included. log1p needs the rounding error of 1 + x as well.
import { add, mul, sub } from "../vector";
import { fastSumError, sumError } from "./doubledouble";
import { both, firsts, seconds, signOf, withSign } from "./lanes";
import { LOG_TABLE } from "./tables/log";

const W = memory.data<u64>(
  [
    0x0009700000000000, 0x0009700000000000, // moves the first cell's beginning to a power of two
    0x4330000000000000, 0x4330000000000000, // exponent field of 2^52
    0x000fffffffffffff, 0x000fffffffffffff, // significand
    0x3fe6900000000000, 0x3fe6900000000000, // beginning of the first cell
    0xffffffffffc00000, 0xffffffffffc00000, // significand without its last 22 bits
    0xfff0000000000000, 0xfff0000000000000, // sign and exponent
    0x7fe0000000000000, 0x7fe0000000000000, // exponent fields of 2^k and 2^-k add up to this
  ],
  16,
);

const C = memory.data<f64>(
  [
    2.2250738585072014e-308, 2.2250738585072014e-308, // smallest normal number
    1.7976931348623157e308, 1.7976931348623157e308, // largest number
    4503599627371519, 4503599627371519, // 2^52 + 1023
    0.6931471805598903, 0.6931471805598903, // ln 2, leading 42 bits: k times this is exact
    5.497923018708371e-14, 5.497923018708371e-14, // the rest of ln 2
    1, 1,
    -0.5, -0.5, // (log(1+r) - r) / r^2 for |r| <= 0.0047; relative error of the logarithm: 2^-61
    0.33333333333333337, 0.33333333333333337,
    -0.24999999996568886, -0.24999999996568886,
    0.19999999996950119, 0.19999999996950119,
    -0.16667080862401282, -0.16667080862401282,
    0.1428608245986697, 0.1428608245986697,
    18014398509481984, 18014398509481984, // 2^54
    54, 54,
    -1, -1,
    1e300, 1e300,
  ],
  16,
);

/** 2^52 + 1023, what the exponent field of a normal number stands above k. */
@inline
export function logBias(): v128 {
  return v128.load(C, 32);
}

@inline
export function logShifted(x: v128): v128 {
  return i64x2.add(x, v128.load(W));
}

/** k, given x shifted. */
@inline
export function logExponent(u: v128, bias: v128): v128 {
  return sub(v128.or(i64x2.shr_u(u, 52), v128.load(W, 16)), bias);
}

/** m = x / 2^k, given x shifted. */
@inline
export function logSignificand(u: v128): v128 {
  return i64x2.add(v128.and(u, v128.load(W, 32)), v128.load(W, 48));
}

/** Leading part of m: exact when multiplied by a 1/c of the table. */
@inline
export function logLeading(m: v128): v128 {
  return v128.and(m, v128.load(W, 64));
}

/** Number of the cell times 16. */
@inline
export function logCell(u: v128, lane: i32): usize {
  let high = lane == 0 ? i32x4.extract_lane(u, 1) : i32x4.extract_lane(u, 3);
  return <usize>((high >> 9) & 0x7f0);
}

/** log(1 + r) - r. */
@inline
export function logTail(r: v128): v128 {
  let r2 = mul(r, r);
  let a = add(v128.load(C, 96), mul(r, v128.load(C, 112)));
  let b = add(v128.load(C, 128), mul(r, v128.load(C, 144)));
  let c = add(v128.load(C, 160), mul(r, v128.load(C, 176)));
  return mul(r2, add(a, mul(r2, add(b, mul(r2, c)))));
}

/** k ln2 + log c + log(1 + r) + low. */
@inline
function logAssemble(k: v128, logc: v128, r: v128, low: v128): v128 {
  let p = mul(k, v128.load(C, 48));
  let w = add(p, logc);
  let h = add(w, r);
  low = add(add(mul(k, v128.load(C, 64)), fastSumError(p, logc, w)), low);
  low = add(low, fastSumError(w, r, h));
  return add(h, add(low, logTail(r)));
}

/** log x for normal positive x; `bias` is logBias() plus the power of two by which x was scaled up. */
@inline
export function logCoreScaled(x: v128, bias: v128): v128 {
  let u = logShifted(x);
  let a = v128.load(LOG_TABLE + logCell(u, 0)), b = v128.load(LOG_TABLE + logCell(u, 1));
  let inverse = firsts(a, b);
  let m = logSignificand(u);
  let mh = logLeading(m);
  let rh = sub(mul(mh, inverse), v128.load(C, 80));
  let rl = mul(sub(m, mh), inverse);
  let r = add(rh, rl);
  return logAssemble(logExponent(u, bias), seconds(a, b), r, fastSumError(rh, rl, r));
}

/** log x for normal positive x. */
@inline
export function logCore(x: v128): v128 {
  return logCoreScaled(x, v128.load(C, 32));
}

/** log(x + low) for normal positive x and |low| of the size of its rounding error. */
@inline
export function logCoreLow(x: v128, low: v128): v128 {
  let u = logShifted(x);
  let a = v128.load(LOG_TABLE + logCell(u, 0)), b = v128.load(LOG_TABLE + logCell(u, 1));
  let inverse = firsts(a, b);
  let m = logSignificand(u);
  let mh = logLeading(m);
  let rh = sub(mul(mh, inverse), v128.load(C, 80));
  let rl = mul(sub(m, mh), inverse);
  let q = add(rh, rl);
  let c = mul(mul(low, i64x2.sub(v128.load(W, 96), v128.and(u, v128.load(W, 80)))), inverse);
  let r = add(q, c);
  let errors = add(fastSumError(rh, rl, q), fastSumError(q, c, r));
  return logAssemble(logExponent(u, v128.load(C, 32)), seconds(a, b), r, errors);
}

/** True where both lanes are positive normal numbers; false for NaN. */
@inline
export function logIsPlain(x: v128): bool {
  return both(v128.and(f64x2.ge(x, v128.load(C)), f64x2.le(x, v128.load(C, 16))));
}

/** Puts the limits of a logarithm into `value`: NaN for NaN and below 0, -infinity at 0, infinity at infinity. */
@inline
export function logLimits(x: v128, value: v128): v128 {
  let zero = f64x2.splat(0);
  let y = v128.bitselect(f64x2.splat(Infinity), value, f64x2.gt(x, v128.load(C, 16)));
  y = v128.bitselect(f64x2.splat(-Infinity), y, f64x2.eq(x, zero));
  y = v128.bitselect(f64x2.splat(NaN), y, f64x2.lt(x, zero));
  return v128.bitselect(x, y, f64x2.ne(x, x));
}

// The rare paths are exported so that the optimiser keeps them as calls: a spliced kernel carries its fast path only.
export function log_special(x: v128): v128 {
  let tiny = f64x2.lt(x, v128.load(C));
  let y = v128.bitselect(mul(x, v128.load(C, 192)), x, tiny);
  let value = logCoreScaled(y, add(v128.load(C, 32), v128.and(tiny, v128.load(C, 208))));
  return logLimits(x, value);
}

/** log x. */
export function vec_log(x: v128): v128 {
  if (logIsPlain(x)) return logCore(x);
  return log_special(x);
}

/** Above 10^300 the 1 no longer matters, and the scaling of the rounding error would leave the range. */
@inline
function log1pPlain(x: v128): v128 {
  return v128.and(f64x2.gt(x, v128.load(C, 224)), f64x2.le(x, v128.load(C, 240)));
}

@inline
function log1pCore(x: v128): v128 {
  let one = v128.load(C, 80);
  let u = add(x, one);
  return withSign(f64x2.abs(logCoreLow(u, sumError(x, one, u))), signOf(x));
}

export function log1p_special(x: v128): v128 {
  let inside = log1pPlain(x);
  let value = log1pCore(v128.bitselect(x, v128.load(C, 80), inside));
  return v128.bitselect(value, log_special(add(x, v128.load(C, 80))), inside);
}

/** log(1 + x), full relative precision near 0. */
export function vec_log1p(x: v128): v128 {
  if (both(log1pPlain(x))) return log1pCore(x);
  return log1p_special(x);
}

// log x to some 68 bits, for the functions that multiply a logarithm before they round it: pow, cbrt, log2, log10.
//
// The reduction of log.ts with every rounding error kept, and r - r^2/2 carried in double-double as in P. T. P. Tang,
// "Table-driven implementation of the logarithm function in IEEE floating-point arithmetic", ACM Transactions on
// Mathematical Software 16 (1990) 378-400, section 6. An inlined function returns one vector only, so the step that
// follows is chosen here by a constant.
import { add, mul, sub } from "../vector";
import { fastSumError, productError, upper } from "./doubledouble";
import { expAnywhere, expCoreLow, expIsPlain } from "./exp";
import { pair, firsts, seconds } from "./lanes";
import { logCell, logExponent, logLeading, logShifted, logSignificand } from "./log";
import { pow_special } from "./pow";
import { LOG_TABLE } from "./tables/log";
import { LOG_LOW_TABLE } from "./tables/log-low";

/** What follows the logarithm L: e^(L c) for cbrt. */
export const ROOT: i32 = 0;
/** L c, for log2 and log10. */
export const PRODUCT: i32 = 1;
/** e^(L c), handed to pow's rare path where that may leave the normal numbers. */
export const POWER: i32 = 2;
/** e^(L c) wherever it lies. */
export const ANY_POWER: i32 = 3;

const C = memory.data<f64>(
  [
    0.6931471805598903, 0.6931471805598903, // ln 2, leading 42 bits: k times this is exact
    5.497923018708371e-14, 5.497923018708371e-14, // the rest of ln 2
    1, 1,
    0.5, 0.5,
    0.33333333333333337, 0.33333333333333337, // (log(1+r) - r + r^2/2) / r^3 for |r| <= 0.0047; error 2^-70
    -0.24999999999999858, -0.24999999999999858,
    0.19999999996890158, 0.19999999996890158,
    -0.16666666698816057, -0.16666666698816057,
    0.1428608604312382, 0.1428608604312382,
    -0.12498768070889014, -0.12498768070889014,
    760, 760,
  ],
  16,
);

/** f(c log x) for normal positive x, c = factor + low, and f as `step` says; `bias` as in log.ts. */
@inline
export function logThen(x: v128, bias: v128, factor: v128, low: v128, step: i32): v128 {
  let u = logShifted(x);
  let i = logCell(u, 0), j = logCell(u, 1);
  let a = v128.load(LOG_TABLE + i), b = v128.load(LOG_TABLE + j);
  let inverse = firsts(a, b), logc = seconds(a, b);
  let m = logSignificand(u);
  let mh = logLeading(m);
  let rh = sub(mul(mh, inverse), v128.load(C, 32)), rl = mul(sub(m, mh), inverse);
  let r = add(rh, rl);
  let rest = fastSumError(rh, rl, r);

  let k = logExponent(u, bias);
  let p = mul(k, v128.load(C));
  let w = add(p, logc);
  let h = add(w, r);
  let l = add(mul(k, v128.load(C, 16)), pair(LOG_LOW_TABLE + (i >> 1), LOG_LOW_TABLE + (j >> 1)));
  l = add(add(l, fastSumError(p, logc, w)), fastSumError(w, r, h));

  // r^2/2 = rt^2/2, exact, and (r - rt)(r + rt)/2
  let rt = upper(r), half = v128.load(C, 48);
  let square = mul(mul(rt, rt), half);
  let g = sub(h, square);
  l = add(l, sub(sub(h, g), square));
  l = add(l, sub(rest, mul(r, rest)));
  l = sub(l, mul(mul(sub(r, rt), add(r, rt)), half));

  let r2 = mul(r, r);
  let p0 = add(v128.load(C, 64), mul(r, v128.load(C, 80)));
  let p1 = add(v128.load(C, 96), mul(r, v128.load(C, 112)));
  let p2 = add(v128.load(C, 128), mul(r, v128.load(C, 144)));
  l = add(l, mul(mul(r, r2), add(p0, mul(r2, add(p1, mul(r2, p2))))));

  let high = add(g, l);
  l = fastSumError(g, l, high);
  let y = mul(factor, high);
  let z = add(productError(factor, high, y), add(mul(low, high), mul(factor, l)));
  if (step == PRODUCT) return add(y, z);
  if (step == ROOT) return expCoreLow(y, z);
  if (step == POWER) {
    if (expIsPlain(y)) return expCoreLow(y, z);
    return pow_special(x, factor);
  }
  // beyond the range the error term may be anything and must not move the clamped argument
  return expAnywhere(y, v128.and(z, f64x2.le(f64x2.abs(y), v128.load(C, 160))), 0);
}

// exp(-t^2) and exp(-t^2 / 2) without the loss of relative accuracy that rounding t^2 brings, times 2^512.
//
// t = head + rest with 26 bits in the head, so t^2 = head^2 + rest (t + head), where head^2 is exact and the second
// term small; without this the relative error would grow to t^2 / 2 ulp (370 ulp at the far end). The factor 2^512
// keeps all results normal numbers: whoever multiplies by 2^-512 last rounds once, into the subnormals too.
import { add, mul, sub } from "../vector";
import { upper } from "./doubledouble";
import { expEntry, expIndex, expRest, expTail } from "./exp";
import { firsts, seconds } from "./lanes";

const HALF = memory.data<f64>([0.5], 16);
/** 512 * 2^52: added to the bits of a double it multiplies by 2^512. */
const BIAS = memory.data<u64>([0x2000000000000000], 16);

/** exp(high + low) * 2^512 for -750 <= high <= 0, |low| small beside 1. */
@inline
function biasedExp(high: v128, low: v128): v128 {
  let index = expIndex(high);
  let a = expEntry(index, 0), b = expEntry(index, 1);
  let s = i64x2.add(i64x2.add(seconds(a, b), v128.load_splat<u64>(BIAS)), i64x2.shl(index, 45));
  let r = add(expRest(high, index), low);
  return add(s, mul(s, add(r, add(expTail(r), firsts(a, b)))));
}

/** exp(-t^2) * 2^512 for 0 <= t <= 27.3; relative error below 1 ulp. */
@inline
export function biasedGaussian(t: v128): v128 {
  let head = upper(t);
  return biasedExp(f64x2.neg(mul(head, head)), mul(sub(head, t), add(t, head)));
}

/** exp(-t^2 / 2) * 2^512 for 0 <= t <= 38.7; relative error below 1 ulp. */
@inline
export function biasedHalfGaussian(t: v128): v128 {
  let head = upper(t);
  let half = v128.load_splat<f64>(HALF);
  return biasedExp(f64x2.neg(mul(half, mul(head, head))), mul(mul(half, sub(head, t)), add(t, head)));
}

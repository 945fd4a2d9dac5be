// 128-bit products and division by a fixed 64-bit divisor, from 64-bit words. Everything here is inlined.

/** High half of the 128-bit product, from four 32-bit ones (the schoolbook way; Knuth, vol. 2, 4.3.1). */
@inline
export function mulHigh(a: u64, b: u64): u64 {
  let a0 = a & 0xffffffff, a1 = a >> 32, b0 = b & 0xffffffff, b1 = b >> 32;
  let middle = a1 * b0 + ((a0 * b0) >> 32);
  return a1 * b1 + (middle >> 32) + ((a0 * b1 + (middle & 0xffffffff)) >> 32);
}

/**
 * Quotient and remainder of a 128-bit number by a normalised divisor (top bit set), N. Möller and T. Granlund,
 * "Improved division by invariant integers", IEEE Transactions on Computers 60 (2011) 165-175, algorithm 4:
 * `reciprocal` is floor((2^128 - 1) / divisor) - 2^64, and high < divisor.
 */
@inline
export function divideWide(high: u64, low: u64, divisor: u64, reciprocal: u64): u64 {
  let q0 = reciprocal * high + low;
  let q1 = mulHigh(reciprocal, high) + high + (q0 < low ? 1 : 0) + 1;
  let r = low - q1 * divisor;
  if (r > q0) {
    q1--;
    r += divisor;
  }
  return r >= divisor ? q1 + 1 : q1;
}

// x <- (a x + c) mod m for any m up to 2^64 (D. H. Lehmer 1951; Knuth, The Art of Computer Programming, vol. 2, 3.2.1).
//
// A recurrence waits for its own product, so four interleaved ones run side by side: x(i + 4) = A x(i) + C mod m with
// A = a^4 and C = c (a^3 + a^2 + a + 1), which the host computes exactly. The reduction depends on the modulus:
//   fillPowerOfTwo   wrapping 64-bit arithmetic and a mask,
//   fillFolded       m = 2^e - k, k small: the high part times k is added to the low part, twice, for m < 2^32,
//   fillShort        m < 2^32: 64-bit product, quotient estimated in double precision, one correction,
//   fillGeneral      128-bit product, division by a precomputed reciprocal.
// Layout of `state` (64-bit words): x, a, c, A, C, m, then what the reduction needs. x is the last output.
import { divideWide, mulHigh } from "./wide";

const A1 = 8, C1 = 16, A4 = 24, C4 = 32, M = 40, P = 48, Q = 56;

/** m a power of two; `P` holds m - 1. */
export function fillPowerOfTwo(state: usize, out: usize, count: i32): void {
  let a = load<u64>(state, A1), c = load<u64>(state, C1), mask = load<u64>(state, P), x = load<u64>(state);
  let i = 0;
  if (count >= 8) {
    let x0 = (a * x + c) & mask, x1 = (a * x0 + c) & mask, x2 = (a * x1 + c) & mask, x3 = (a * x2 + c) & mask;
    let a4 = load<u64>(state, A4), c4 = load<u64>(state, C4);
    for (; ; ) {
      store<u64>(out, x0);
      store<u64>(out, x1, 8);
      store<u64>(out, x2, 16);
      store<u64>(out, x3, 24);
      out += 32;
      i += 4;
      if (i + 4 > count) break;
      x0 = (a4 * x0 + c4) & mask;
      x1 = (a4 * x1 + c4) & mask;
      x2 = (a4 * x2 + c4) & mask;
      x3 = (a4 * x3 + c4) & mask;
    }
    x = x3;
  }
  for (; i < count; i++) {
    x = (a * x + c) & mask;
    store<u64>(out, x);
    out += 8;
  }
  store<u64>(state, x);
}

@inline
function fold(t: u64, e: u64, k: u64, low: u64, m: u64): u64 {
  t = (t & low) + (t >> e) * k;
  t = (t & low) + (t >> e) * k;
  return t >= m ? t - m : t;
}

/** m = 2^e - k < 2^32 with k (k + 3) <= 2^e, so that two folds leave less than 2 m; `P` holds e, `Q` holds k. */
export function fillFolded(state: usize, out: usize, count: i32): void {
  let a = load<u64>(state, A1), c = load<u64>(state, C1), m = load<u64>(state, M), x = load<u64>(state);
  let e = load<u64>(state, P), k = load<u64>(state, Q), low = ((<u64>1) << e) - 1;
  let i = 0;
  if (count >= 8) {
    let x0 = fold(a * x + c, e, k, low, m), x1 = fold(a * x0 + c, e, k, low, m);
    let x2 = fold(a * x1 + c, e, k, low, m), x3 = fold(a * x2 + c, e, k, low, m);
    let a4 = load<u64>(state, A4), c4 = load<u64>(state, C4);
    for (; ; ) {
      store<u64>(out, x0);
      store<u64>(out, x1, 8);
      store<u64>(out, x2, 16);
      store<u64>(out, x3, 24);
      out += 32;
      i += 4;
      if (i + 4 > count) break;
      x0 = fold(a4 * x0 + c4, e, k, low, m);
      x1 = fold(a4 * x1 + c4, e, k, low, m);
      x2 = fold(a4 * x2 + c4, e, k, low, m);
      x3 = fold(a4 * x3 + c4, e, k, low, m);
    }
    x = x3;
  }
  for (; i < count; i++) {
    x = fold(a * x + c, e, k, low, m);
    store<u64>(out, x);
    out += 8;
  }
  store<u64>(state, x);
}

/**
 * t mod m for t = a x + c < 2^64. The quotient is below 2^32 and its double-precision estimate is off by less than
 * 2^-18, so its whole part is right or one too large or too small.
 */
@inline
function reduceShort(t: u64, m: u64, inverse: f64): u64 {
  let q = <u64>(<f64>t * inverse);
  let r = <i64>(t - q * m);
  if (r < 0) r += m;
  return r >= <i64>m ? r - m : r;
}

/** m < 2^32; `P` holds 1 / m as a double. */
export function fillShort(state: usize, out: usize, count: i32): void {
  let a = load<u64>(state, A1), c = load<u64>(state, C1), m = load<u64>(state, M), x = load<u64>(state);
  let inverse = load<f64>(state, P);
  let i = 0;
  if (count >= 8) {
    let x0 = reduceShort(a * x + c, m, inverse), x1 = reduceShort(a * x0 + c, m, inverse);
    let x2 = reduceShort(a * x1 + c, m, inverse), x3 = reduceShort(a * x2 + c, m, inverse);
    let a4 = load<u64>(state, A4), c4 = load<u64>(state, C4);
    for (; ; ) {
      store<u64>(out, x0);
      store<u64>(out, x1, 8);
      store<u64>(out, x2, 16);
      store<u64>(out, x3, 24);
      out += 32;
      i += 4;
      if (i + 4 > count) break;
      x0 = reduceShort(a4 * x0 + c4, m, inverse);
      x1 = reduceShort(a4 * x1 + c4, m, inverse);
      x2 = reduceShort(a4 * x2 + c4, m, inverse);
      x3 = reduceShort(a4 * x3 + c4, m, inverse);
    }
    x = x3;
  }
  for (; i < count; i++) {
    x = reduceShort(a * x + c, m, inverse);
    store<u64>(out, x);
    out += 8;
  }
  store<u64>(state, x);
}

/**
 * Any m from 2 to 2^64 - 1. Everything is kept times 2^s, which makes the top bit of m 1: `M` holds m 2^s, `P` its
 * reciprocal (see wide.ts), `Q` holds s; x, a and c are unscaled.
 */
export function fillGeneral(state: usize, out: usize, count: i32): void {
  let a = load<u64>(state, A1), c = load<u64>(state, C1), scaled = load<u64>(state, M), x = load<u64>(state);
  let reciprocal = load<u64>(state, P), s = load<u64>(state, Q);
  let m = scaled >> s;
  for (let i = 0; i < count; i++) {
    let left = x << s;
    let high = mulHigh(a, left), low = a * left;
    let r = (low - divideWide(high, low, scaled, reciprocal) * scaled) >> s;
    // r + c mod m without passing 2^64
    x = r >= m - c ? r - (m - c) : r + c;
    store<u64>(out, x);
    out += 8;
  }
  store<u64>(state, x);
}

/**
 * Replaces each word k < m by floor(2^64 k / m), in place, so that the top bits of k/m are the top bits of the word.
 * `scaled` is m 2^s with its top bit set.
 */
export function fractionWords(words: usize, count: i32, scaled: u64, reciprocal: u64, s: u64): void {
  for (let i = 0; i < count; i++) {
    store<u64>(words, divideWide(load<u64>(words) << s, 0, scaled, reciprocal));
    words += 8;
  }
}

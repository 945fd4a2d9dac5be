// Reduction of any finite angle by multiples of pi/64, to the last bit.
//
// M. H. Payne and R. N. Hanek, "Radian reduction for trigonometric functions", ACM SIGNUM Newsletter 18 (1983) 19-24:
// of the digits of 2/pi only a window matters; those in front of it contribute whole turns. Here |x| = M 2^e, the window
// holds 192 digits, the leading one of weight 2^6 in units of pi/64, so that integer arithmetic modulo 2^192 leaves seven
// digits of the multiple k modulo 128 and 185 behind the point. No double is nearer than 2^-61 to a multiple of
// pi/2 without being one, hence some 70 correct bits remain in the worst case.
import { TWO_OVER_PI } from "./tables/two-over-pi";

/** The remainder in two parts, left here by `hugeAngle`. */
export const REST = memory.data(16, 16);

const PI_64: f64 = 0.04908738521234052; // pi/64
const PI_64_LOW: f64 = 1.9135106236677394e-18;

/** 32 digits of 2/pi in front of which `skip` digits (counted from 64 zeros before the point) are dropped. */
@inline
function digits(skip: i32): u64 {
  let at = TWO_OVER_PI + (<usize>(skip >> 5) << 2);
  let two = (<u64>load<u32>(at) << 32) | <u64>load<u32>(at, 4);
  return (two >> (32 - (skip & 31))) & 0xffffffff;
}

/** k modulo 128 with x = k pi/64 + rest, |rest| <= pi/128; the rest is stored at REST, high part first. */
export function hugeAngle(x: f64): i32 {
  let bits = reinterpret<u64>(x);
  let exponent = <i32>((bits >> 52) & 0x7ff) - 1075;
  let significand = (bits & 0x000fffffffffffff) | 0x0010000000000000;
  let m0 = significand & 0xffffffff, m1 = significand >> 32;

  // The digit of weight 2^6 in units of pi/64 = (pi/2)/32 is digit exponent + 5 - 6 behind the point.
  let skip = exponent + 5 - 6 + 64 - 1;
  let v0 = digits(skip), v1 = digits(skip + 32), v2 = digits(skip + 64);
  let v3 = digits(skip + 96), v4 = digits(skip + 128), v5 = digits(skip + 160);

  // product of six digits of base 2^32 by two, modulo 2^192, from the last digit on; sums stay below 2^64
  let a = v5 * m0;
  let b = v4 * m0 + (a >> 32), c = v5 * m1 + (b & 0xffffffff);
  let p5 = a & 0xffffffff, p4 = c & 0xffffffff;
  a = v3 * m0 + (b >> 32);
  b = v4 * m1 + (c >> 32) + (a & 0xffffffff);
  let p3 = b & 0xffffffff;
  a = v2 * m0 + (a >> 32);
  b = v3 * m1 + (b >> 32) + (a & 0xffffffff);
  let p2 = b & 0xffffffff;
  a = v1 * m0 + (a >> 32);
  b = v2 * m1 + (b >> 32) + (a & 0xffffffff);
  let p1 = b & 0xffffffff;
  a = v0 * m0 + (a >> 32);
  b = v1 * m1 + (b >> 32) + (a & 0xffffffff);
  let p0 = b & 0xffffffff;

  let h = (p0 << 32) | p1, m = (p2 << 32) | p3, l = (p4 << 32) | p5;
  let k = <i32>(h >> 57);
  // the fraction as a signed number of 192 bits
  h = (h << 7) | (m >> 57);
  m = (m << 7) | (l >> 57);
  l <<= 7;
  let negative = h >> 63 != 0;
  if (negative) {
    k++;
    l = ~l;
    m = ~m;
    h = ~h; // one unit of 2^-192 short of the negation
  }
  let scale = 1.0;
  if (h == 0) {
    h = m;
    m = l;
    l = 0;
    scale = 5.421010862427522e-20; // 2^-64
  }
  let shift = <u64>clz(h);
  if (shift != 0) {
    h = (h << shift) | (m >> (64 - shift));
    m = (m << shift) | (l >> (64 - shift));
  }
  scale *= reinterpret<f64>((1023 - 64 - shift) << 52);
  let high = <f64>(h & 0xfffffffffffff800) * scale;
  let low = (<f64>(h & 0x7ff) + <f64>(m >> 11) * 1.1102230246251565e-16) * scale; // 2^-53
  if (negative != (x < 0)) {
    high = -high;
    low = -low;
  }
  // times pi/64, the product split as in doubledouble.ts
  let rest = high * PI_64;
  let highTop = top(high), constantTop = top(PI_64);
  let highEnd = high - highTop, constantEnd = PI_64 - constantTop;
  let error = highTop * constantTop - rest + highTop * constantEnd + highEnd * constantTop + highEnd * constantEnd;
  store<f64>(REST, rest);
  store<f64>(REST, error + (high * PI_64_LOW + low * PI_64), 8);
  return (x < 0 ? -k : k) & 127;
}

@inline
function top(x: f64): f64 {
  return reinterpret<f64>(reinterpret<u64>(x) & 0xfffffffff8000000);
}

// Masks and per-lane table access shared by the elementary functions. All inlined.

const BITS = memory.data<u64>(
  [
    0x8000000000000000, 0x8000000000000000, // sign
    0x7fffffffffffffff, 0x7fffffffffffffff, // magnitude
  ],
  16,
);

/** Sign bits of x. */
@inline
export function signOf(x: v128): v128 {
  return v128.and(x, v128.load(BITS));
}

/** The sign bits s put on a magnitude that has none set. */
@inline
export function withSign(magnitude: v128, s: v128): v128 {
  return v128.or(magnitude, s);
}

/** True when the mask holds in both lanes. */
@inline
export function both(mask: v128): bool {
  return i64x2.bitmask(mask) == 3;
}

/** The doubles at two addresses, as lanes. */
@inline
export function pair(a: usize, b: usize): v128 {
  return v128.load64_lane(b, v128.load64_zero(a), 1);
}

/** First words of two 16-byte entries. */
@inline
export function firsts(a: v128, b: v128): v128 {
  return v128.shuffle<f64>(a, b, 0, 2);
}

/** Second words of two 16-byte entries. */
@inline
export function seconds(a: v128, b: v128): v128 {
  return v128.shuffle<f64>(a, b, 1, 3);
}

/** y * 2^e lane by lane for -2200 < e < 2000, rounded once: two factors, as one alone would leave the range. */
export function scaled(y: v128, e0: i32, e1: i32): v128 {
  let h0 = e0 >> 1, h1 = e1 >> 1;
  return f64x2.mul(f64x2.mul(y, powers(h0, h1)), powers(e0 - h0, e1 - h1));
}

@inline
function powers(e0: i32, e1: i32): v128 {
  return i64x2.replace_lane(i64x2.splat(<i64>(e0 + 1023) << 52), 1, <i64>(e1 + 1023) << 52);
}

// From integer words in order of generation (w[i * d + j]) to coordinates in rows (X[j][i]), converted on the way.
//
// Words are taken two points by two coordinates, converted as f64x2, and transposed in registers. `count` may be odd:
// the row of words behind the last point must be readable, and one double behind each row's last point is written
// (the contract of `fill` allows it). All conversions are exact, or one correctly rounded division.
import { div, mul, splat, sub } from "../vector";

// Lane constants: the bit patterns of 1.0 and of 2^52.
const ONE: usize = memory.data<u64>([0x3ff0000000000000, 0x3ff0000000000000], 16);
const TWO52: usize = memory.data<u64>([0x4330000000000000, 0x4330000000000000], 16);

const MIDPOINT32 = 0;
const SCALED32 = 1;
const MIDPOINT64 = 2;
const SCALED64 = 3;
const QUOTIENT64 = 4;

@inline
function isNarrow(kind: i32): bool {
  return kind == MIDPOINT32 || kind == SCALED32;
}

/** Two coordinates from two words side by side: 32-bit ones in the low half, or 64-bit ones. */
@inline
function convert(kind: i32, words: v128, shift: i32, mask: v128, offset: v128, factor: v128): v128 {
  // (k + 1/2) / 2^32: a 32-bit integer is exact in a double.
  if (kind == MIDPOINT32) return mul(f64x2.add(f64x2.convert_low_i32x4_u(words), offset), factor);
  // (k + 1/2) / 2^52 with k the top 52 bits: 1 + k 2^-52 is the bit pattern, and subtracting 1 - 2^-53 is exact.
  if (kind == MIDPOINT64) return sub(v128.or(i64x2.shr_u(words, 12), v128.load(ONE)), offset);
  let wide = kind == SCALED32 ? i64x2.extend_low_i32x4_u(words) : words;
  // k < 2^52 becomes a double by way of the bit pattern of 2^52 + k.
  let k = v128.and(i64x2.shr_u(wide, shift), mask);
  let value = f64x2.add(sub(v128.or(k, v128.load(TWO52)), v128.load(TWO52)), offset);
  return kind == QUOTIENT64 ? div(value, factor) : mul(value, factor);
}

@inline
function loadPair(kind: i32, at: usize): v128 {
  return isNarrow(kind) ? v128.load64_zero(at) : v128.load(at);
}

@inline
function loadTwo(kind: i32, first: usize, second: usize): v128 {
  return isNarrow(kind)
    ? v128.load_lane<u32>(second, v128.load32_zero(first), 1)
    : v128.load_lane<u64>(second, v128.load64_zero(first), 1);
}

@inline
function rows(
  kind: i32, words: usize, dimension: i32, count: i32, out: usize, stride: i32,
  shift: i32, maskBits: u64, offsetValue: f64, factorValue: f64,
): void {
  let mask = i64x2.splat(maskBits), offset = splat(offsetValue), factor = splat(factorValue);
  let size: usize = isNarrow(kind) ? 4 : 8;
  let row = <usize>stride << 3;
  if (dimension == 1) {
    for (let i = 0; i < count; i += 2) {
      let pair = loadPair(kind, words + <usize>i * size);
      v128.store(out + (<usize>i << 3), convert(kind, pair, shift, mask, offset, factor));
    }
    return;
  }
  let step = <usize>dimension * size;
  let even = dimension & ~1;
  for (let j = 0; j < even; j += 2) {
    let at = words + <usize>j * size;
    let to = out + <usize>j * row;
    for (let i = 0; i < count; i += 2) {
      let a = convert(kind, loadPair(kind, at), shift, mask, offset, factor);
      let b = convert(kind, loadPair(kind, at + step), shift, mask, offset, factor);
      v128.store(to, v128.shuffle<u64>(a, b, 0, 2));
      v128.store(to + row, v128.shuffle<u64>(a, b, 1, 3));
      at += step << 1;
      to += 16;
    }
  }
  if (even < dimension) {
    let at = words + <usize>even * size;
    let to = out + <usize>even * row;
    for (let i = 0; i < count; i += 2) {
      let pair = loadTwo(kind, at, at + step);
      v128.store(to, convert(kind, pair, shift, mask, offset, factor));
      at += step << 1;
      to += 16;
    }
  }
}

/** (k + 1/2) / 2^32 from 32-bit words. */
export function rowsMidpoint32(words: usize, dimension: i32, count: i32, out: usize, stride: i32): void {
  rows(MIDPOINT32, words, dimension, count, out, stride, 0, 0, 0.5, 1.0 / 4294967296.0);
}

/** (k + 1/2) / 2^52 from the top 52 bits of 64-bit words. */
export function rowsMidpoint64(words: usize, dimension: i32, count: i32, out: usize, stride: i32): void {
  rows(MIDPOINT64, words, dimension, count, out, stride, 0, 0, 1.0 - 1.0 / 9007199254740992.0, 1);
}

/** (((w >> shift) & mask) + offset) * factor from 32-bit words; the masked integer is below 2^52. */
export function rowsScaled32(
  words: usize, dimension: i32, count: i32, out: usize, stride: i32,
  shift: i32, mask: u64, offset: f64, factor: f64,
): void {
  rows(SCALED32, words, dimension, count, out, stride, shift, mask, offset, factor);
}

/** (((w >> shift) & mask) + offset) * factor from 64-bit words; the masked integer is below 2^52. */
export function rowsScaled64(
  words: usize, dimension: i32, count: i32, out: usize, stride: i32,
  shift: i32, mask: u64, offset: f64, factor: f64,
): void {
  rows(SCALED64, words, dimension, count, out, stride, shift, mask, offset, factor);
}

/** (w + offset) / divisor from 64-bit words below 2^52, correctly rounded. */
export function rowsQuotient64(
  words: usize, dimension: i32, count: i32, out: usize, stride: i32, offset: f64, divisor: f64,
): void {
  rows(QUOTIENT64, words, dimension, count, out, stride, 0, u64.MAX_VALUE, offset, divisor);
}

/** Keeps every `step`-th of the words at `words` (indices 0, step, 2 step, ...), `count` in all, in place. */
export function keepEvery32(words: usize, count: i32, step: i32): void {
  for (let i = 1; i < count; i++) {
    store<u32>(words + (<usize>i << 2), load<u32>(words + (<usize>i * <usize>step << 2)));
  }
}

/** As `keepEvery32` for 64-bit words. */
export function keepEvery64(words: usize, count: i32, step: i32): void {
  for (let i = 1; i < count; i++) {
    store<u64>(words + (<usize>i << 3), load<u64>(words + (<usize>i * <usize>step << 3)));
  }
}

// Philox4x32-10: J. K. Salmon, M. A. Moraes, R. O. Dror and D. E. Shaw, "Parallel random numbers: as easy as 1, 2, 3",
// Proceedings of SC11 (2011), article 16. Eight counters at once, one in each
// 32-bit lane of two vectors.
//
// Layout of `state`: 128-bit counter of the next block (two 64-bit words, low first), 64-bit key (first 32-bit key
// word low), and 0 or 1: how many 64-bit words of that block are used up already.
// A block's words 0 to 3 go out as the two 64-bit words (word 1, word 0) and (word 3, word 2), first word low.

const M0: u64 = 0xd2511f53;
const M1: u64 = 0xcd9e8d57;
const W0: u32 = 0x9e3779b9;
const W1: u32 = 0xbb67ae85;

/** One 32-bit word (shift 0 or 32) of the low halves of four counters from `low` on. */
@inline
function lanes(low: u64, shift: u64): v128 {
  let x = i32x4.splat(<i32>(low >> shift));
  x = i32x4.replace_lane(x, 1, <i32>((low + 1) >> shift));
  x = i32x4.replace_lane(x, 2, <i32>((low + 2) >> shift));
  return i32x4.replace_lane(x, 3, <i32>((low + 3) >> shift));
}

/** One 32-bit word of their high halves: one more from where the low half has wrapped. */
@inline
function highLanes(low: u64, high: u64, shift: u64): v128 {
  let x = i32x4.splat(<i32>(high >> shift));
  x = i32x4.replace_lane(x, 1, <i32>((high + (low + 1 < low ? 1 : 0)) >> shift));
  x = i32x4.replace_lane(x, 2, <i32>((high + (low + 2 < low ? 1 : 0)) >> shift));
  return i32x4.replace_lane(x, 3, <i32>((high + (low + 3 < low ? 1 : 0)) >> shift));
}

/** Words 0 to 3 of four blocks, one block a lane, to four blocks one after the other. */
@inline
function storeBlocks(x0: v128, x1: v128, x2: v128, x3: v128, out: usize): void {
  let p = v128.shuffle<u32>(x0, x1, 0, 4, 1, 5), q = v128.shuffle<u32>(x0, x1, 2, 6, 3, 7);
  let r = v128.shuffle<u32>(x2, x3, 0, 4, 1, 5), s = v128.shuffle<u32>(x2, x3, 2, 6, 3, 7);
  v128.store(out, v128.shuffle<u64>(p, r, 0, 2));
  v128.store(out, v128.shuffle<u64>(p, r, 1, 3), 16);
  v128.store(out, v128.shuffle<u64>(q, s, 0, 2), 32);
  v128.store(out, v128.shuffle<u64>(q, s, 1, 3), 48);
}

/**
 * Writes blocks counter ... counter + 7 (two 64-bit words each) to `out`. Two groups of four go side by side: a round of
 * one waits for its own products.
 */
function eight(low: u64, high: u64, key: u64, out: usize): void {
  let later = low + 4, laterHigh = high + (later < low ? 1 : 0);
  let x0 = lanes(low, 0), x1 = lanes(low, 32), x2 = highLanes(low, high, 0), x3 = highLanes(low, high, 32);
  let y0 = lanes(later, 0), y1 = lanes(later, 32);
  let y2 = highLanes(later, laterHigh, 0), y3 = highLanes(later, laterHigh, 32);
  let k0 = i32x4.splat(<i32>key), k1 = i32x4.splat(<i32>(key >> 32));
  let w0 = i32x4.splat(<i32>W0), w1 = i32x4.splat(<i32>W1);
  let m0 = i32x4.splat(<i32>M0), m1 = i32x4.splat(<i32>M1);
  for (let round = 0; round < 10; round++) {
    let a = i64x2.extmul_low_i32x4_u(x0, m0), b = i64x2.extmul_high_i32x4_u(x0, m0);
    let c = i64x2.extmul_low_i32x4_u(x2, m1), d = i64x2.extmul_high_i32x4_u(x2, m1);
    let e = i64x2.extmul_low_i32x4_u(y0, m0), f = i64x2.extmul_high_i32x4_u(y0, m0);
    let g = i64x2.extmul_low_i32x4_u(y2, m1), h = i64x2.extmul_high_i32x4_u(y2, m1);
    x0 = v128.xor(v128.shuffle<u32>(c, d, 1, 3, 5, 7), v128.xor(x1, k0));
    x2 = v128.xor(v128.shuffle<u32>(a, b, 1, 3, 5, 7), v128.xor(x3, k1));
    x1 = v128.shuffle<u32>(c, d, 0, 2, 4, 6);
    x3 = v128.shuffle<u32>(a, b, 0, 2, 4, 6);
    y0 = v128.xor(v128.shuffle<u32>(g, h, 1, 3, 5, 7), v128.xor(y1, k0));
    y2 = v128.xor(v128.shuffle<u32>(e, f, 1, 3, 5, 7), v128.xor(y3, k1));
    y1 = v128.shuffle<u32>(g, h, 0, 2, 4, 6);
    y3 = v128.shuffle<u32>(e, f, 0, 2, 4, 6);
    k0 = i32x4.add(k0, w0);
    k1 = i32x4.add(k1, w1);
  }
  storeBlocks(x0, x1, x2, x3, out);
  storeBlocks(y0, y1, y2, y3, out + 64);
}

const BLOCKS: usize = memory.data(128, 16);

/** The next `count` 64-bit words. */
export function fillPhilox4x32(state: usize, out: usize, count: i32): void {
  let low = load<u64>(state), high = load<u64>(state, 8), key = load<u64>(state, 16);
  let used = <i32>load<u64>(state, 24);
  while (count > 0) {
    let whole = used == 0 && count >= 16;
    let target = whole ? out : BLOCKS;
    eight(low, high, key, target);
    let size = whole ? 16 : min(16 - used, count);
    if (!whole) memory.copy(out, BLOCKS + (<usize>used << 3), <usize>size << 3);
    let blocks = <u64>((used + size) >> 1);
    used = (used + size) & 1;
    low += blocks;
    if (low < blocks) high++;
    out += <usize>size << 3;
    count -= size;
  }
  store<u64>(state, low);
  store<u64>(state, high, 8);
  store<u64>(state, <u64>used, 24);
}

// Philox4x32-10: J. K. Salmon, M. A. Moraes, R. O. Dror and D. E. Shaw, "Parallel random numbers: as easy as 1, 2, 3",
// Proceedings of SC11 (2011), article 16. Four counters at once, one in each 32-bit lane.
//
// Layout of `state`: 128-bit counter of the next block (two 64-bit words, low first), 64-bit key (first 32-bit key
// word low), and 0 or 1: how many 64-bit words of that block are used up already.
// A block's words 0 to 3 go out as the two 64-bit words (word 1, word 0) and (word 3, word 2), first word low.

const M0: u64 = 0xd2511f53;
const M1: u64 = 0xcd9e8d57;
const W0: u32 = 0x9e3779b9;
const W1: u32 = 0xbb67ae85;

/** Writes blocks counter ... counter + 3 (two 64-bit words each) to `out`. */
@inline
function four(counterLow: u64, counterHigh: u64, key: u64, out: usize): void {
  let c1 = counterLow + 1, c2 = counterLow + 2, c3 = counterLow + 3;
  let x0 = i32x4.replace_lane(i32x4.replace_lane(i32x4.replace_lane(
    i32x4.splat(<i32>counterLow), 1, <i32>c1), 2, <i32>c2), 3, <i32>c3);
  let x1 = i32x4.replace_lane(i32x4.replace_lane(i32x4.replace_lane(
    i32x4.splat(<i32>(counterLow >> 32)), 1, <i32>(c1 >> 32)), 2, <i32>(c2 >> 32)), 3, <i32>(c3 >> 32));
  let high = i64x2.splat(counterHigh);
  let x2: v128, x3: v128;
  if (c3 >= 3) {
    x2 = i32x4.splat(<i32>counterHigh);
    x3 = i32x4.splat(<i32>(counterHigh >> 32));
  } else {
    // the low half wraps inside these four
    let h1 = counterHigh + (c1 < 1 ? 1 : 0), h2 = counterHigh + (c2 < 2 ? 1 : 0), h3 = counterHigh + 1;
    x2 = i32x4.replace_lane(i32x4.replace_lane(i32x4.replace_lane(
      i32x4.splat(<i32>counterHigh), 1, <i32>h1), 2, <i32>h2), 3, <i32>h3);
    x3 = i32x4.replace_lane(i32x4.replace_lane(i32x4.replace_lane(
      i32x4.splat(<i32>(counterHigh >> 32)), 1, <i32>(h1 >> 32)), 2, <i32>(h2 >> 32)), 3, <i32>(h3 >> 32));
  }
  let k0 = <u32>key, k1 = <u32>(key >> 32);
  let m0 = i32x4.splat(<i32>M0), m1 = i32x4.splat(<i32>M1);
  for (let round = 0; round < 10; round++) {
    let a = i64x2.extmul_low_i32x4_u(x0, m0), b = i64x2.extmul_high_i32x4_u(x0, m0);
    let c = i64x2.extmul_low_i32x4_u(x2, m1), d = i64x2.extmul_high_i32x4_u(x2, m1);
    let low0 = v128.shuffle<u32>(a, b, 0, 2, 4, 6), high0 = v128.shuffle<u32>(a, b, 1, 3, 5, 7);
    let low1 = v128.shuffle<u32>(c, d, 0, 2, 4, 6), high1 = v128.shuffle<u32>(c, d, 1, 3, 5, 7);
    x0 = v128.xor(v128.xor(high1, x1), i32x4.splat(k0));
    x2 = v128.xor(v128.xor(high0, x3), i32x4.splat(k1));
    x1 = low1;
    x3 = low0;
    k0 += W0;
    k1 += W1;
  }
  // transpose lanes (counters) and registers (words of a block)
  let p = v128.shuffle<u32>(x0, x1, 0, 4, 1, 5), q = v128.shuffle<u32>(x0, x1, 2, 6, 3, 7);
  let r = v128.shuffle<u32>(x2, x3, 0, 4, 1, 5), s = v128.shuffle<u32>(x2, x3, 2, 6, 3, 7);
  v128.store(out, v128.shuffle<u64>(p, r, 0, 2));
  v128.store(out, v128.shuffle<u64>(p, r, 1, 3), 16);
  v128.store(out, v128.shuffle<u64>(q, s, 0, 2), 32);
  v128.store(out, v128.shuffle<u64>(q, s, 1, 3), 48);
}

const BLOCKS: usize = memory.data(64, 16);

/** The next `count` 64-bit words. */
export function fillPhilox4x32(state: usize, out: usize, count: i32): void {
  let low = load<u64>(state), high = load<u64>(state, 8), key = load<u64>(state, 16);
  let used = <i32>load<u64>(state, 24);
  while (count > 0) {
    let whole = used == 0 && count >= 8;
    let target = whole ? out : BLOCKS;
    four(low, high, key, target);
    let size = whole ? 8 : min(8 - used, count);
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

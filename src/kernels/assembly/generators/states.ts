// Words of one output over many starting states, for averages over all of them.
//
// fillProgression: an affine generator's output is affine in its state, so that over states in arithmetic progression it
// is one too: w, w + step, w + 2 step, ... mod m.
// fillSpan32: a linear generator's output over GF(2) is the exclusive or of one column per bit of the state: for states
// first, first + 1, ... the low eight bits choose from a table, the others change every 256 states.

const ROWS: usize = 256;

/**
 * `count` words from `first` on, `step` apart modulo `modulus` (at most 2^48; step * count below 2^64). Returns the word
 * that follows. Up to three words behind the last are written.
 */
export function fillProgression(out: usize, count: i32, first: f64, step: f64, modulus: f64): f64 {
  let m = <u64>modulus, d = <u64>step, w0 = <u64>first;
  let w1 = (w0 + d) % m, w2 = (w1 + d) % m, w3 = (w2 + d) % m;
  let leap = i64x2.splat((d * 4) % m), limit = i64x2.splat(m - 1), all = i64x2.splat(m);
  let a = i64x2(w0, w1), b = i64x2(w2, w3);
  for (let i = 0; i < count; i += 4) {
    v128.store(out, a);
    v128.store(out, b, 16);
    out += 32;
    a = i64x2.add(a, leap);
    b = i64x2.add(b, leap);
    a = i64x2.sub(a, v128.and(i64x2.gt_s(a, limit), all));
    b = i64x2.sub(b, v128.and(i64x2.gt_s(b, limit), all));
  }
  return <f64>((w0 + (d * <u64>count) % m) % m);
}

/**
 * Words of the states first, first + 1, ... (`count` of them, below 2^32 all). `map` holds 32 columns (the words of the
 * states 1, 2, 4, ...) and behind them the words of the states 0 ... 255, all of 32 bits. Up to three words behind the
 * last are written.
 */
export function fillSpan32(out: usize, count: i32, first: f64, map: usize): void {
  let state = <u64>first;
  let table = map + 128;
  while (count > 0) {
    let low = <usize>(state & 255);
    let size = min(count, <i32>(ROWS - low));
    let base: u32 = 0;
    for (let high = <u32>state & ~255; high != 0; high &= high - 1) {
      base ^= load<u32>(map + (<usize>ctz(high) << 2));
    }
    let bases = i32x4.splat(base);
    let from = table + (low << 2);
    for (let i = 0; i < size; i += 4) {
      v128.store(out + (<usize>i << 2), v128.xor(v128.load(from + (<usize>i << 2)), bases));
    }
    out += <usize>size << 2;
    state += size;
    count -= size;
  }
}

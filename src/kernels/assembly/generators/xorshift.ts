// xorshift generators: G. Marsaglia, "Xorshift RNGs", Journal of Statistical Software 8 (2003) 14; xorshift64*:
// S. Vigna, "An experimental exploration of Marsaglia's xorshift generators, scrambled", ACM Transactions on
// Mathematical Software 42 (2016) 30. Every state word, of 32 bits or 64, stands in a 64-bit one.

/** Shifts (13, 17, 5) on 32 bits; the next `count` 32-bit words. Layout of `state`: one word. */
export function fillXorshift32(state: usize, out: usize, count: i32): void {
  let x = load<u32>(state);
  for (let i = 0; i < count; i++) {
    x ^= x << 13;
    x ^= x >> 17;
    x ^= x << 5;
    store<u32>(out, x);
    out += 4;
  }
  store<u64>(state, <u64>x);
}

/** Shifts (12, 25, 27) on 64 bits, output multiplied; the next `count` 64-bit words. Layout of `state`: one word. */
export function fillXorshift64Star(state: usize, out: usize, count: i32): void {
  let x = load<u64>(state);
  for (let i = 0; i < count; i++) {
    x ^= x >> 12;
    x ^= x << 25;
    x ^= x >> 27;
    store<u64>(out, x * 2685821657736338717);
    out += 8;
  }
  store<u64>(state, x);
}

/** Four words of 32 bits, shifts (11, 8, 19); the next `count` 32-bit words. Layout of `state`: x, y, z, w. */
export function fillXorshift128(state: usize, out: usize, count: i32): void {
  let x = load<u32>(state), y = load<u32>(state, 8), z = load<u32>(state, 16), w = load<u32>(state, 24);
  for (let i = 0; i < count; i++) {
    let t = x ^ (x << 11);
    x = y;
    y = z;
    z = w;
    w = w ^ (w >> 19) ^ t ^ (t >> 8);
    store<u32>(out, w);
    out += 4;
  }
  store<u64>(state, <u64>x);
  store<u64>(state, <u64>y, 8);
  store<u64>(state, <u64>z, 16);
  store<u64>(state, <u64>w, 24);
}

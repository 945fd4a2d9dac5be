// Multiply-with-carry and KISS: G. Marsaglia, postings to sci.stat.math and comp.lang.c of January 1999 and February 2009.
// Words of 32 bits stand each in a 64-bit word of the state.

/** Two 16-bit multiply-with-carry generators side by side; the next `count` 32-bit words. Layout of `state`: z, w. */
export function fillMwc(state: usize, out: usize, count: i32): void {
  let z = load<u32>(state), w = load<u32>(state, 8);
  for (let i = 0; i < count; i++) {
    z = 36969 * (z & 65535) + (z >> 16);
    w = 18000 * (w & 65535) + (w >> 16);
    store<u32>(out, (z << 16) + w);
    out += 4;
  }
  store<u64>(state, <u64>z);
  store<u64>(state, <u64>w, 8);
}

/** KISS of 1999; the next `count` 32-bit words. Layout of `state`: z, w, jsr, jcong. */
export function fillKiss99(state: usize, out: usize, count: i32): void {
  let z = load<u32>(state), w = load<u32>(state, 8), jsr = load<u32>(state, 16), jcong = load<u32>(state, 24);
  for (let i = 0; i < count; i++) {
    z = 36969 * (z & 65535) + (z >> 16);
    w = 18000 * (w & 65535) + (w >> 16);
    jsr ^= jsr << 17;
    jsr ^= jsr >> 13;
    jsr ^= jsr << 5;
    jcong = 69069 * jcong + 1234567;
    store<u32>(out, (((z << 16) + w) ^ jcong) + jsr);
    out += 4;
  }
  store<u64>(state, <u64>z);
  store<u64>(state, <u64>w, 8);
  store<u64>(state, <u64>jsr, 16);
  store<u64>(state, <u64>jcong, 24);
}

/** KISS of 2009 on 64 bits; the next `count` 64-bit words. Layout of `state`: x, c, y, z. */
export function fillKiss64(state: usize, out: usize, count: i32): void {
  let x = load<u64>(state), c = load<u64>(state, 8), y = load<u64>(state, 16), z = load<u64>(state, 24);
  for (let i = 0; i < count; i++) {
    let t = (x << 58) + c;
    c = x >> 6;
    x += t;
    c += x < t ? 1 : 0;
    y ^= y << 13;
    y ^= y >> 17;
    y ^= y << 43;
    z = 6906969069 * z + 1234567;
    store<u64>(out, x + y + z);
    out += 8;
  }
  store<u64>(state, x);
  store<u64>(state, c, 8);
  store<u64>(state, y, 16);
  store<u64>(state, z, 24);
}

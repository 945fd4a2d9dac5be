// Combined generators of P. L'Ecuyer and of Wichmann and Hill. Components and output stand in 64-bit words.

/** t mod 2^32 - k for t < 2^54 and k < 2^15: what stands above 2^32 comes back times k, twice. */
@inline
function fold32(t: u64, k: u64): u64 {
  t = (t & 0xffffffff) + (t >> 32) * k;
  t = (t & 0xffffffff) + (t >> 32) * k;
  let m: u64 = 4294967296 - k;
  return t >= m ? t - m : t;
}

// MRG32k3a: P. L'Ecuyer, "Good parameters and implementations for combined multiple recursive random number generators",
// Operations Research 47 (1999) 159-164, figure 1.
const M1: u64 = 4294967087;
const M2: u64 = 4294944443;

/**
 * The next `count` outputs p1 - p2 mod m1, taken from 1 ... m1.
 * Layout of `state`: x(n-3), x(n-2), x(n-1), y(n-3), y(n-2), y(n-1).
 */
export function fillMrg32k3a(state: usize, out: usize, count: i32): void {
  let x0 = load<u64>(state), x1 = load<u64>(state, 8), x2 = load<u64>(state, 16);
  let y0 = load<u64>(state, 24), y1 = load<u64>(state, 32), y2 = load<u64>(state, 40);
  for (let i = 0; i < count; i++) {
    // -b x = b (m - x): every product stays below 2^53
    let x = fold32(1403580 * x1 + 810728 * (M1 - x0), 209);
    x0 = x1;
    x1 = x2;
    x2 = x;
    let y = fold32(527612 * y2 + 1370589 * (M2 - y0), 22853);
    y0 = y1;
    y1 = y2;
    y2 = y;
    store<u64>(out, x > y ? x - y : x + M1 - y);
    out += 8;
  }
  store<u64>(state, x0);
  store<u64>(state, x1, 8);
  store<u64>(state, x2, 16);
  store<u64>(state, y0, 24);
  store<u64>(state, y1, 32);
  store<u64>(state, y2, 40);
}

/** t mod 2^31 - k for t < 2^47 and k < 2^8. */
@inline
function fold31(t: u64, k: u64): u64 {
  t = (t & 0x7fffffff) + (t >> 31) * k;
  let m: u64 = 2147483648 - k;
  return t >= m ? t - m : t;
}

/**
 * P. L'Ecuyer, "Efficient and portable combined random number generators", Communications of the ACM 31 (1988) 742-751,
 * figure 3: the next `count` outputs s1 - s2, taken from 1 ... 2147483562. Layout of `state`: s1, s2.
 */
export function fillLecuyer1988(state: usize, out: usize, count: i32): void {
  let s1 = load<u64>(state), s2 = load<u64>(state, 8);
  for (let i = 0; i < count; i++) {
    s1 = fold31(40014 * s1, 85);
    s2 = fold31(40692 * s2, 249);
    store<u64>(out, s1 > s2 ? s1 - s2 : s1 + 2147483562 - s2);
    out += 8;
  }
  store<u64>(state, s1);
  store<u64>(state, s2, 8);
}

/**
 * B. A. Wichmann and I. D. Hill, "Algorithm AS 183", Applied Statistics 31 (1982) 188-190: the next `count` values of
 * w = (x / 30269 + y / 30307 + z / 30323 mod 1) times the product of the moduli. Layout of `state`: x, y, z.
 */
export function fillWichmannHill(state: usize, out: usize, count: i32): void {
  let x = load<u32>(state), y = load<u32>(state, 8), z = load<u32>(state, 16);
  const product: u64 = 27817185604309;
  for (let i = 0; i < count; i++) {
    x = (171 * x) % 30269;
    y = (172 * y) % 30307;
    z = (170 * z) % 30323;
    let w = <u64>x * 918999161 + <u64>y * 917846887 + <u64>z * 917362583;
    if (w >= product) w -= product;
    if (w >= product) w -= product;
    store<u64>(out, w);
    out += 8;
  }
  store<u64>(state, <u64>x);
  store<u64>(state, <u64>y, 8);
  store<u64>(state, <u64>z, 16);
}

// Combined Tausworthe generators of P. L'Ecuyer: taus88, "Maximally equidistributed combined Tausworthe generators",
// Mathematics of Computation 65 (1996) 203-213, figure 1; LFSR113, "Tables of maximally equidistributed combined LFSR
// generators", ibid. 68 (1999) 261-269, figure 1. 32-bit words, each in a 64-bit word of the state.
//
// Long runs go in four lanes, each a quarter of 1,024 words: a component is linear over GF(2), so the state 256 steps on is
// the exclusive or of one column per set bit, whatever the state.

const LANE = 256;

// Columns of 256 steps, 32 words for each component: three of taus88, then four of LFSR113; made when first wanted.
const COLUMNS: usize = memory.data(7 * 128, 16);
const BITS: usize = memory.data<u32>([1, 2, 4, 8], 16);

/** One step of a component, of one state (u32) or of four (v128). */
@inline
function component<T>(s: T, keep: u32, up: u32, across: u32, down: u32): T {
  if (isVector<T>()) {
    let kept = i32x4.shl(v128.and(s, i32x4.splat(keep)), up);
    return <T>v128.xor(kept, i32x4.shr_u(v128.xor(i32x4.shl(s, across), s), down));
  }
  return <T>(((<u32>s & keep) << up) ^ (((<u32>s << across) ^ <u32>s) >> down));
}

// The components by their parameters.
@inline function taus88_1<T>(s: T): T { return component<T>(s, 0xfffffffe, 12, 13, 19); }
@inline function taus88_2<T>(s: T): T { return component<T>(s, 0xfffffff8, 4, 2, 25); }
@inline function taus88_3<T>(s: T): T { return component<T>(s, 0xfffffff0, 17, 3, 11); }
@inline function lfsr113_1<T>(s: T): T { return component<T>(s, 0xfffffffe, 18, 6, 13); }
@inline function lfsr113_2<T>(s: T): T { return component<T>(s, 0xfffffff8, 2, 2, 27); }
@inline function lfsr113_3<T>(s: T): T { return component<T>(s, 0xfffffff0, 7, 13, 21); }
@inline function lfsr113_4<T>(s: T): T { return component<T>(s, 0xffffff80, 13, 3, 12); }

/** One step of the component that owns row `row` of `COLUMNS`. */
function stepOf(row: i32, s: u32): u32 {
  switch (row) {
    case 0: return taus88_1<u32>(s);
    case 1: return taus88_2<u32>(s);
    case 2: return taus88_3<u32>(s);
    case 3: return lfsr113_1<u32>(s);
    case 4: return lfsr113_2<u32>(s);
    case 5: return lfsr113_3<u32>(s);
    default: return lfsr113_4<u32>(s);
  }
}

function makeColumns(): void {
  for (let row = 0; row < 7; row++) {
    for (let bit = 0; bit < 32; bit++) {
      let s: u32 = 1 << bit;
      for (let step = 0; step < LANE; step++) s = stepOf(row, s);
      store<u32>(COLUMNS + (<usize>(row * 32 + bit) << 2), s);
    }
  }
}

/** The state 256 steps on. */
function jump(s: u32, columns: usize): u32 {
  let sum = i32x4.splat(0), bits = v128.load(BITS), all = i32x4.splat(s);
  for (let k = 0; k < 8; k++) {
    sum = v128.xor(sum, v128.and(i32x4.eq(v128.and(all, bits), bits), v128.load(columns)));
    bits = i32x4.shl(bits, 4);
    columns += 16;
  }
  let half = v128.xor(sum, v128.shuffle<u64>(sum, sum, 1, 0));
  return i32x4.extract_lane(half, 0) ^ i32x4.extract_lane(half, 1);
}

/** A state and those 256, 512 and 768 steps on. */
@inline
function lanes(s: u32, row: usize): v128 {
  let columns = COLUMNS + (row << 7);
  let second = jump(s, columns), third = jump(second, columns);
  let pair = i32x4.replace_lane(i32x4.splat(s), 1, second);
  return i32x4.replace_lane(i32x4.replace_lane(pair, 2, third), 3, jump(third, columns));
}

/** Four outputs of each lane, one row of `LANE` words behind the other. */
@inline
function storeTransposed(out: usize, a: v128, b: v128, c: v128, d: v128): void {
  let ab = v128.shuffle<u32>(a, b, 0, 4, 1, 5), cd = v128.shuffle<u32>(c, d, 0, 4, 1, 5);
  v128.store(out, v128.shuffle<u64>(ab, cd, 0, 2));
  v128.store(out, v128.shuffle<u64>(ab, cd, 1, 3), LANE * 4);
  ab = v128.shuffle<u32>(a, b, 2, 6, 3, 7);
  cd = v128.shuffle<u32>(c, d, 2, 6, 3, 7);
  v128.store(out, v128.shuffle<u64>(ab, cd, 0, 2), LANE * 8);
  v128.store(out, v128.shuffle<u64>(ab, cd, 1, 3), LANE * 12);
}

/** The next `count` 32-bit words. Layout of `state`: s1, s2, s3. */
export function fillTaus88(state: usize, out: usize, count: i32): void {
  let s1 = load<u32>(state), s2 = load<u32>(state, 8), s3 = load<u32>(state, 16);
  if (count >= 4 * LANE && load<u32>(COLUMNS, 124) == 0) makeColumns();
  for (; count >= 4 * LANE; count -= 4 * LANE) {
    let a = lanes(s1, 0), b = lanes(s2, 1), c = lanes(s3, 2);
    let w0 = a, w1 = a, w2 = a, w3 = a;
    for (let end = out + LANE * 4; out < end; out += 16) {
      a = taus88_1<v128>(a); b = taus88_2<v128>(b); c = taus88_3<v128>(c);
      w0 = v128.xor(v128.xor(a, b), c);
      a = taus88_1<v128>(a); b = taus88_2<v128>(b); c = taus88_3<v128>(c);
      w1 = v128.xor(v128.xor(a, b), c);
      a = taus88_1<v128>(a); b = taus88_2<v128>(b); c = taus88_3<v128>(c);
      w2 = v128.xor(v128.xor(a, b), c);
      a = taus88_1<v128>(a); b = taus88_2<v128>(b); c = taus88_3<v128>(c);
      w3 = v128.xor(v128.xor(a, b), c);
      storeTransposed(out, w0, w1, w2, w3);
    }
    out += LANE * 12;
    s1 = i32x4.extract_lane(a, 3);
    s2 = i32x4.extract_lane(b, 3);
    s3 = i32x4.extract_lane(c, 3);
  }
  for (; count > 0; count--) {
    s1 = taus88_1<u32>(s1);
    s2 = taus88_2<u32>(s2);
    s3 = taus88_3<u32>(s3);
    store<u32>(out, s1 ^ s2 ^ s3);
    out += 4;
  }
  store<u64>(state, <u64>s1);
  store<u64>(state, <u64>s2, 8);
  store<u64>(state, <u64>s3, 16);
}

/** The next `count` 32-bit words. Layout of `state`: z1, z2, z3, z4. */
export function fillLfsr113(state: usize, out: usize, count: i32): void {
  let z1 = load<u32>(state), z2 = load<u32>(state, 8), z3 = load<u32>(state, 16), z4 = load<u32>(state, 24);
  if (count >= 4 * LANE && load<u32>(COLUMNS, 124) == 0) makeColumns();
  for (; count >= 4 * LANE; count -= 4 * LANE) {
    let a = lanes(z1, 3), b = lanes(z2, 4), c = lanes(z3, 5), d = lanes(z4, 6);
    let w0 = a, w1 = a, w2 = a, w3 = a;
    for (let end = out + LANE * 4; out < end; out += 16) {
      a = lfsr113_1<v128>(a); b = lfsr113_2<v128>(b); c = lfsr113_3<v128>(c); d = lfsr113_4<v128>(d);
      w0 = v128.xor(v128.xor(a, b), v128.xor(c, d));
      a = lfsr113_1<v128>(a); b = lfsr113_2<v128>(b); c = lfsr113_3<v128>(c); d = lfsr113_4<v128>(d);
      w1 = v128.xor(v128.xor(a, b), v128.xor(c, d));
      a = lfsr113_1<v128>(a); b = lfsr113_2<v128>(b); c = lfsr113_3<v128>(c); d = lfsr113_4<v128>(d);
      w2 = v128.xor(v128.xor(a, b), v128.xor(c, d));
      a = lfsr113_1<v128>(a); b = lfsr113_2<v128>(b); c = lfsr113_3<v128>(c); d = lfsr113_4<v128>(d);
      w3 = v128.xor(v128.xor(a, b), v128.xor(c, d));
      storeTransposed(out, w0, w1, w2, w3);
    }
    out += LANE * 12;
    z1 = i32x4.extract_lane(a, 3);
    z2 = i32x4.extract_lane(b, 3);
    z3 = i32x4.extract_lane(c, 3);
    z4 = i32x4.extract_lane(d, 3);
  }
  for (; count > 0; count--) {
    z1 = lfsr113_1<u32>(z1);
    z2 = lfsr113_2<u32>(z2);
    z3 = lfsr113_3<u32>(z3);
    z4 = lfsr113_4<u32>(z4);
    store<u32>(out, z1 ^ z2 ^ z3 ^ z4);
    out += 4;
  }
  store<u64>(state, <u64>z1);
  store<u64>(state, <u64>z2, 8);
  store<u64>(state, <u64>z3, 16);
  store<u64>(state, <u64>z4, 24);
}

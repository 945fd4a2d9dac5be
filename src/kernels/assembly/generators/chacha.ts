// ChaCha: D. J. Bernstein, "ChaCha, a variant of Salsa20" (2008); the block function, 32-bit counter and 96-bit nonce of
// RFC 8439 (Y. Nir and A. Langley 2018). Four blocks at once, one in each 32-bit lane.
//
// Layout of `state` (64-bit words): the key in four words; counter (low half) and first nonce word (high half); the other
// two nonce words; how many 64-bit words of the next block are used up already, 0 to 7. The counter carries into the
// first nonce word, as in the original of 2008 with its 64-bit counter.

@inline
function rotl16(x: v128): v128 {
  return i8x16.shuffle(x, x, 2, 3, 0, 1, 6, 7, 4, 5, 10, 11, 8, 9, 14, 15, 12, 13);
}
@inline
function rotl8(x: v128): v128 {
  return i8x16.shuffle(x, x, 3, 0, 1, 2, 7, 4, 5, 6, 11, 8, 9, 10, 15, 12, 13, 14);
}
@inline
function rotate(x: v128, k: i32): v128 {
  return v128.or(i32x4.shl(x, k), i32x4.shr_u(x, 32 - k));
}

// The 16 words of four blocks; kept in memory, as the quarter rounds touch four at a time.
const X: usize = memory.data(256, 16);

@inline
function quarter(a: usize, b: usize, c: usize, d: usize): void {
  let va = v128.load(X + (a << 4)), vb = v128.load(X + (b << 4));
  let vc = v128.load(X + (c << 4)), vd = v128.load(X + (d << 4));
  va = i32x4.add(va, vb);
  vd = rotl16(v128.xor(vd, va));
  vc = i32x4.add(vc, vd);
  vb = rotate(v128.xor(vb, vc), 12);
  va = i32x4.add(va, vb);
  vd = rotl8(v128.xor(vd, va));
  vc = i32x4.add(vc, vd);
  vb = rotate(v128.xor(vb, vc), 7);
  v128.store(X + (a << 4), va);
  v128.store(X + (b << 4), vb);
  v128.store(X + (c << 4), vc);
  v128.store(X + (d << 4), vd);
}

// "expand 32-byte k"
const CONSTANTS: usize = memory.data<u32>([0x61707865, 0x3320646e, 0x79622d32, 0x6b206574], 16);

/** Word k of four blocks from `state` on, before the rounds. */
@inline
function initial(state: usize, k: usize): v128 {
  if (k < 4) return i32x4.splat(load<i32>(CONSTANTS + (k << 2)));
  if (k < 12) return i32x4.splat(load<i32>(state + ((k - 4) << 2)));
  if (k < 14) {
    let c0 = load<u64>(state, 32), c1 = c0 + 1, c2 = c0 + 2, c3 = c0 + 3;
    let shift = <u64>(k == 12 ? 0 : 32);
    let x = i32x4.splat(<i32>(c0 >> shift));
    x = i32x4.replace_lane(x, 1, <i32>(c1 >> shift));
    x = i32x4.replace_lane(x, 2, <i32>(c2 >> shift));
    return i32x4.replace_lane(x, 3, <i32>(c3 >> shift));
  }
  return i32x4.splat(load<i32>(state + 40 + ((k - 14) << 2)));
}

/** Blocks counter ... counter + 3, 64 bytes each, one after the other. */
function four(state: usize, out: usize, doubleRounds: i32): void {
  for (let k: usize = 0; k < 16; k++) v128.store(X + (k << 4), initial(state, k));
  for (let round = 0; round < doubleRounds; round++) {
    quarter(0, 4, 8, 12);
    quarter(1, 5, 9, 13);
    quarter(2, 6, 10, 14);
    quarter(3, 7, 11, 15);
    quarter(0, 5, 10, 15);
    quarter(1, 6, 11, 12);
    quarter(2, 7, 8, 13);
    quarter(3, 4, 9, 14);
  }
  for (let k: usize = 0; k < 16; k += 4) {
    let a = i32x4.add(v128.load(X + (k << 4)), initial(state, k));
    let b = i32x4.add(v128.load(X + (k << 4), 16), initial(state, k + 1));
    let c = i32x4.add(v128.load(X + (k << 4), 32), initial(state, k + 2));
    let d = i32x4.add(v128.load(X + (k << 4), 48), initial(state, k + 3));
    let p = v128.shuffle<u32>(a, b, 0, 4, 1, 5), q = v128.shuffle<u32>(a, b, 2, 6, 3, 7);
    let r = v128.shuffle<u32>(c, d, 0, 4, 1, 5), s = v128.shuffle<u32>(c, d, 2, 6, 3, 7);
    let to = out + (k << 2);
    v128.store(to, v128.shuffle<u64>(p, r, 0, 2));
    v128.store(to, v128.shuffle<u64>(p, r, 1, 3), 64);
    v128.store(to, v128.shuffle<u64>(q, s, 0, 2), 128);
    v128.store(to, v128.shuffle<u64>(q, s, 1, 3), 192);
  }
}

const BLOCKS: usize = memory.data(256, 16);

function fill(state: usize, out: usize, count: i32, doubleRounds: i32): void {
  let used = <i32>load<u64>(state, 48);
  while (count > 0) {
    let whole = used == 0 && count >= 32;
    four(state, whole ? out : BLOCKS, doubleRounds);
    let size = whole ? 32 : min(32 - used, count);
    if (!whole) memory.copy(out, BLOCKS + (<usize>used << 3), <usize>size << 3);
    store<u64>(state, load<u64>(state, 32) + <u64>((used + size) >> 3), 32);
    used = (used + size) & 7;
    out += <usize>size << 3;
    count -= size;
  }
  store<u64>(state, <u64>used, 48);
}

/** The next `count` 64-bit words of the keystream of 8 rounds, each two 32-bit words, the first one low. */
export function fillChaCha8(state: usize, out: usize, count: i32): void {
  fill(state, out, count, 4);
}

/** As above, of 20 rounds. */
export function fillChaCha20(state: usize, out: usize, count: i32): void {
  fill(state, out, count, 10);
}

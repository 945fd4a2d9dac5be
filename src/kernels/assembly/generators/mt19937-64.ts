// MT19937-64: T. Nishimura, "Tables of 64-bit Mersenne twisters", ACM Transactions on Modeling and Computer Simulation 10
// (2000) 348-357. Two words at a time, as in mt19937.ts. Layout of `state`: 312 words of 64 bits, then the index of the
// next one (64 bits).

const N: i32 = 312;
const LAG: i32 = 156;
const INDEX: usize = 2496;
const A: u64 = 0xb5026f5aa96619e9;
const UPPER: u64 = 0xffffffff80000000;
const LOWER: u64 = 0x7fffffff;

@inline
function twist(x: v128, y: v128): v128 {
  let t = v128.or(v128.and(x, i64x2.splat(UPPER)), v128.and(y, i64x2.splat(LOWER)));
  let odd = i64x2.neg(v128.and(y, i64x2.splat(1)));
  return v128.xor(i64x2.shr_u(t, 1), v128.and(odd, i64x2.splat(A)));
}

@inline
function twistOne(x: u64, y: u64): u64 {
  return (((x & UPPER) | (y & LOWER)) >> 1) ^ (-(y & 1) & A);
}

@inline
function at(state: usize, i: i32): usize {
  return state + (<usize>i << 3);
}

function regenerate(state: usize): void {
  let i = 0;
  for (; i < LAG; i += 2) {
    let p = at(state, i);
    v128.store(p, v128.xor(v128.load(at(state, i + LAG)), twist(v128.load(p), v128.load(p, 8))));
  }
  // 155 = 2 * 77 + 1 words more before the last
  for (; i < N - 2; i += 2) {
    let p = at(state, i);
    v128.store(p, v128.xor(v128.load(at(state, i - LAG)), twist(v128.load(p), v128.load(p, 8))));
  }
  for (; i < N; i++) {
    let p = at(state, i);
    let next = i + 1 < N ? load<u64>(p, 8) : load<u64>(state);
    store<u64>(p, load<u64>(at(state, i - LAG)) ^ twistOne(load<u64>(p), next));
  }
}

@inline
function temper(y: v128): v128 {
  y = v128.xor(y, v128.and(i64x2.shr_u(y, 29), i64x2.splat(0x5555555555555555)));
  y = v128.xor(y, v128.and(i64x2.shl(y, 17), i64x2.splat(0x71d67fffeda60000)));
  y = v128.xor(y, v128.and(i64x2.shl(y, 37), i64x2.splat(0xfff7eee000000000)));
  return v128.xor(y, i64x2.shr_u(y, 43));
}

/** The next `count` 64-bit words; one more may be written behind them (and is not used up). */
export function fillMt19937x64(state: usize, out: usize, count: i32): void {
  let index = <i32>load<u64>(state, INDEX);
  while (count > 0) {
    if (index == N) {
      regenerate(state);
      index = 0;
    }
    let size = min(N - index, count);
    let from = at(state, index);
    for (let i = 0; i < size; i += 2) {
      v128.store(out + (<usize>i << 3), temper(v128.load(from + (<usize>i << 3))));
    }
    out += <usize>size << 3;
    index += size;
    count -= size;
  }
  store<u64>(state, <u64>index, INDEX);
}

// MT19937: M. Matsumoto and T. Nishimura, "Mersenne twister: a 623-dimensionally equidistributed uniform pseudo-random
// number generator", ACM Transactions on Modeling and Computer Simulation 8 (1998) 3-30.
//
// Four words at a time: word i needs words i, i + 1 and i + 397 of the old block (or i - 227 of the new one), and
// 227 and 397 are far more than four apart.
// Layout of `state`: 624 words of 32 bits, then the index of the next one (32 bits) and padding to 16 bytes.

const N: i32 = 624;
const LAG: i32 = 397;
const INDEX: usize = 2496;

/** The twist of four words: (upper bit of x, lower bits of y), halved, with the matrix A where it was odd. */
@inline
function twist(x: v128, y: v128): v128 {
  let t = v128.or(v128.and(x, i32x4.splat(0x80000000)), v128.and(y, i32x4.splat(0x7fffffff)));
  let odd = i32x4.neg(v128.and(y, i32x4.splat(1)));
  return v128.xor(i32x4.shr_u(t, 1), v128.and(odd, i32x4.splat(0x9908b0df)));
}

@inline
function twistOne(x: u32, y: u32): u32 {
  let t = (x & 0x80000000) | (y & 0x7fffffff);
  return (t >> 1) ^ (-(y & 1) & 0x9908b0df);
}

@inline
function at(state: usize, i: i32): usize {
  return state + (<usize>i << 2);
}

function regenerate(state: usize): void {
  // 227 = 4 * 56 + 3 words draw on the old block alone
  let i = 0;
  for (; i < 224; i += 4) {
    let p = at(state, i);
    v128.store(p, v128.xor(v128.load(at(state, i + LAG)), twist(v128.load(p), v128.load(p, 4))));
  }
  for (; i < 227; i++) {
    let p = at(state, i);
    store<u32>(p, load<u32>(at(state, i + LAG)) ^ twistOne(load<u32>(p), load<u32>(p, 4)));
  }
  // then 396 = 4 * 99 on words of the new block
  for (; i < N - 1; i += 4) {
    let p = at(state, i);
    v128.store(p, v128.xor(v128.load(at(state, i + LAG - N)), twist(v128.load(p), v128.load(p, 4))));
  }
  let last = at(state, N - 1);
  store<u32>(last, load<u32>(at(state, LAG - 1)) ^ twistOne(load<u32>(last), load<u32>(state)));
}

@inline
function temper(y: v128): v128 {
  y = v128.xor(y, i32x4.shr_u(y, 11));
  y = v128.xor(y, v128.and(i32x4.shl(y, 7), i32x4.splat(0x9d2c5680)));
  y = v128.xor(y, v128.and(i32x4.shl(y, 15), i32x4.splat(0xefc60000)));
  return v128.xor(y, i32x4.shr_u(y, 18));
}

/** The next `count` 32-bit words; up to three more are written behind them (and are not used up). */
export function fillMt19937(state: usize, out: usize, count: i32): void {
  let index = <i32>load<u32>(state, INDEX);
  while (count > 0) {
    if (index == N) {
      regenerate(state);
      index = 0;
    }
    let size = min(N - index, count);
    let from = at(state, index);
    for (let i = 0; i < size; i += 4) {
      v128.store(out + (<usize>i << 2), temper(v128.load(from + (<usize>i << 2))));
    }
    out += <usize>size << 2;
    index += size;
    count -= size;
  }
  store<u32>(state, <u32>index, INDEX);
}

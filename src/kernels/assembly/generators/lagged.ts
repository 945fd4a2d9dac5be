// Generators that combine two earlier words of a long state. The ring holds the last r words; the index points to the
// oldest, which the new one replaces.

/** Words from r places back and s places back (s < r), for a ring whose oldest word stands at `index`. */
@inline
function backAt(index: i32, r: i32, s: i32): i32 {
  let k = index + r - s;
  return k >= r ? k - r : k;
}

/**
 * x(n) = x(n-55) - x(n-24) mod 10^9: D. E. Knuth, The Art of Computer Programming, vol. 2, 2nd ed. (1981), 3.2.2 and 3.6.
 * The next `count` words, 64 bits each. Layout of `state` (64-bit words): 55 words, index.
 */
export function fillSubtractive55(state: usize, out: usize, count: i32): void {
  let index = <i32>load<u64>(state, 440);
  for (let i = 0; i < count; i++) {
    let oldest = state + (<usize>index << 3);
    let x = load<i64>(oldest) - load<i64>(state + (<usize>backAt(index, 55, 24) << 3));
    // a branch here would be mispredicted half of the time
    x += (x >> 63) & 1000000000;
    store<i64>(oldest, x);
    store<i64>(out, x);
    out += 8;
    index = index == 54 ? 0 : index + 1;
  }
  store<u64>(state, <u64>index, 440);
}

/**
 * R250, x(n) = x(n-103) xor x(n-250): S. Kirkpatrick and E. P. Stoll, "A very fast shift-register sequence random number
 * generator", Journal of Computational Physics 40 (1981) 517-526. The next `count` 32-bit words. Layout of `state`: 250
 * words of 32 bits, index (32 bits).
 */
export function fillR250(state: usize, out: usize, count: i32): void {
  let index = <i32>load<u32>(state, 1000);
  while (count > 0) {
    let back = backAt(index, 250, 103);
    // as far as neither place wraps round; a word is read again 103 words later at the earliest, so four go at once
    let run = min(count, 250 - max(index, back));
    let oldest = state + (<usize>index << 2), later = state + (<usize>back << 2);
    let end = oldest + (<usize>run << 2), fours = oldest + (<usize>(run & ~3) << 2);
    for (; oldest < fours; oldest += 16, later += 16, out += 16) {
      let x = v128.xor(v128.load(oldest), v128.load(later));
      v128.store(oldest, x);
      v128.store(out, x);
    }
    for (; oldest < end; oldest += 4, later += 4, out += 4) {
      let x = load<u32>(oldest) ^ load<u32>(later);
      store<u32>(oldest, x);
      store<u32>(out, x);
    }
    index += run;
    if (index == 250) index = 0;
    count -= run;
  }
  store<u32>(state, <u32>index, 1000);
}

// 100 words of state and the 1009 that follow, in steps of four
const RUN: usize = memory.data(4448, 16);

/**
 * Knuth's array generator of 2002, x(n) = x(n-100) - x(n-37) mod 2^30, 100 of every 1009 words used (TAOCP vol. 2, 3.6,
 * ninth printing). The next `count` 32-bit words. Layout of `state`: 100 words of 32 bits, index (32 bits).
 */
export function fillKnuthArray(state: usize, out: usize, count: i32): void {
  let index = <i32>load<u32>(state, 400);
  for (let i = 0; i < count; i++) {
    if (index == 100) {
      memory.copy(RUN, state, 400);
      let p = RUN + 400;
      for (let k = 0; k < 1009; k += 4) {
        let x = i32x4.sub(v128.load(p - 400), v128.load(p - 148));
        v128.store(p, v128.and(x, i32x4.splat(0x3fffffff)));
        p += 16;
      }
      memory.copy(state, RUN + 4036, 400);
      index = 0;
    }
    store<u32>(out, load<u32>(state + (<usize>index << 2)));
    out += 4;
    index++;
  }
  store<u32>(state, <u32>index, 400);
}

// The words of a subtract-with-borrow generator in a row, oldest first: the last r begin the next row.
const ROW: usize = memory.data(8192, 16);
const ROW_END: usize = 8192;

/**
 * Subtract with borrow, x(n) = x(n-s) - x(n-r) - borrow mod 2^b: G. Marsaglia and A. Zaman, "A new class of random number
 * generators", Annals of Applied Probability 1 (1991) 462-480; of every `block` words `used` are given out and the others
 * dropped, as M. Lüscher, "A portable high-quality random number generator for lattice field theory simulations", Computer
 * Physics Communications 79 (1994) 100-110, proposed. The next `count` words, 64 bits each. Layout of `state` (64-bit
 * words): 24 places for r words, oldest first, borrow, words given out of the present block; then r, s, b, block, used.
 */
export function fillSubtractWithBorrow(state: usize, out: usize, count: i32): void {
  let borrow = load<i64>(state, 192), given = <i32>load<u64>(state, 200);
  let r = <usize>load<u64>(state, 208) << 3, s = <usize>load<u64>(state, 216) << 3, b = load<i64>(state, 224);
  let block = <i32>load<u64>(state, 232), used = <i32>load<u64>(state, 240);
  let mask = (<i64>1 << b) - 1;
  let end = ROW + ROW_END, p = ROW + r;
  memory.copy(ROW, state, r);
  for (let i = 0; i < count; i++) {
    let steps = 1;
    if (given == used) {
      steps += block - used;
      given = 0;
    }
    let x: i64 = 0;
    for (; steps > 0; steps--) {
      if (p == end) {
        memory.copy(ROW, end - r, r);
        p = ROW + r;
      }
      x = load<i64>(p - s) - load<i64>(p - r) - borrow;
      borrow = <i64>(<u64>x >> 63);
      x &= mask;
      store<i64>(p, x);
      p += 8;
    }
    given++;
    store<i64>(out, x);
    out += 8;
  }
  memory.copy(state, p - r, r);
  store<i64>(state, borrow, 192);
  store<u64>(state, <u64>given, 200);
}

// Multiple recursive generators x(n) = a1 x(n-1) + ... + ak x(n-k) + c mod m of any order up to 64 and any modulus up to
// 2^64 - 1 (Knuth, The Art of Computer Programming, vol. 2, 3.2.2), and xorshift with any triple of shifts.
import { divideWide, mulHigh } from "./wide";

/**
 * The next `count` words, 64 bits each. Layout of `state` (64-bit words): 64 places for k words in a ring, index of the
 * oldest; then k, terms, c, m 2^s with its top bit set, its reciprocal (see wide.ts), s, and for each term its lag and its
 * coefficient.
 */
export function fillRecursive(state: usize, out: usize, count: i32): void {
  let index = <i32>load<u64>(state, 512), order = <i32>load<u64>(state, 520), terms = <i32>load<u64>(state, 528);
  let c = load<u64>(state, 536), scaled = load<u64>(state, 544), reciprocal = load<u64>(state, 552);
  let s = load<u64>(state, 560);
  let m = scaled >> s;
  for (let i = 0; i < count; i++) {
    let sum = c;
    let term = state + 568;
    for (let t = 0; t < terms; t++) {
      let k = index - <i32>load<u64>(term);
      let a = load<u64>(term, 8), left = load<u64>(state + (<usize>(k < 0 ? k + order : k) << 3)) << s;
      let high = mulHigh(a, left), low = a * left;
      let r = (low - divideWide(high, low, scaled, reciprocal) * scaled) >> s;
      // sum + r mod m without passing 2^64
      sum = r >= m - sum ? r - (m - sum) : r + sum;
      term += 16;
    }
    store<u64>(state + (<usize>index << 3), sum);
    store<u64>(out, sum);
    out += 8;
    index = index == order - 1 ? 0 : index + 1;
  }
  store<u64>(state, <u64>index, 512);
}

@inline
function shift32(x: u32, by: i32): u32 {
  return by > 0 ? x ^ (x << by) : x ^ (x >> -by);
}

@inline
function shift64(x: u64, by: i64): u64 {
  return by > 0 ? x ^ (x << by) : x ^ (x >> -by);
}

/** Three shifts, left where positive, of one 32-bit word; the next `count` of them. Layout of `state`: x, three shifts. */
export function fillXorshiftTriple32(state: usize, out: usize, count: i32): void {
  let x = load<u32>(state), a = load<i32>(state, 8), b = load<i32>(state, 16), c = load<i32>(state, 24);
  for (let i = 0; i < count; i++) {
    x = shift32(shift32(shift32(x, a), b), c);
    store<u32>(out, x);
    out += 4;
  }
  store<u64>(state, <u64>x);
}

/** As above, of one 64-bit word. */
export function fillXorshiftTriple64(state: usize, out: usize, count: i32): void {
  let x = load<u64>(state), a = load<i64>(state, 8), b = load<i64>(state, 16), c = load<i64>(state, 24);
  for (let i = 0; i < count; i++) {
    x = shift64(shift64(shift64(x, a), b), c);
    store<u64>(out, x);
    out += 8;
  }
  store<u64>(state, x);
}

// Counter-based generators of four 64-bit words a block: J. K. Salmon, M. A. Moraes, R. O. Dror and D. E. Shaw,
// "Parallel random numbers: as easy as 1, 2, 3", Proceedings of SC11 (2011), article 16.
//
// Layout of `state` (64-bit words): the 256-bit counter of the next block, lowest word first; the key (two words for
// Philox, four for Threefry); how many words of that block are used up already, 0 to 3.
import { mulHigh } from "./wide";

const WORDS: usize = memory.data(32, 16);

/** Philox4x64-10. */
@inline
function philox(state: usize, out: usize): void {
  let x0 = load<u64>(state), x1 = load<u64>(state, 8), x2 = load<u64>(state, 16), x3 = load<u64>(state, 24);
  let k0 = load<u64>(state, 32), k1 = load<u64>(state, 40);
  const m0: u64 = 0xd2e7470ee14c6c93, m1: u64 = 0xca5a826395121157;
  for (let round = 0; round < 10; round++) {
    let high0 = mulHigh(m0, x0), low0 = m0 * x0;
    let high1 = mulHigh(m1, x2), low1 = m1 * x2;
    x0 = high1 ^ x1 ^ k0;
    x1 = low1;
    x2 = high0 ^ x3 ^ k1;
    x3 = low0;
    k0 += 0x9e3779b97f4a7c15;
    k1 += 0xbb67ae8584caa73b;
  }
  store<u64>(out, x0);
  store<u64>(out, x1, 8);
  store<u64>(out, x2, 16);
  store<u64>(out, x3, 24);
}

/** Threefry4x64-20: rotations of the paper's table 2, a key word added every four rounds. */
@inline
function threefry(state: usize, out: usize): void {
  let k0 = load<u64>(state, 32), k1 = load<u64>(state, 40), k2 = load<u64>(state, 48), k3 = load<u64>(state, 56);
  let k4 = 0x1bd11bdaa9fc1a22 ^ k0 ^ k1 ^ k2 ^ k3;
  let x0 = load<u64>(state) + k0, x1 = load<u64>(state, 8) + k1;
  let x2 = load<u64>(state, 16) + k2, x3 = load<u64>(state, 24) + k3;
  for (let s: u64 = 1; s <= 5; s++) {
    let first = (s & 1) != 0;
    x0 += x1; x1 = rotl<u64>(x1, first ? 14 : 25) ^ x0;
    x2 += x3; x3 = rotl<u64>(x3, first ? 16 : 33) ^ x2;
    x0 += x3; x3 = rotl<u64>(x3, first ? 52 : 46) ^ x0;
    x2 += x1; x1 = rotl<u64>(x1, first ? 57 : 12) ^ x2;
    x0 += x1; x1 = rotl<u64>(x1, first ? 23 : 58) ^ x0;
    x2 += x3; x3 = rotl<u64>(x3, first ? 40 : 22) ^ x2;
    x0 += x3; x3 = rotl<u64>(x3, first ? 5 : 32) ^ x0;
    x2 += x1; x1 = rotl<u64>(x1, first ? 37 : 32) ^ x2;
    // the five key words move round by one place each time
    let moved = k0;
    k0 = k1; k1 = k2; k2 = k3; k3 = k4; k4 = moved;
    x0 += k0;
    x1 += k1;
    x2 += k2;
    x3 += k3 + s;
  }
  store<u64>(out, x0);
  store<u64>(out, x1, 8);
  store<u64>(out, x2, 16);
  store<u64>(out, x3, 24);
}

const PHILOX = 0;
const THREEFRY = 1;

@inline
function fill(kind: i32, state: usize, out: usize, count: i32): void {
  let usedAt: usize = kind == PHILOX ? 48 : 64;
  let used = <i32>load<u64>(state + usedAt);
  while (count > 0) {
    let whole = used == 0 && count >= 4;
    let target = whole ? out : WORDS;
    if (kind == PHILOX) philox(state, target);
    else threefry(state, target);
    let size = whole ? 4 : min(4 - used, count);
    if (!whole) memory.copy(out, WORDS + (<usize>used << 3), <usize>size << 3);
    used += size;
    if (used == 4) {
      used = 0;
      let at = state;
      for (let k = 0; k < 4; k++) {
        let word = load<u64>(at) + 1;
        store<u64>(at, word);
        if (word != 0) break;
        at += 8;
      }
    }
    out += <usize>size << 3;
    count -= size;
  }
  store<u64>(state + usedAt, <u64>used);
}

/** The next `count` 64-bit words. */
export function fillPhilox4x64(state: usize, out: usize, count: i32): void {
  fill(PHILOX, state, out, count);
}

/** The next `count` 64-bit words. */
export function fillThreefry4x64(state: usize, out: usize, count: i32): void {
  fill(THREEFRY, state, out, count);
}

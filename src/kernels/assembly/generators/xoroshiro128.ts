// xoroshiro128+, ++ and **: D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM Transactions
// on Mathematical Software 47 (2021) 36. Layout of `state`: s0, s1 (64-bit words). The shifts are (24, 16, 37) for + and
// **, (49, 21, 28) for ++.

const PLUS = 0;
const PLUS_PLUS = 1;
const STAR_STAR = 2;

@inline
function fill(scrambler: i32, state: usize, out: usize, count: i32): void {
  let s0 = load<u64>(state), s1 = load<u64>(state, 8);
  for (let i = 0; i < count; i++) {
    let word = scrambler == PLUS ? s0 + s1
      : scrambler == PLUS_PLUS ? rotl<u64>(s0 + s1, 17) + s0
      : rotl<u64>(s0 * 5, 7) * 9;
    store<u64>(out, word);
    out += 8;
    s1 ^= s0;
    if (scrambler == PLUS_PLUS) {
      s0 = rotl<u64>(s0, 49) ^ s1 ^ (s1 << 21);
      s1 = rotl<u64>(s1, 28);
    } else {
      s0 = rotl<u64>(s0, 24) ^ s1 ^ (s1 << 16);
      s1 = rotl<u64>(s1, 37);
    }
  }
  store<u64>(state, s0);
  store<u64>(state, s1, 8);
}

/** The next `count` 64-bit words. */
export function fillXoroshiro128Plus(state: usize, out: usize, count: i32): void {
  fill(PLUS, state, out, count);
}

/** The next `count` 64-bit words. */
export function fillXoroshiro128PlusPlus(state: usize, out: usize, count: i32): void {
  fill(PLUS_PLUS, state, out, count);
}

/** The next `count` 64-bit words. */
export function fillXoroshiro128StarStar(state: usize, out: usize, count: i32): void {
  fill(STAR_STAR, state, out, count);
}

// xoshiro256+, ++ and **: D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM Transactions
// on Mathematical Software 47 (2021) 36. Layout of `state`: s0, s1, s2, s3 (64-bit words).

const PLUS = 0;
const PLUS_PLUS = 1;
const STAR_STAR = 2;

@inline
function fill(scrambler: i32, state: usize, out: usize, count: i32): void {
  let s0 = load<u64>(state), s1 = load<u64>(state, 8), s2 = load<u64>(state, 16), s3 = load<u64>(state, 24);
  for (let i = 0; i < count; i++) {
    let word = scrambler == PLUS ? s0 + s3
      : scrambler == PLUS_PLUS ? rotl<u64>(s0 + s3, 23) + s0
      : rotl<u64>(s1 * 5, 7) * 9;
    store<u64>(out, word);
    out += 8;
    let t = s1 << 17;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= t;
    s3 = rotl<u64>(s3, 45);
  }
  store<u64>(state, s0);
  store<u64>(state, s1, 8);
  store<u64>(state, s2, 16);
  store<u64>(state, s3, 24);
}

/** The next `count` 64-bit words. */
export function fillXoshiro256Plus(state: usize, out: usize, count: i32): void {
  fill(PLUS, state, out, count);
}

/** The next `count` 64-bit words. */
export function fillXoshiro256PlusPlus(state: usize, out: usize, count: i32): void {
  fill(PLUS_PLUS, state, out, count);
}

/** The next `count` 64-bit words. */
export function fillXoshiro256StarStar(state: usize, out: usize, count: i32): void {
  fill(STAR_STAR, state, out, count);
}

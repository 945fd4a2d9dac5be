// xoshiro256++ (D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM Transactions on
// Mathematical Software 47(4), 2021, 36): expands 256 bits of a stream's key into the many random words that a
// randomisation of a net or of Halton's sequence needs. One state; seed it before use.

let s0: u64 = 0;
let s1: u64 = 0;
let s2: u64 = 0;
let s3: u64 = 0;

/** Takes the four state words at `words`, which must not all be zero. */
export function seed(words: usize): void {
  s0 = load<u64>(words);
  s1 = load<u64>(words, 8);
  s2 = load<u64>(words, 16);
  s3 = load<u64>(words, 24);
}

export function next(): u64 {
  let result = rotl<u64>(s0 + s3, 23) + s0;
  let t = s1 << 17;
  s2 ^= s0;
  s3 ^= s1;
  s1 ^= s2;
  s0 ^= s3;
  s2 ^= t;
  s3 = rotl<u64>(s3, 45);
  return result;
}

// Two small generators of 64-bit words.

/**
 * splitmix64: G. L. Steele, D. Lea and C. H. Flood, "Fast splittable pseudorandom number generators", OOPSLA 2014,
 * 453-472, with the output mix of D. Stafford (variant 13). Layout of `state`: one word.
 */
export function fillSplitMix64(state: usize, out: usize, count: i32): void {
  let s = load<u64>(state);
  for (let i = 0; i < count; i++) {
    s += 0x9e3779b97f4a7c15;
    let z = (s ^ (s >> 30)) * 0xbf58476d1ce4e5b9;
    z = (z ^ (z >> 27)) * 0x94d049bb133111eb;
    store<u64>(out, z ^ (z >> 31));
    out += 8;
  }
  store<u64>(state, s);
}

/** SFC64 of C. Doty-Humphrey (2010). Layout of `state`: a, b, c, counter. */
export function fillSfc64(state: usize, out: usize, count: i32): void {
  let a = load<u64>(state), b = load<u64>(state, 8), c = load<u64>(state, 16), w = load<u64>(state, 24);
  for (let i = 0; i < count; i++) {
    let t = a + b + w;
    w++;
    a = b ^ (b >> 11);
    b = c + (c << 3);
    c = rotl<u64>(c, 24) + t;
    store<u64>(out, t);
    out += 8;
  }
  store<u64>(state, a);
  store<u64>(state, b, 8);
  store<u64>(state, c, 16);
  store<u64>(state, w, 24);
}

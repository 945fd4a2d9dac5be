// PCG32 (XSH-RR 64/32): M. E. O'Neill, HMC-CS-2014-0905 (2014), section 6.3. Layout of `state`: state, increment.

/** The next `count` 32-bit words: each is taken from the state before the step. */
export function fillPcg32(state: usize, out: usize, count: i32): void {
  let s = load<u64>(state), increment = load<u64>(state, 8);
  for (let i = 0; i < count; i++) {
    store<u32>(out, rotr<u32>(<u32>(((s >> 18) ^ s) >> 27), <u32>(s >> 59)));
    out += 4;
    s = s * 6364136223846793005 + increment;
  }
  store<u64>(state, s);
}

// Combined Tausworthe generators of P. L'Ecuyer: taus88, "Maximally equidistributed combined Tausworthe generators",
// Mathematics of Computation 65 (1996) 203-213, figure 1; LFSR113, "Tables of maximally equidistributed combined LFSR
// generators", ibid. 68 (1999) 261-269, figure 1. 32-bit words, each in a 64-bit word of the state.

@inline
function component(s: u32, keep: u32, up: u32, across: u32, down: u32): u32 {
  return ((s & keep) << up) ^ (((s << across) ^ s) >> down);
}

/** The next `count` 32-bit words. Layout of `state`: s1, s2, s3. */
export function fillTaus88(state: usize, out: usize, count: i32): void {
  let s1 = load<u32>(state), s2 = load<u32>(state, 8), s3 = load<u32>(state, 16);
  for (let i = 0; i < count; i++) {
    s1 = component(s1, 0xfffffffe, 12, 13, 19);
    s2 = component(s2, 0xfffffff8, 4, 2, 25);
    s3 = component(s3, 0xfffffff0, 17, 3, 11);
    store<u32>(out, s1 ^ s2 ^ s3);
    out += 4;
  }
  store<u64>(state, <u64>s1);
  store<u64>(state, <u64>s2, 8);
  store<u64>(state, <u64>s3, 16);
}

/** The next `count` 32-bit words. Layout of `state`: z1, z2, z3, z4. */
export function fillLfsr113(state: usize, out: usize, count: i32): void {
  let z1 = load<u32>(state), z2 = load<u32>(state, 8), z3 = load<u32>(state, 16), z4 = load<u32>(state, 24);
  for (let i = 0; i < count; i++) {
    z1 = component(z1, 0xfffffffe, 18, 6, 13);
    z2 = component(z2, 0xfffffff8, 2, 2, 27);
    z3 = component(z3, 0xfffffff0, 7, 13, 21);
    z4 = component(z4, 0xffffff80, 13, 3, 12);
    store<u32>(out, z1 ^ z2 ^ z3 ^ z4);
    out += 4;
  }
  store<u64>(state, <u64>z1);
  store<u64>(state, <u64>z2, 8);
  store<u64>(state, <u64>z3, 16);
  store<u64>(state, <u64>z4, 24);
}

// PCG64 (XSL-RR 128/64): M. E. O'Neill, "PCG: a family of simple fast space-efficient statistically good algorithms
// for random number generation", Harvey Mudd College, HMC-CS-2014-0905 (2014), section 6.3.
// Layout of `state` (64-bit words): state low, state high, increment low, increment high.
import { mulHigh } from "./wide";

// The multiplier 47026247687942121848144207491837523525 of the paper in two halves.
const HIGH: u64 = 2549297995355413924;
const LOW: u64 = 4865540595714422341;

/** The next `count` 64-bit words: each is taken from the state after the step. */
export function fillPcg64(state: usize, out: usize, count: i32): void {
  let lo = load<u64>(state), hi = load<u64>(state, 8), incLo = load<u64>(state, 16), incHi = load<u64>(state, 24);
  for (let i = 0; i < count; i++) {
    let productLo = lo * LOW;
    let productHi = mulHigh(lo, LOW) + hi * LOW + lo * HIGH;
    lo = productLo + incLo;
    hi = productHi + incHi + (lo < productLo ? 1 : 0);
    store<u64>(out, rotr<u64>(hi ^ lo, hi >> 58));
    out += 8;
  }
  store<u64>(state, lo);
  store<u64>(state, hi, 8);
}

// PCG64 DXSM: the double xorshift multiply output of the same author (2019), with a 64-bit multiplier.
const CHEAP: u64 = 0xda942042e4dd58b5;

/** The next `count` 64-bit words: each is taken from the state before the step. Layout as above. */
export function fillPcg64Dxsm(state: usize, out: usize, count: i32): void {
  let lo = load<u64>(state), hi = load<u64>(state, 8), incLo = load<u64>(state, 16), incHi = load<u64>(state, 24);
  for (let i = 0; i < count; i++) {
    let word = hi;
    word ^= word >> 32;
    word *= CHEAP;
    word ^= word >> 48;
    store<u64>(out, word * (lo | 1));
    out += 8;
    let productLo = lo * CHEAP;
    let productHi = mulHigh(lo, CHEAP) + hi * CHEAP;
    lo = productLo + incLo;
    hi = productHi + incHi + (lo < productLo ? 1 : 0);
  }
  store<u64>(state, lo);
  store<u64>(state, hi, 8);
}

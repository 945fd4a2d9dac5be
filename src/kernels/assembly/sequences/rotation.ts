// Points frac(i alpha_j + shift_j): rank-1 lattices (alpha = z / n) and Kronecker sequences (alpha irrational), after
// N. M. Korobov (1959) and L. Kronecker (1884); with the shift of R. Cranley and T. N. L. Patterson, "Randomization of
// number theoretic methods for multiple integration", SIAM Journal on Numerical Analysis 13 (1976) 904-914, and the
// baker's (tent) transform of F. J. Hickernell, "Obtaining O(N^(-2+e)) convergence for lattice quadrature rules", in Monte
// Carlo and Quasi-Monte Carlo Methods 2000, Springer (2002), 274-289.
//
// Alpha has 128 fraction bits. The first point of every aligned chunk of 16 is exact to 2^-76 for the first 2^52 points;
// the others add up to 15 times alpha rounded up to 64 bits, so a coordinate is at most 2^-60 too large before it is cut
// to 52 bits and set to the midpoint (k + 1/2) 2^-52. Rounding is upward, so that a lattice point never falls short of
// its exact place and i z = 0 (mod n) gives the cell of 0, not the last one.
//
// One record of 64 bytes per coordinate: words 0, 1 the sum at the present chunk (high, low); 2, 3 sixteen times alpha;
// 4 alpha rounded up to 64 bits; 5 the shift.
import { add, splat, sub } from "../vector";

const RECORD: usize = 64;
const ONE: u64 = 0x3ff0000000000000;
const BELOW_ONE: f64 = 1.0 - 1.1102230246251565e-16;
const CHUNK: i32 = 16;

const scratch = memory.data(128, 16);

/** Makes `index` the next point. */
export function rotationSeek(records: usize, dimension: i32, index: f64): void {
  let chunk = <u64>index >> 4;
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * RECORD;
    let high = load<u64>(record, 16), low = load<u64>(record, 24);
    // the upper half of chunk * low; chunk is below 2^48
    let carry = (chunk & 0xffffffff) * (low & 0xffffffff) >> 32;
    let middle = (chunk & 0xffffffff) * (low >> 32) + carry;
    let other = (chunk >> 32) * (low & 0xffffffff) + (middle & 0xffffffff);
    let upper = (chunk >> 32) * (low >> 32) + (middle >> 32) + (other >> 32);
    store<u64>(record, chunk * high + upper + load<u64>(record, 40));
    store<u64>(record, chunk * low, 8);
  }
}

/** Fills `count` points from point `index`, to which the sums must have been brought by `rotationSeek` or the last fill. */
export function rotationFill(
  records: usize, dimension: i32, index: f64, pointer: usize, stride: i32, count: i32, tent: bool,
): void {
  let lane = <i32>(<u64>index & 15);
  for (let j = 0; j < dimension; j++) {
    let row = pointer + (<usize>(j * stride) << 3);
    if (tent) fillRow<f64>(records + <usize>j * RECORD, lane, row, count);
    else fillRow<u64>(records + <usize>j * RECORD, lane, row, count);
  }
}

// One coordinate; T is f64 with the tent transform and u64 without.
@inline
function fillRow<T>(record: usize, lane: i32, o: usize, left: i32): void {
  let alpha = load<u64>(record, 32);
  let step = i64x2.splat(alpha << 1);
  let t0 = i64x2.replace_lane(i64x2.splat(0), 1, alpha);
  let t1 = i64x2.add(t0, step), t2 = i64x2.add(t1, step), t3 = i64x2.add(t2, step);
  let t4 = i64x2.add(t3, step), t5 = i64x2.add(t4, step), t6 = i64x2.add(t5, step), t7 = i64x2.add(t6, step);
  let high = load<u64>(record), low = load<u64>(record, 8);
  let stepHigh = load<u64>(record, 16), stepLow = load<u64>(record, 24);
  while (left > 0) {
    let whole = lane == 0 && left >= CHUNK;
    let at = whole ? o : scratch;
    let base = i64x2.splat(high);
    put<T>(at, i64x2.add(base, t0));
    put<T>(at + 16, i64x2.add(base, t1));
    put<T>(at + 32, i64x2.add(base, t2));
    put<T>(at + 48, i64x2.add(base, t3));
    put<T>(at + 64, i64x2.add(base, t4));
    put<T>(at + 80, i64x2.add(base, t5));
    put<T>(at + 96, i64x2.add(base, t6));
    put<T>(at + 112, i64x2.add(base, t7));
    let taken = CHUNK;
    if (!whole) {
      taken = min(CHUNK - lane, left);
      memory.copy(o, scratch + (<usize>lane << 3), <usize>taken << 3);
      if (lane + taken < CHUNK) break;
      lane = 0;
    }
    o += <usize>taken << 3;
    left -= taken;
    low += stepLow;
    high += stepHigh + u64(low < stepLow);
  }
  store<u64>(record, high);
  store<u64>(record, low, 8);
}

/** Stores two 64-bit fractions as coordinates; T is f64 with the tent transform and u64 without. */
@inline
export function put<T>(at: usize, x: v128): void {
  let u = sub(v128.or(i64x2.shr_u(x, 12), i64x2.splat(ONE)), splat(BELOW_ONE));
  // 1 - |2u - 1|, exact: u is an odd multiple of 2^-53
  if (isFloat<T>()) u = sub(splat(1.0), f64x2.abs(sub(add(u, u), splat(1.0))));
  v128.store(at, u);
}

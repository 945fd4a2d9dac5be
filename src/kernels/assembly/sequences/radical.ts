// Points of extensible lattices in radical-inverse order: frac(phi(i) z_j + shift_j), phi the radical inverse in base 2
// (F. J. Hickernell, H. S. Hong, P. L'Ecuyer and C. Lemieux, "Extensible lattice sequences for quasi-Monte Carlo
// quadrature", SIAM Journal on Scientific Computing 22, 2000, 1117-1138). Exact in 64-bit fractions: bit b of the index adds
// W_b = z 2^-(b+1). Shift and tent transform as in ./rotation.
//
// One record of 432 bytes per coordinate: word 0 the sum at the present chunk of 16 points, 1 the shift, 2...53 W_0...W_51.
import { put } from "./rotation";

const RECORD: usize = 432;
const BITS: usize = 16;
const CHUNK: i32 = 16;

const scratch = memory.data(128, 16);

/** Makes `index` the next point. */
export function radicalSeek(records: usize, dimension: i32, index: f64): void {
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * RECORD;
    let sum = load<u64>(record, 8);
    for (let rest = <u64>index & ~15; rest != 0; rest &= rest - 1) {
      sum += load<u64>(record + BITS + (<usize>ctz<u64>(rest) << 3));
    }
    store<u64>(record, sum);
  }
}

/** Fills `count` points from point `index`, to which the sums must have been brought by `radicalSeek` or the last fill. */
export function radicalFill(
  records: usize, dimension: i32, index: f64, pointer: usize, stride: i32, count: i32, tent: bool,
): void {
  for (let j = 0; j < dimension; j++) {
    let row = pointer + (<usize>(j * stride) << 3);
    if (tent) fillRow<f64>(records + <usize>j * RECORD, <u64>index, row, count);
    else fillRow<u64>(records + <usize>j * RECORD, <u64>index, row, count);
  }
}

@inline
function fillRow<T>(record: usize, index: u64, o: usize, left: i32): void {
  let w1 = i64x2.splat(load<u64>(record, BITS + 8));
  let w2 = i64x2.splat(load<u64>(record, BITS + 16));
  let w3 = i64x2.splat(load<u64>(record, BITS + 24));
  let t0 = i64x2.replace_lane(i64x2.splat(0), 1, load<u64>(record, BITS));
  let t1 = i64x2.add(t0, w1), t2 = i64x2.add(t0, w2), t3 = i64x2.add(t1, w2);
  let t4 = i64x2.add(t0, w3), t5 = i64x2.add(t1, w3), t6 = i64x2.add(t2, w3), t7 = i64x2.add(t3, w3);
  let sum = load<u64>(record);
  let chunk = index >> 4;
  let lane = <i32>(index & 15);
  while (left > 0) {
    let whole = lane == 0 && left >= CHUNK;
    let at = whole ? o : scratch;
    let base = i64x2.splat(sum);
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
    // counting on: the ones at the end of the chunk's number go, the next bit comes
    chunk++;
    let bit = record + BITS + 32;
    for (let gone = ctz<u64>(chunk); gone > 0; gone--, bit += 8) sum -= load<u64>(bit);
    sum += load<u64>(bit);
  }
  store<u64>(record, sum);
}

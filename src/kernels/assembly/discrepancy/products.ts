// Sums over pairs of points of products over coordinates, the costly part of L2 discrepancies: O(n^2 d / 2).
//
// A point i is set against 8 others at a time, coordinate by coordinate, in four vectors whose multiplications overlap; the
// others come in tiles, one a call, so that their rows stay in the cache while i runs (and V8 optimises the code after
// the first calls; within one it would not). What a coordinate contributes:
// - MINIMUM: min(w_i, w_k), with two sets of rows, of which coordinate by coordinate the one counts that is larger at i.
//   The centred factor 1 + |s_i|/2 + |s_k|/2 - |s_i - s_k|/2, s = x - 1/2, is 1 + min(|s_i|, |s_k|) for two points on the same
//   side of the centre and 1 otherwise: the rows max(1, 1 + s) and max(1, 1 - s) give it in two operations instead of
//   six. 1 - max(x_i, x_k) and 2 - max(x_i, x_k) are minima too.
// - WRAPAROUND: 3/2 - e (1 - e) = 5/4 + (e - 1/2)^2, e = |x_i - x_k|.
// - MIXTURE: w_i + w_k + (e - 3/4)^2 / 2; first rows x / sqrt(2), second rows w.
// Sums over one i are added up with Neumaier's compensation (Zeitschrift fuer Angewandte Mathematik und Mechanik 54, 1974).

const MINIMUM = 0;
const WRAPAROUND = 1;
const MIXTURE = 2;

const scratch = memory.data(64, 16);

/**
 * Sum over i < k with tile <= k < last, both multiples of 8 (or last = n). Coordinate j of point i stands at `first + (j * stride + i) * 8`, in the second set likewise; `stride`
 * is n rounded up to a multiple of 8, and rows are filled up with anything finite. `table`: 32 bytes a coordinate.
 */
export function minimumPairs(first: usize, second: usize, tile: i32, last: i32, stride: i32, dimension: i32, table: usize): f64 {
  return pairs(MINIMUM, first, second, tile, last, stride, dimension, table);
}

export function wraparoundPairs(first: usize, second: usize, tile: i32, last: i32, stride: i32, dimension: i32, table: usize): f64 {
  return pairs(WRAPAROUND, first, second, tile, last, stride, dimension, table);
}

export function mixturePairs(first: usize, second: usize, tile: i32, last: i32, stride: i32, dimension: i32, table: usize): f64 {
  return pairs(MIXTURE, first, second, tile, last, stride, dimension, table);
}

@inline
function pairs(kind: i32, first: usize, second: usize, tile: i32, last: i32, stride: i32, dimension: i32, table: usize): f64 {
  let row = <usize>stride << 3;
  let end = table + (<usize>dimension << 5);
  let total = 0.0;
  let lost = 0.0;
  for (let i = 0; i < last - 1; i++) {
    // a coordinate's entry: splat value (two for MIXTURE), then the address of its row
    let at = <usize>i << 3;
    for (let entry = table, x = first, w = second; entry < end; entry += 32, x += row, w += row) {
      let value = load<f64>(x + at);
      if (kind == MINIMUM) {
        let other = load<f64>(w + at);
        store<usize>(entry + 16, value >= other ? x : w);
        v128.store(entry, f64x2.splat(max(value, other)));
      } else {
        v128.store(entry, f64x2.splat(value));
        if (kind == MIXTURE) v128.store(entry + 16, f64x2.splat(load<f64>(w + at)));
      }
    }
    let sum = f64x2.splat(0);
    let edges = 0.0;
    for (let k = max(tile, (i + 1) & ~7); k < last; k += 8) {
      let a = f64x2.splat(1);
      let b = a;
      let c = a;
      let e = a;
      let here = <usize>k << 3;
      for (let entry = table, x = first + here, w = second + here; entry < end; entry += 32, x += row, w += row) {
        let value = v128.load(entry);
        if (kind == MINIMUM) {
          let p = load<usize>(entry + 16) + here;
          a = f64x2.mul(a, f64x2.pmin(value, v128.load(p)));
          b = f64x2.mul(b, f64x2.pmin(value, v128.load(p, 16)));
          c = f64x2.mul(c, f64x2.pmin(value, v128.load(p, 32)));
          e = f64x2.mul(e, f64x2.pmin(value, v128.load(p, 48)));
        } else if (kind == WRAPAROUND) {
          a = f64x2.mul(a, around(value, v128.load(x)));
          b = f64x2.mul(b, around(value, v128.load(x, 16)));
          c = f64x2.mul(c, around(value, v128.load(x, 32)));
          e = f64x2.mul(e, around(value, v128.load(x, 48)));
        } else {
          let weight = v128.load(entry, 16);
          a = f64x2.mul(a, mixed(value, v128.load(x), weight, v128.load(w)));
          b = f64x2.mul(b, mixed(value, v128.load(x, 16), weight, v128.load(w, 16)));
          c = f64x2.mul(c, mixed(value, v128.load(x, 32), weight, v128.load(w, 32)));
          e = f64x2.mul(e, mixed(value, v128.load(x, 48), weight, v128.load(w, 48)));
        }
      }
      if (k > i && k + 8 <= last) {
        sum = f64x2.add(sum, f64x2.add(f64x2.add(a, b), f64x2.add(c, e)));
      } else {
        v128.store(scratch, a);
        v128.store(scratch, b, 16);
        v128.store(scratch, c, 32);
        v128.store(scratch, e, 48);
        let stop = min(8, last - k);
        for (let lane = max(0, i + 1 - k); lane < stop; lane++) edges += load<f64>(scratch + (<usize>lane << 3));
      }
    }
    let term = edges + f64x2.extract_lane(sum, 0) + f64x2.extract_lane(sum, 1);
    let next = total + term;
    lost += abs(total) >= abs(term) ? total - next + term : term - next + total;
    total = next;
  }
  return total + lost;
}

@inline
function around(x: v128, y: v128): v128 {
  let e = f64x2.sub(f64x2.abs(f64x2.sub(x, y)), v128.load(halves));
  return f64x2.add(f64x2.mul(e, e), v128.load(halves, 16));
}

@inline
function mixed(x: v128, y: v128, v: v128, w: v128): v128 {
  let e = f64x2.sub(f64x2.abs(f64x2.sub(x, y)), v128.load(halves, 32));
  return f64x2.add(f64x2.mul(e, e), f64x2.add(v, w));
}

// 1/2, 5/4 and 3/4 / sqrt(2), each twice
const halves = memory.data<f64>([0.5, 0.5, 1.25, 1.25, 0.5303300858899107, 0.5303300858899107], 16);

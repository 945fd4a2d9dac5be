// Quantiles by pieces of polynomials, as block passes over raw coordinates, in place.
//
// The mass of the nearer tail, t = min(u, 1 - u), picks its piece by its own bits: each octave of t is cut into 2^k equal
// pieces, so that the pieces grow fine towards the tail where the quantile changes on a logarithmic scale. In a piece a
// polynomial of degree 11 in s = -1 ... 1 gives the logarithm (or log odds) of the variate. Even and odd powers are two
// lanes of one vector. The tables are made and checked on the host, src/numeric/quantile-table.ts.
// Good for: any law whose quantile is smooth on that scale, at one speed whatever its parameters. Bad at: t below the
// table's least, which is treated as that.
import { add, div, mul, splat, sub } from "../vector";
import { vec_exp } from "../math/exp";

// Places in the header, in doubles; the header has 24.
const FORM = 0; // 0: base + sign * exp(p), 1: 1 / (1 + exp(-p)), 2: (u - 1/2) exp(p)
const LOCATION = 1;
const SCALE = 2;
const BITS = 3; // k
const AT_ZERO = 4; // what u = 0 and u = 1 give
const AT_ONE = 5;
// For each side: base, sign, least t, index of the first piece, number of doubles before the first coefficient.
const LEFT = 6;
const RIGHT = 11;

/** The double before 1/2: the last piece ends there. */
const BELOW_HALF: f64 = 0.49999999999999994;

@inline
function header(table: usize, k: i32): f64 {
  return load<f64>(table + (<usize>k << 3));
}

/** The polynomial of one value. */
@inline
function piece(t: f64, table: usize, side: usize, bits: i64): f64 {
  t = max(t, load<f64>(side, 16));
  let word = reinterpret<i64>(t);
  let place = <i32>(word >> (52 - bits)) - <i32>load<f64>(side, 24);
  let s = 2 * reinterpret<f64>(((word << bits) & 0x000fffffffffffff) | 0x3ff0000000000000) - 3;
  let at = table + (<usize>load<f64>(side, 32) << 3) + <usize>place * 96;
  let square = f64x2.splat(s * s);
  let sum = v128.load(at);
  sum = add(mul(sum, square), v128.load(at, 16));
  sum = add(mul(sum, square), v128.load(at, 32));
  sum = add(mul(sum, square), v128.load(at, 48));
  sum = add(mul(sum, square), v128.load(at, 64));
  sum = add(mul(sum, square), v128.load(at, 80));
  return f64x2.extract_lane(sum, 0) + s * f64x2.extract_lane(sum, 1);
}

@inline
function sideOf(u: f64, table: usize): usize {
  return table + (u > 0.5 ? <usize>RIGHT << 3 : <usize>LEFT << 3);
}

@inline
function inside(u: f64): f64 {
  return u > 0 && u < 1 ? min(min(u, 1 - u), BELOW_HALF) : 0.25;
}

@inline
function edge(u: f64, x: f64, table: usize): f64 {
  if (u > 0 && u < 1) return x;
  return u == 0 ? header(table, AT_ZERO) : u == 1 ? header(table, AT_ONE) : NaN;
}

/**
 * Replaces the uniforms in `rows` rows of `count` values; value i of row r stands at pointer + (r * stride + i) * 8.
 * `table` (aligned to 16) holds the header and the coefficients. `stride` is even; of an odd row one more value is changed.
 */
export function piecesBlock(pointer: usize, stride: i32, rows: i32, count: i32, table: usize): void {
  let form = <i32>header(table, FORM);
  let bits = <i64>header(table, BITS);
  let location = splat(header(table, LOCATION));
  let scale = splat(header(table, SCALE));
  for (let r = 0; r < rows; r++) {
    let end = pointer + (<usize>count << 3);
    for (let at = pointer; at < end; at += 16) {
      let u0 = load<f64>(at);
      let u1 = load<f64>(at, 8);
      let side0 = sideOf(u0, table);
      let side1 = sideOf(u1, table);
      let p = f64x2(piece(inside(u0), table, side0, bits), piece(inside(u1), table, side1, bits));
      let x: v128;
      if (form == 1) x = div(splat(1), add(splat(1), vec_exp(f64x2.neg(p))));
      else if (form == 2) x = mul(sub(f64x2(u0, u1), splat(0.5)), vec_exp(p));
      else {
        p = vec_exp(p);
        let base = f64x2(load<f64>(side0), load<f64>(side1));
        x = add(base, mul(f64x2(load<f64>(side0, 8), load<f64>(side1, 8)), p));
      }
      x = add(location, mul(scale, x));
      v128.store(at, x);
      if (!(u0 > 0 && u0 < 1 && u1 > 0 && u1 < 1)) {
        store<f64>(at, edge(u0, f64x2.extract_lane(x, 0), table));
        store<f64>(at, edge(u1, f64x2.extract_lane(x, 1), table), 8);
      }
    }
    pointer += <usize>stride << 3;
  }
}

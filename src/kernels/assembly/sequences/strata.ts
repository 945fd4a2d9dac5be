// Points of stratified samples: u = (cell + v) / cells, where v is a uniform number that already stands in its place and
// the cell comes from a permutation of 0...n - 1 (Latin hypercube) or from bits of the point's index (boxes).
//
// v is cut to 32 bits and set to the midpoint, so that with up to 2^20 cells the sum is exact, no point leaves its cell and
// the largest is 1 - 2^-53.
import { add, div, mul, splat } from "../vector";
import { next, seed } from "./xoshiro";

/** Draws `dimension` permutations of 0...n - 1 (32 bits each, one after the other) from seeds of 32 bytes (Durstenfeld 1964). */
export function latinPrepare(permutations: usize, n: u32, dimension: i32, seeds: usize): void {
  for (let j = 0; j < dimension; j++) {
    seed(seeds + (<usize>j << 5));
    let at = permutations + <usize>j * (<usize>n << 2);
    for (let i: u32 = 0; i < n; i++) {
      // 40 random bits scaled to 0...i: the bias of one choice is below n 2^-40
      let other = <u32>(((next() >> 24) * (i + 1)) >> 40);
      store<u32>(at + (i << 2), load<u32>(at + (other << 2)));
      store<u32>(at + (other << 2), i);
    }
  }
}

/** Latin hypercube: turns the uniform numbers of points `index`, ... into points. */
export function latinPass(
  permutations: usize, n: u32, dimension: i32, index: u32, pointer: usize, stride: i32, count: i32,
): void {
  let cells = splat(<f64>n);
  for (let j = 0; j < dimension; j++) {
    let at = permutations + ((<usize>j * n + index) << 2);
    let row = pointer + (<usize>(j * stride) << 3);
    for (let i = 0; i < count; i += 2, at += 8, row += 16) {
      let cell = f64x2.convert_low_i32x4_u(v128.load64_zero(at));
      v128.store(row, div(add(cell, cut(v128.load(row))), cells));
    }
  }
}

/** Boxes: coordinate j of point i is in cell (i >> first bit) mod 2^bits; `layout` holds first bit and bits (32 bits each) for every coordinate. */
export function boxesPass(layout: usize, dimension: i32, index: u32, pointer: usize, stride: i32, count: i32): void {
  for (let j = 0; j < dimension; j++) {
    let first = load<u32>(layout + (<usize>j << 3)), bits = load<u32>(layout + (<usize>j << 3), 4);
    let mask = i32x4.splat((1 << bits) - 1);
    let scale = splat(1.0 / <f64>(1 << bits));
    let row = pointer + (<usize>(j * stride) << 3);
    let i = i32x4.replace_lane(i32x4.splat(index), 1, index + 1);
    for (let k = 0; k < count; k += 2, row += 16) {
      let cell = f64x2.convert_low_i32x4_u(v128.and(i32x4.shr_u(i, first), mask));
      v128.store(row, mul(add(cell, cut(v128.load(row))), scale));
      i = i32x4.add(i, i32x4.splat(2));
    }
  }
}

/** (floor(2^32 v) + 1/2) / 2^32 */
@inline
function cut(v: v128): v128 {
  return mul(add(f64x2.floor(mul(v, splat(4294967296.0))), splat(0.5)), splat(1.0 / 4294967296.0));
}

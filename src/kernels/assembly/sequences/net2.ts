// Points of digital nets and sequences in base 2, coordinate by coordinate.
//
// Coordinate j of point i is x_i = x_0 xor the words S_l for which bit l of the Gray code i ^ (i >> 1) is set, because
// going from point i - 1 to point i adds exactly the step word S_l with l = ctz(i). For points in Gray-code order
// (I. A. Antonov and V. M. Saleev, "An economic method of computing LP-tau sequences", USSR Computational Mathematics
// and Mathematical Physics 19(1), 1979, 252-256) the step words are the columns of the generating matrix; for points in
// natural order they are the xor of the columns up to l. A shift of the net stands in x_0.
//
// Within an aligned chunk of 16 points the coordinate is base ^ pattern, and the pattern depends on S_0...S_3 alone.
// The exponent bits of 1.0 stand in x_0, so one xor and one subtraction give two doubles: with 52 fraction bits k,
// (1 + k 2^-52) - (1 - 2^-53) = (k + 1/2) 2^-52, exactly.
//
// One record per coordinate, RECORD bytes: word 0 the base of the present chunk, word 1 x_0, words 2...53 the step
// words S_0...S_51 (52 bits each), two spare zero words. 448 bytes rather than 512, so that the records of many
// coordinates do not fall into the same cache sets.
import { sub } from "../vector";
import { owenRow } from "./owen";

const RECORD: usize = 448;
const STEPS: usize = 16;
const ORIGIN: usize = 8;
const ONE: u64 = 0x3ff0000000000000;
const BELOW_ONE: f64 = 1.0 - 1.1102230246251565e-16;
const CHUNK: i32 = 16;

const pattern = memory.data(128, 16);

/** Turns the columns of generating matrices, already standing as step words (Gray-code order), into those of natural order. */
export function net2Natural(records: usize, dimension: i32): void {
  for (let j = 0; j < dimension; j++) {
    let steps = records + <usize>j * RECORD + STEPS;
    let sum: u64 = 0;
    for (let l: usize = 0; l < 52; l++) {
      sum ^= load<u64>(steps + (l << 3));
      store<u64>(steps + (l << 3), sum);
    }
  }
}

/** Makes `index` the next point: sets every base to the word of the first point of the chunk that holds `index`. */
export function net2Seek(records: usize, dimension: i32, index: f64): void {
  let first = <u64>index & ~15;
  let gray = first ^ (first >> 1);
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * RECORD;
    let x = load<u64>(record, ORIGIN) | ONE;
    for (let g = gray; g != 0; g &= g - 1) x ^= load<u64>(record + STEPS + (<usize>ctz<u64>(g) << 3));
    store<u64>(record, x);
  }
}

/** Fills `count` points from point `index`, to which the bases must have been brought by `net2Seek` or the last fill. */
export function net2Fill(records: usize, dimension: i32, index: f64, pointer: usize, stride: i32, count: i32): void {
  for (let j = 0; j < dimension; j++) {
    let row = pointer + (<usize>(j * stride) << 3);
    rawRow<f64>(records + <usize>j * RECORD, <u64>index, row, count);
  }
}

/** As `net2Fill`, then scrambled: `keys` holds 18 words of 32 bits for every coordinate. */
export function net2FillOwen(
  records: usize, dimension: i32, keys: usize, index: f64, pointer: usize, stride: i32, count: i32,
): void {
  for (let j = 0; j < dimension; j++) {
    let row = pointer + (<usize>(j * stride) << 3);
    rawRow<u64>(records + <usize>j * RECORD, <u64>index, row, count);
    owenRow(row, count, keys + <usize>j * 72);
  }
}

// One coordinate: doubles if T is f64, else the raw words, exponent bits set.

@inline
function rawRow<T>(record: usize, index: u64, o: usize, count: i32): void {
  let s0 = load<u64>(record, STEPS);
  let d1 = s0 ^ load<u64>(record, STEPS + 8);
  let d2 = s0 ^ load<u64>(record, STEPS + 16);
  let s3 = load<u64>(record, STEPS + 24);
  let d3 = s0 ^ s3;
  let t0 = i64x2.replace_lane(i64x2.splat(0), 1, s0);
  let t1 = v128.xor(t0, i64x2.splat(d1));
  let t3 = v128.xor(t0, i64x2.splat(d2));
  let t2 = v128.xor(t3, i64x2.splat(d1));
  let e3 = i64x2.splat(d3);
  let t4 = v128.xor(t3, e3), t5 = v128.xor(t2, e3), t6 = v128.xor(t1, e3), t7 = v128.xor(t0, e3);
  let below = f64x2.splat(BELOW_ONE);
  let base = load<u64>(record);
  let chunk = index >> 4;
  let lane = <i32>(index & 15);
  let left = count;
  while (left > 0) {
    if (lane == 0 && left >= CHUNK) {
      let b = i64x2.splat(base);
      put<T>(o, v128.xor(b, t0), below);
      put<T>(o + 16, v128.xor(b, t1), below);
      put<T>(o + 32, v128.xor(b, t2), below);
      put<T>(o + 48, v128.xor(b, t3), below);
      put<T>(o + 64, v128.xor(b, t4), below);
      put<T>(o + 80, v128.xor(b, t5), below);
      put<T>(o + 96, v128.xor(b, t6), below);
      put<T>(o + 112, v128.xor(b, t7), below);
      o += 128;
      left -= CHUNK;
    } else {
      v128.store(pattern, t0);
      v128.store(pattern, t1, 16);
      v128.store(pattern, t2, 32);
      v128.store(pattern, t3, 48);
      v128.store(pattern, t4, 64);
      v128.store(pattern, t5, 80);
      v128.store(pattern, t6, 96);
      v128.store(pattern, t7, 112);
      let stop = min(CHUNK, lane + left);
      left -= stop - lane;
      for (; lane < stop; lane++) {
        let x = base ^ load<u64>(pattern + (<usize>lane << 3));
        if (isFloat<T>()) store<f64>(o, reinterpret<f64>(x) - BELOW_ONE);
        else store<u64>(o, x);
        o += 8;
      }
      if (stop < CHUNK) break;
      lane = 0;
    }
    chunk++;
    base ^= load<u64>(record + STEPS + (<usize>(ctz<u64>(chunk) + 4) << 3)) ^ s3;
  }
  store<u64>(record, base);
}

@inline
function put<T>(o: usize, x: v128, below: v128): void {
  if (isFloat<T>()) v128.store(o, sub(x, below));
  else v128.store(o, x);
}

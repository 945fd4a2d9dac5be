// Halton's sequence: J. H. Halton, "On the efficiency of certain quasi-random sequences of points in evaluating
// multi-dimensional integrals", Numerische Mathematik 2 (1960) 84-90; with random digit permutations as in A. B. Owen, "A
// randomized Halton algorithm in R", arXiv:1706.02808 (2017): one independent permutation for every base and place.
//
// In base p a point has K digits, K the largest with p^K <= 2^52, and is (N + 1/2) / p^K with N the digits of the index
// in reverse order, each permuted. The lowest `a` digits of the index together (0...b - 1, b = p^a) are looked up in a
// table of doubles; the others change only every b points, so their part is worked out once per run. All sums are whole
// numbers (or halves) below 2^53 and exact; the division rounds once.
//
// One record of 768 bytes per coordinate: f64 p^K; u32 p, b; u32 table, permutations (0: identity); u32 a, K - a; from
// byte 32 the weights p^(K-1-k) of the places k = a, a + 1, ...; from byte 400 the tails: what the places from k on
// contribute when their digits are all 0. Permutations: K arrays of p numbers of 16 bits.
import { add, div, splat } from "../vector";
import { next, seed } from "./xoshiro";

const RECORD: usize = 768;
const WEIGHTS: usize = 32;
const TAILS: usize = 400;

/**
 * Builds the tables of `dimension` records whose head (32 bytes) the host has written. Permutations are drawn from
 * `seeds`, 32 bytes for every coordinate, unless that is 0.
 */
export function haltonPrepare(records: usize, dimension: i32, seeds: usize): void {
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * RECORD;
    let p = load<u32>(record, 8), b = load<u32>(record, 12), table = load<u32>(record, 16);
    let a = load<u32>(record, 24), rest = load<u32>(record, 28);
    if (seeds != 0) {
      seed(seeds + (<usize>j << 5));
      for (let k: u32 = 0; k < a + rest; k++) shuffle(load<u32>(record, 20) + k * p * 2, p);
    }
    let weight = load<f64>(record);
    store<f64>(table, 0);
    // the table for the first k places, place by place: entries d p^k + r for digits d, downwards so that 0 comes last
    let size: u32 = 1;
    for (let k: u32 = 0; k < a; k++) {
      weight /= <f64>p;
      for (let d = <i32>p - 1; d >= 0; d--) {
        let part = weight * <f64>digit(record, k, d);
        for (let r: u32 = 0; r < size; r++) store<f64>(table + ((<u32>d * size + r) << 3), load<f64>(table + (r << 3)) + part);
      }
      size *= p;
    }
    for (let k: u32 = 0; k < rest; k++) {
      weight /= <f64>p;
      store<f64>(record + WEIGHTS + (k << 3), weight);
    }
    let tail = 0.0;
    store<f64>(record + TAILS + (rest << 3), 0);
    for (let k = <i32>rest - 1; k >= 0; k--) {
      tail += load<f64>(record + WEIGHTS + (<u32>k << 3)) * <f64>digit(record, a + k, 0);
      store<f64>(record + TAILS + (<u32>k << 3), tail);
    }
  }
}

/** Digit d at place k, permuted. */
@inline
function digit(record: usize, k: u32, d: u32): u32 {
  let permutations = load<u32>(record, 20);
  if (permutations == 0) return d;
  return load<u16>(permutations + ((k * load<u32>(record, 8) + d) << 1));
}

/** A uniformly random permutation of 0...p - 1 (R. Durstenfeld, Communications of the ACM 7, 1964, 420). */
function shuffle(at: usize, p: u32): void {
  for (let i: u32 = 0; i < p; i++) {
    // 48 random bits scaled to 0...i: the bias of one choice is below p 2^-48
    let other = <u32>(((next() >> 16) * (i + 1)) >> 48);
    store<u16>(at + (i << 1), load<u16>(at + (other << 1)));
    store<u16>(at + (other << 1), <u16>i);
  }
}

/** Fills `count` points from point `index`. */
export function haltonFill(records: usize, dimension: i32, index: f64, pointer: usize, stride: i32, count: i32): void {
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * RECORD;
    let o = pointer + (<usize>(j * stride) << 3);
    let b = load<u32>(record, 12), table = load<u32>(record, 16);
    let scale = load<f64>(record);
    let scales = splat(scale);
    let run = <u64>index / b;
    let from = <u32>(<u64>index - run * b);
    let left = <u32>count;
    while (left > 0) {
      let upper = upperPart(record, run);
      let size = min(left, b - from);
      let at = table + (from << 3);
      let uppers = splat(upper);
      let end = at + ((size & ~1) << 3);
      for (; at < end; at += 16, o += 16) v128.store(o, div(add(v128.load(at), uppers), scales));
      if (size & 1) {
        store<f64>(o, (load<f64>(at) + upper) / scale);
        o += 8;
      }
      left -= size;
      from = 0;
      run++;
    }
  }
}

/** Fills `count` points from point `index` of the sequence that takes every `leap`-th point. */
export function haltonFillLeaped(
  records: usize, dimension: i32, index: f64, leap: u32, pointer: usize, stride: i32, count: i32,
): void {
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * RECORD;
    let o = pointer + (<usize>(j * stride) << 3);
    let b = load<u32>(record, 12), table = load<u32>(record, 16);
    let scale = load<f64>(record);
    let at = <u64>index * leap;
    for (let i = 0; i < count; i++, at += leap, o += 8) {
      let run = at / b;
      store<f64>(o, (load<f64>(table + (<u32>(at - run * b) << 3)) + upperPart(record, run)) / scale);
    }
  }
}

/** What the digits of the index from place a on contribute, and the half. */
@inline
function upperPart(record: usize, run: u64): f64 {
  let p = load<u32>(record, 8), a = load<u32>(record, 24), rest = load<u32>(record, 28);
  let sum = 0.5;
  let k: u32 = 0;
  for (; run != 0 && k < rest; k++) {
    let q = run / p;
    sum += load<f64>(record + WEIGHTS + (k << 3)) * <f64>digit(record, a + k, <u32>(run - q * p));
    run = q;
  }
  return sum + load<f64>(record + TAILS + (k << 3));
}

// Block pass from uniforms to standard normals, in place.
//
// The values are the bits of vec_normalQuantile. The central rational function is evaluated for every value and the
// 15 % that belong to a tail are noted and packed in the same sweep; a second sweep does the tails two by two. The
// packing has no branch: a value is always written to the list and the list's end moves only if it is a tail value.
import { centralQuantile, fromMiddle, inTail, tailQuantile } from "./normal-quantile";

/** Values taken at once: small enough that the piece, the list and the tables stay in the first-level cache. */
const PIECE: i32 = 512;
/** The packed tail values, then the byte offsets they came from; one spare entry each for the unconditional write. */
const OFFSETS: usize = (<usize>PIECE + 2) << 3;

/** Bytes of scratch memory that normalBlock needs, whatever the block. */
export function normalBlockScratch(): i32 {
  return <i32>OFFSETS + ((PIECE + 2) << 2);
}

/**
 * Replaces the uniforms in `rows` rows of `count` values by standard normals; value i of row r stands at
 * pointer + (r * stride + i) * 8 (pointer and scratch aligned to 8). Values beyond `count` are not touched.
 */
export function normalBlock(pointer: usize, stride: i32, rows: i32, count: i32, scratch: usize): void {
  if (count == stride) {
    normalRun(pointer, rows * count, scratch);
    return;
  }
  for (let r = 0; r < rows; r++) {
    normalRun(pointer, count, scratch);
    pointer += <usize>stride << 3;
  }
}

function normalRun(at: usize, count: i32, scratch: usize): void {
  for (; count > 0; count -= PIECE) {
    normalPiece(at, <usize>min(count, PIECE) << 3, scratch);
    at += <usize>PIECE << 3;
  }
}

function normalPiece(at: usize, bytes: usize, scratch: usize): void {
  let tails = scratch;
  let offsets = scratch + OFFSETS;
  let even = bytes & ~15;
  for (let o: usize = 0; o < even; o += 16) {
    let p = v128.load(at + o);
    let q = fromMiddle(p);
    v128.store(at + o, centralQuantile(q));
    let mask = <usize>i64x2.bitmask(inTail(q));
    v128.store64_lane(tails, p, 0);
    store<u32>(offsets, <u32>o);
    tails += (mask & 1) << 3;
    offsets += (mask & 1) << 2;
    v128.store64_lane(tails, p, 1);
    store<u32>(offsets, <u32>o + 8);
    tails += (mask & 2) << 2;
    offsets += (mask & 2) << 1;
  }
  if (even != bytes) {
    let p = v128.load_splat<f64>(at + even);
    let q = fromMiddle(p);
    v128.store64_lane(at + even, centralQuantile(q), 0);
    let mask = <usize>i64x2.bitmask(inTail(q));
    v128.store64_lane(tails, p, 0);
    store<u32>(offsets, <u32>even);
    tails += (mask & 1) << 3;
    offsets += (mask & 1) << 2;
  }
  // An odd list ends with its last value twice.
  if (tails > scratch) {
    store<f64>(tails, load<f64>(tails - 8));
    store<u32>(offsets, load<u32>(offsets - 4));
  }
  offsets = scratch + OFFSETS;
  for (let t = scratch; t < tails; t += 16) {
    let p = v128.load(t);
    let y = tailQuantile(p, fromMiddle(p));
    v128.store64_lane(at + load<u32>(offsets), y, 0);
    v128.store64_lane(at + load<u32>(offsets, 4), y, 1);
    offsets += 8;
  }
}

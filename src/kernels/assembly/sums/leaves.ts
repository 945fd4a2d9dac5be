// Leaf sums of the summation tree: 64 values a leaf, whatever the block size.
//
// A leaf is added in one fixed order (eight interleaved partial sums, then a fixed tree over them), so its bits
// depend on its 64 values alone; a cut leaf behaves as if padded with zeros. The squared deviations are taken about
// the leaf's own mean (two passes over 512 bytes), which is what the pairwise merge of T. F. Chan, G. H. Golub and
// R. J. LeVeque, "Algorithms for computing the sample variance", The American Statistician 37 (1983) 242-247, needs.
import { add, mul, splat, sub } from "../vector";

const LEAF: i32 = 64;

/** Sum of `count` (1...64) values at `at`; values beyond `count` count as zero. */
function leafSum(at: usize, count: i32): f64 {
  if (count == LEAF) {
    let s0 = v128.load(at), s1 = v128.load(at, 16), s2 = v128.load(at, 32), s3 = v128.load(at, 48);
    for (let k = 1; k < 8; k++) {
      at += 64;
      s0 = add(s0, v128.load(at));
      s1 = add(s1, v128.load(at, 16));
      s2 = add(s2, v128.load(at, 32));
      s3 = add(s3, v128.load(at, 48));
    }
    return lanes(s0, s1, s2, s3);
  }
  let p0 = 0.0, p1 = 0.0, p2 = 0.0, p3 = 0.0, p4 = 0.0, p5 = 0.0, p6 = 0.0, p7 = 0.0;
  for (let k = 0; k < LEAF; k += 8) {
    p0 += cut(at, k, count);
    p1 += cut(at, k + 1, count);
    p2 += cut(at, k + 2, count);
    p3 += cut(at, k + 3, count);
    p4 += cut(at, k + 4, count);
    p5 += cut(at, k + 5, count);
    p6 += cut(at, k + 6, count);
    p7 += cut(at, k + 7, count);
  }
  return ((p0 + p4) + (p2 + p6)) + ((p1 + p5) + (p3 + p7));
}

@inline
function cut(at: usize, k: i32, count: i32): f64 {
  return k < count ? load<f64>(at + (<usize>k << 3)) : 0.0;
}

@inline
function lanes(s0: v128, s1: v128, s2: v128, s3: v128): f64 {
  let t = add(add(s0, s2), add(s1, s3));
  return f64x2.extract_lane(t, 0) + f64x2.extract_lane(t, 1);
}

/** Sum over the leaf of (a - meanA)(b - meanB) for `count` values. */
function leafProducts(a: usize, b: usize, count: i32, meanA: f64, meanB: f64): f64 {
  if (count == LEAF) {
    let ma = splat(meanA), mb = splat(meanB);
    let s0 = splat(0), s1 = splat(0), s2 = splat(0), s3 = splat(0);
    for (let k = 0; k < 8; k++) {
      s0 = add(s0, mul(sub(v128.load(a), ma), sub(v128.load(b), mb)));
      s1 = add(s1, mul(sub(v128.load(a, 16), ma), sub(v128.load(b, 16), mb)));
      s2 = add(s2, mul(sub(v128.load(a, 32), ma), sub(v128.load(b, 32), mb)));
      s3 = add(s3, mul(sub(v128.load(a, 48), ma), sub(v128.load(b, 48), mb)));
      a += 64;
      b += 64;
    }
    return lanes(s0, s1, s2, s3);
  }
  let sum = 0.0;
  for (let k = 0; k < count; k++) {
    let o = <usize>k << 3;
    sum += (load<f64>(a + o) - meanA) * (load<f64>(b + o) - meanB);
  }
  return sum;
}

/**
 * Moments of every leaf in a block of results. Channel c of point i stands at values + (c * stride + i) * 8.
 * For each leaf one row of channels + channels * (channels + 1) / 2 numbers is written to `out`: the sums of the
 * channels, then the centred products of the pairs (0,0), (0,1), ..., (1,1), ... Only the last leaf may be cut.
 * Returns the index of the first point with a non-finite value in any channel, or -1.
 */
export function leafMoments(values: usize, stride: i32, channels: i32, count: i32, out: usize): i32 {
  let first = -1;
  for (let begin = 0; begin < count; begin += LEAF) {
    let size = min(LEAF, count - begin);
    let at = values + (<usize>begin << 3);
    let sums = out;
    for (let c = 0; c < channels; c++) {
      let s = leafSum(at + (<usize>(c * stride) << 3), size);
      store<f64>(out, s);
      out += 8;
      if (first < 0 && s - s != 0) first = firstNonFinite(at + (<usize>(c * stride) << 3), size, begin);
    }
    for (let c = 0; c < channels; c++) {
      let meanC = load<f64>(sums + (<usize>c << 3)) / <f64>size;
      for (let e = c; e < channels; e++) {
        let meanE = load<f64>(sums + (<usize>e << 3)) / <f64>size;
        let a = at + (<usize>(c * stride) << 3), b = at + (<usize>(e * stride) << 3);
        store<f64>(out, leafProducts(a, b, size, meanC, meanE));
        out += 8;
      }
    }
  }
  return first;
}

function firstNonFinite(at: usize, count: i32, begin: i32): i32 {
  for (let k = 0; k < count; k++) {
    let v = load<f64>(at + (<usize>k << 3));
    if (v - v != 0) return begin + k;
  }
  return -1;
}

/** How many of `count` points have a non-finite value in any of the channels. */
export function countNonFinite(values: usize, stride: i32, channels: i32, count: i32): i32 {
  let total = 0;
  for (let i = 0; i < count; i++) {
    for (let c = 0; c < channels; c++) {
      let v = load<f64>(values + (<usize>(c * stride + i) << 3));
      if (v - v != 0) {
        total++;
        break;
      }
    }
  }
  return total;
}

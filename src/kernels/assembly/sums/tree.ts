// The summation tree over leaves of 64 points, kept as the maximal nodes of what was pushed: a binary counter.
//
// Node (level, index) covers leaves index * 2^level up to, not including, (index + 1) * 2^level. Two sets are merged by
// the pairwise update of T. F. Chan, G. H. Golub and R. J. LeVeque, "Algorithms for computing the sample variance", The
// American Statistician 37 (1983) 242-247, eq. (1.5), extended to products of channels.
//
// Memory: a count (i32) at `tree`; behind 16 bytes the nodes, each level (i32), index (f64) at +8, and a row of moments
// as leafMoments writes it at +16. At most one node per level, 53 levels.

const HEAD: usize = 16;
const LEVELS: i32 = 53;

@inline
function width(channels: i32): i32 {
  return channels + ((channels * (channels + 1)) >> 1);
}

@inline
function nodeBytes(channels: i32): usize {
  return HEAD + (<usize>width(channels) << 3);
}

@inline
function pointsOf(node: usize): f64 {
  // 64 * 2^level, exactly: level goes to the exponent.
  return reinterpret<f64>((<u64>(1023 + 6 + load<i32>(node))) << 52);
}

/** Bytes of a tree for rows of `channels` channels. */
export function treeBytes(channels: i32): i32 {
  return <i32>(HEAD + <usize>LEVELS * nodeBytes(channels));
}

export function treeReset(tree: usize): void {
  store<i32>(tree, 0);
}

/** Row of the union of rows `a` (na points, left) and `b` (nb points, right), written over `out`, which may be either. */
function merge(a: usize, na: f64, b: usize, nb: f64, out: usize, channels: i32): void {
  let weight = (na * nb) / (na + nb);
  let at = <usize>channels << 3;
  for (let c = 0; c < channels; c++) {
    let oc = <usize>c << 3;
    let deltaC = load<f64>(b + oc) / nb - load<f64>(a + oc) / na;
    for (let e = c; e < channels; e++) {
      let oe = <usize>e << 3;
      let deltaE = load<f64>(b + oe) / nb - load<f64>(a + oe) / na;
      store<f64>(out + at, load<f64>(a + at) + load<f64>(b + at) + deltaC * deltaE * weight);
      at += 8;
    }
  }
  for (let c = 0; c < channels; c++) {
    let oc = <usize>c << 3;
    store<f64>(out + oc, load<f64>(a + oc) + load<f64>(b + oc));
  }
}

/** Adds the next node to the right, its row at `row`; siblings are merged as soon as both are there. */
export function treePush(tree: usize, channels: i32, level: i32, index: f64, row: usize): void {
  let size = nodeBytes(channels);
  let count = load<i32>(tree);
  let node = tree + HEAD + <usize>count * size;
  store<i32>(node, level);
  store<f64>(node, index, 8);
  memory.copy(node + HEAD, row, size - HEAD);
  while (count > 0) {
    let left = node - size;
    let half = load<f64>(left, 8) * 0.5;
    if (load<i32>(left) != load<i32>(node) || half != floor(half)) break;
    let points = pointsOf(left);
    merge(left + HEAD, points, node + HEAD, points, left + HEAD, channels);
    store<i32>(left, load<i32>(left) + 1);
    store<f64>(left, half, 8);
    node = left;
    count--;
  }
  store<i32>(tree, count + 1);
}

/** Adds `leaves` leaves from leaf `first` on; their rows follow each other at `rows`. */
export function treePushLeaves(tree: usize, channels: i32, first: f64, rows: usize, leaves: i32): void {
  let size = <usize>width(channels) << 3;
  for (let k = 0; k < leaves; k++) {
    treePush(tree, channels, 0, first + <f64>k, rows);
    rows += size;
  }
}

/**
 * Row of everything pushed, and of a cut leaf of `cutPoints` points at `cut` behind it where cutPoints > 0, written to
 * `out` (which may be `cut`): the fold of the maximal nodes from the right. Returns the number of points.
 */
export function treeTotal(tree: usize, channels: i32, cut: usize, cutPoints: i32, out: usize): f64 {
  let size = nodeBytes(channels);
  let n = <f64>cutPoints;
  if (cutPoints > 0 && cut != out) memory.copy(out, cut, size - HEAD);
  for (let i = load<i32>(tree) - 1; i >= 0; i--) {
    let node = tree + HEAD + <usize>i * size;
    let points = pointsOf(node);
    if (n == 0) memory.copy(out, node + HEAD, size - HEAD);
    else merge(node + HEAD, points, out, n, out, channels);
    n += points;
  }
  return n;
}

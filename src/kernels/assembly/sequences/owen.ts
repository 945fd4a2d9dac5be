// Nested uniform scrambling in base 2: A. B. Owen, "Randomly permuted (t,m,s)-nets and (t,s)-sequences", in Monte Carlo
// and Quasi-Monte Carlo Methods in Scientific Computing, Springer (1995), 299-317. Every node of the binary tree of
// digits carries its own random bit; the digit below a node is flipped if that bit is set.
//
// The bits are drawn by a keyed hash of (key, coordinate, level, prefix), so any point can be made by itself. One hash
// word serves four levels: the word of a prefix of 4g digits holds the 15 bits of the nodes of the next four levels.
// After 32 levels one word keyed by the whole prefix flips the remaining 20 digits (a digital shift of its own for each
// interval of length 2^-32).
//
// The hash is lowbias32 (C. Wellons, "Prospecting for hash functions", 2018; multipliers 7feb352d and 846ca68b from
// memory, avalanche measured in the tests) behind one keyed round with the golden ratio multiplier 9e3779b9 (D. E. Knuth,
// vol. 3, section 6.4): one key word is added before that round, the other xored after it, so that every bit of the prefix
// and of both key words passes through all of lowbias32.
//
// The 15 node bits in a word, as coefficients: with digits d0, d1, d2, d3 of the group, the flip of the digit at depth q
// is a uniformly random Boolean function of the q digits before it. Bit 3 of nibble 0 is the function of depth 0; bit 2
// of nibbles 0...1 that of depth 1, bit 1 of nibbles 0...3 of depth 2, bit 0 of nibbles 0...7 of depth 3, each in
// algebraic normal form: folding w ^= (w >> 4 (2^q)) & (mask of digit q) for q = 0, 1, 2 evaluates all four at once and
// leaves the flips in nibble 0. A random normal form is a random function, so the node bits are independent.
import { sub } from "../vector";

const BELOW_ONE: f64 = 1.0 - 1.1102230246251565e-16;

// Splat constants; loads are cheaper than v128.const in V8.
const M0 = memory.data<u32>([0x9e3779b9, 0x9e3779b9, 0x9e3779b9, 0x9e3779b9], 16);
const M1 = memory.data<u32>([0x7feb352d, 0x7feb352d, 0x7feb352d, 0x7feb352d], 16);
const M2 = memory.data<u32>([0x846ca68b, 0x846ca68b, 0x846ca68b, 0x846ca68b], 16);
const NODES = memory.data<u32>([0x1111337f, 0x1111337f, 0x1111337f, 0x1111337f], 16);

/** The hash of a prefix (its digits at the top of the word, zeros below) under the two key words at `keys`. */
export function owenHash(prefix: u32, keys: usize): u32 {
  return <u32>i32x4.extract_lane(hash(i32x4.splat(prefix), keys), 0);
}

@inline
function hash(prefix: v128, keys: usize): v128 {
  let h = i32x4.add(prefix, v128.load32_splat(keys));
  h = v128.xor(h, i32x4.shr_u(h, 16));
  h = v128.xor(i32x4.mul(h, v128.load(M0)), v128.load32_splat(keys, 4));
  h = v128.xor(h, i32x4.shr_u(h, 16));
  h = i32x4.mul(h, v128.load(M1));
  h = v128.xor(h, i32x4.shr_u(h, 15));
  h = i32x4.mul(h, v128.load(M2));
  return v128.xor(h, i32x4.shr_u(h, 16));
}

/** The flips (nibble 0) of the four digits that stand at the top of `digits`, from the node bits of their prefix. */
@inline
function flips(word: v128, digits: v128): v128 {
  let w = v128.and(word, v128.load(NODES));
  w = v128.xor(w, v128.and(i32x4.shr_u(w, 4), i32x4.shr_s(digits, 31)));
  w = v128.xor(w, v128.and(i32x4.shr_u(w, 8), i32x4.shr_s(i32x4.shl(digits, 1), 31)));
  w = v128.xor(w, v128.and(i32x4.shr_u(w, 16), i32x4.shr_s(i32x4.shl(digits, 2), 31)));
  return i32x4.shl(w, 28);
}

/** What must be xored to group g (1...7) of the digits x. */
@inline
function group(x: v128, g: i32, keys: usize): v128 {
  let digits = i32x4.shl(x, g << 2);
  let prefix = v128.xor(x, i32x4.shr_u(digits, g << 2));
  return i32x4.shr_u(flips(hash(prefix, keys + (<usize>g << 3)), digits), g << 2);
}

/** The scrambled first 32 digits of x; `first` is the hash word of the empty prefix. */
@inline
function scramble(x: v128, first: v128, keys: usize): v128 {
  let y = v128.xor(x, flips(first, x));
  y = v128.xor(y, group(x, 1, keys));
  y = v128.xor(y, group(x, 2, keys));
  y = v128.xor(y, group(x, 3, keys));
  y = v128.xor(y, group(x, 4, keys));
  y = v128.xor(y, group(x, 5, keys));
  y = v128.xor(y, group(x, 6, keys));
  return v128.xor(y, group(x, 7, keys));
}

/** Scrambles a row of `count` raw words (1.0's exponent bits over 52 digits) in place, into doubles; may read and write up to 3 words behind. */
export function owenRow(row: usize, count: i32, keys: usize): void {
  let first = hash(i32x4.splat(0), keys);
  let below = f64x2.splat(BELOW_ONE);
  let end = row + (<usize>count << 3);
  for (; row < end; row += 32) {
    let a = v128.load(row), b = v128.load(row, 16);
    let top = i8x16.shuffle(i64x2.shr_u(a, 20), i64x2.shr_u(b, 20), 0, 1, 2, 3, 8, 9, 10, 11, 16, 17, 18, 19, 24, 25, 26, 27);
    let rest = i32x4.shr_u(hash(top, keys + 64), 12);
    let flip = v128.xor(top, scramble(top, first, keys));
    a = v128.xor(a, v128.xor(i64x2.shl(i64x2.extend_low_i32x4_u(flip), 20), i64x2.extend_low_i32x4_u(rest)));
    b = v128.xor(b, v128.xor(i64x2.shl(i64x2.extend_high_i32x4_u(flip), 20), i64x2.extend_high_i32x4_u(rest)));
    v128.store(row, sub(a, below));
    v128.store(row, sub(b, below), 16);
  }
}

// Points of digital sequences in a base b from 2 to 127, in natural order, one digit in a byte.
//
// Going from point i - 1 to point i adds the step vector S_c to the K digits of a coordinate, without carries, where c is
// the number of zeros at the end of i in base b and S_c the sum of the columns 0...c of its generating matrix; b times a
// column is zero. The coordinate is (N + 1/2) / b^K with N the number that the digits spell, b^K at most 2^52.
//
// Nested uniform scrambling (A. B. Owen 1995, see ./owen) in base b: every node of the digit tree has a permutation of
// its own, drawn by splitmix64 (G. L. Steele, D. Lea and C. H. Flood, "Fast splittable pseudorandom number generators",
// OOPSLA 2014, 453-472) from a state hashed from the key, the level and the prefix. b draws a digit: meant for small bases.
//
// One record per coordinate: vectors of `bytes` = 16 ceil(K / 16) bytes; vector 0 the digits of the present point, vector 1
// those of point 0 (a digital shift), then S_0...S_(K-1).

/** Makes `index` the next point. */
export function netbSeek(records: usize, dimension: i32, base: u32, digits: u32, index: f64): void {
  let bytes = size(digits);
  let b = i8x16.splat(<i8>base);
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * bytes * (digits + 2);
    for (let at: u32 = 0; at < bytes; at += 16) {
      let y = v128.load(record + bytes + at);
      let before = i8x16.splat(0);
      let rest = <u64>index;
      for (let k: u32 = 0; k < digits && rest != 0; k++) {
        let step = v128.load(record + (k + 2) * bytes + at);
        let column = i8x16.sub(step, before);
        column = i8x16.min_u(column, i8x16.add(column, b));
        for (let times = <u32>(rest % base); times > 0; times--) y = sum(y, column, b);
        rest /= base;
        before = step;
      }
      v128.store(record + at, y);
    }
  }
}

/**
 * Fills `count` points from point `index`, to which the records must have been brought. `weights`: the doubles
 * b^(K-1), ..., b, 1; `keys`: 8 bytes for every coordinate to scramble with, or 0.
 */
export function netbFill(
  records: usize, dimension: i32, base: u32, digits: u32, weights: usize, keys: usize, index: f64,
  pointer: usize, stride: i32, count: i32,
): void {
  let bytes = size(digits);
  let b = i8x16.splat(<i8>base);
  let cells = load<f64>(weights) * <f64>base;
  let first = <u32>(<u64>index % base);
  for (let j = 0; j < dimension; j++) {
    let record = records + <usize>j * bytes * (digits + 2);
    let o = pointer + (<usize>(j * stride) << 3);
    let low = first;
    for (let i = 0; i < count; i++, o += 8) {
      let number = 0.5 + (keys != 0 ? scrambled(record, base, digits, weights, load<u64>(keys + (<usize>j << 3))) : spelled(record, digits, weights));
      store<f64>(o, number / cells);
      let c: u32 = 0;
      if (++low == base) {
        low = 0;
        for (let next = (<u64>index + i + 1) / base; ; next /= base) {
          c++;
          if (next % base != 0 || c >= digits - 1) break;
        }
      }
      let step = record + (c + 2) * bytes;
      for (let at: u32 = 0; at < bytes; at += 16) {
        v128.store(record + at, sum(v128.load(record + at), v128.load(step + at), b));
      }
    }
  }
}

@inline
function size(digits: u32): u32 {
  return (digits + 15) & ~15;
}

/** The sum of two digit vectors modulo b. */
@inline
function sum(x: v128, y: v128, b: v128): v128 {
  let s = i8x16.add(x, y);
  return i8x16.min_u(s, i8x16.sub(s, b));
}

@inline
function spelled(record: usize, digits: u32, weights: usize): f64 {
  let number = 0.0;
  for (let r: u32 = 0; r < digits; r++) number += <f64>load<u8>(record + r) * load<f64>(weights + (r << 3));
  return number;
}

const permutation = memory.data(128, 16);

function scrambled(record: usize, base: u32, digits: u32, weights: usize, key: u64): f64 {
  let number = 0.0;
  let prefix: u64 = 0;
  for (let r: u32 = 0; r < digits; r++) {
    let digit = <u32>load<u8>(record + r);
    let state = mix(mix(key + r) + prefix);
    // inside-out shuffle of 0...b - 1 (Durstenfeld 1964)
    for (let d: u32 = 0; d < base; d++) {
      state += 0x9e3779b97f4a7c15;
      let other = <u32>(((mix(state) >> 16) * (d + 1)) >> 48);
      store<u8>(permutation + d, load<u8>(permutation + other));
      store<u8>(permutation + other, <u8>d);
    }
    number += <f64>load<u8>(permutation + digit) * load<f64>(weights + (r << 3));
    prefix = prefix * base + digit;
  }
  return number;
}

/** The output function of splitmix64. */
@inline
function mix(x: u64): u64 {
  x = (x ^ (x >> 30)) * 0xbf58476d1ce4e5b9;
  x = (x ^ (x >> 27)) * 0x94d049bb133111eb;
  return x ^ (x >> 31);
}

/** Nested uniform scrambling written out node by node, the oracle of the SIMD kernel: BigInt, one digit at a time. */

const WORD = 0xffffffffn;

/** lowbias32 (C. Wellons, 2018) behind one round keyed by k0 and k1, in plain 32-bit arithmetic. */
export function referenceHash(prefix: number, k0: number, k1: number): number {
  let h = BigInt(prefix);
  h = (h + BigInt(k0)) & WORD;
  h ^= h >> 16n;
  h = ((h * 0x9e3779b9n) & WORD) ^ BigInt(k1);
  h ^= h >> 16n;
  h = (h * 0x7feb352dn) & WORD;
  h ^= h >> 15n;
  h = (h * 0x846ca68bn) & WORD;
  return Number(h ^ (h >> 16n));
}

/** The bit of the node below `digits` (fewer than four) in a word: a Boolean function in algebraic normal form. */
export function nodeBit(word: number, digits: readonly number[]): number {
  const depth = digits.length;
  let bit = 0;
  for (let subset = 0; subset < 2 ** depth; subset++) {
    const covered = digits.every((digit, q) => ((subset >> q) & 1) === 0 || digit === 1);
    if (covered) bit ^= (word >>> (4 * subset + 3 - depth)) & 1;
  }
  return bit;
}

/** The scrambled 52 digits of k under the 18 key words of a coordinate. */
export function referenceOwen(k: bigint, keys: Uint32Array): bigint {
  const digits = Array.from({ length: 52 }, (_, r) => Number((k >> BigInt(51 - r)) & 1n));
  const key = (at: number): number => keys[at] ?? NaN;
  let out = 0n;
  for (let level = 0; level < 32; level++) {
    const group = level >> 2;
    const upper = digits.slice(0, 4 * group);
    const prefix = upper.reduce((sum, digit, r) => sum + digit * 2 ** (31 - r), 0);
    const word = referenceHash(prefix, key(2 * group), key(2 * group + 1));
    const flip = nodeBit(word, digits.slice(4 * group, level));
    out = (out << 1n) | BigInt((digits[level] ?? NaN) ^ flip);
  }
  const last = referenceHash(Number(k >> 20n), key(16), key(17)) >>> 12;
  return (out << 20n) | ((k & 0xfffffn) ^ BigInt(last));
}

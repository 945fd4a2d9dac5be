/**
 * Walsh functions in base b (J. L. Walsh, "A closed set of normal orthogonal functions", American Journal of Mathematics 45
 * (1923) 5-24; H. E. Chrestenson, Pacific Journal of Mathematics 5 (1955) 17-31): wal_k(x) = exp(2 pi i p / b) with the phase
 * p = kappa_0 xi_1 + kappa_1 xi_2 + ... modulo b, kappa the digits of k, least significant first, and xi those of x after the
 * point. In several coordinates phases add.
 */

/** Phases 0...base - 1 of wal_k; in base 2 wal_k is 1 for phase 0 and -1 for phase 1. */
export interface WalshVector {
  /** 0-based coordinates with k > 0. */
  readonly indices: readonly number[];
  /** Whole numbers from 1 to 2^53 - 1. */
  readonly k: readonly number[];
}

/**
 * The phase of a Walsh function at `count` points: coordinate j of point i stands at `j * stride + i` of `coordinates`, in
 * [0, 1). Exact for points with up to 52 binary digits (in base b for the midpoints of cells b^-K >= 2^-52).
 */
export function walshPhases(
  base: number,
  { indices, k }: WalshVector,
  coordinates: Float64Array,
  stride: number,
  count: number,
): Uint8Array {
  const phases = new Uint8Array(count);
  for (const [at, j] of indices.entries()) {
    const digits: number[] = [];
    for (let rest = k[at] ?? 0; rest > 0; rest = Math.floor(rest / base)) digits.push(rest % base);
    const row = coordinates.subarray(j * stride, j * stride + count);
    if (base === 2 && digits.length <= 31) addParities(digits, row, phases);
    else addPhases(base, digits, row, phases);
  }
  return phases;
}

/** Phases in base 2: the parity of the digits of x that k picks. */
function addParities(digits: readonly number[], row: Float64Array, phases: Uint8Array): void {
  const scale = 2 ** digits.length;
  const mask = digits.reduce((word, digit) => (word << 1) | digit, 0);
  for (let i = 0; i < row.length; i++) {
    let word = ((row[i] ?? 0) * scale) & mask;
    word ^= word >>> 16;
    word ^= word >>> 8;
    word ^= word >>> 4;
    phases[i] = (phases[i] ?? 0) ^ ((0x6996 >>> (word & 15)) & 1);
  }
}

function addPhases(base: number, digits: readonly number[], row: Float64Array, phases: Uint8Array): void {
  const scale = base ** digits.length;
  for (let i = 0; i < row.length; i++) {
    let phase = phases[i] ?? 0;
    // the digits of x from the last one that counts to the first
    for (let rest = Math.floor((row[i] ?? 0) * scale), r = digits.length - 1; r >= 0; r--) {
      phase += (digits[r] ?? 0) * (rest % base);
      rest = Math.floor(rest / base);
    }
    phases[i] = phase % base;
  }
}

/**
 * Kernels of the pseudo-random generators: integer words in order of generation, and their conversion to rows of
 * coordinates. All pointers are byte addresses in the kernel memory; layouts of `state` stand with each kernel.
 */

/** Writes the next `count` words of a generator to `out` and moves its state on by exactly as many. */
export type FillWords = (state: number, out: number, count: number) => void;

/** Words w[i * dimension + j] to coordinates at out + (j * stride + i) * 8. */
export type ToRows = (words: number, dimension: number, count: number, out: number, stride: number) => void;

/** As `ToRows`: (((w >> shift) & mask) + offset) * factor, the masked integer below 2^52. */
export type ToScaledRows = (
  words: number,
  dimension: number,
  count: number,
  out: number,
  stride: number,
  shift: number,
  mask: bigint,
  offset: number,
  factor: number,
) => void;

export interface GeneratorExports {
  readonly fillPowerOfTwo: FillWords;
  readonly fillFolded: FillWords;
  readonly fillShort: FillWords;
  readonly fillGeneral: FillWords;
  readonly fillMt19937: FillWords;
  readonly fillPcg64: FillWords;
  readonly fillPhilox4x32: FillWords;
  readonly fillMt19937x64: FillWords;
  readonly fillPhilox4x64: FillWords;
  readonly fillThreefry4x64: FillWords;
  readonly fillChaCha8: FillWords;
  readonly fillChaCha20: FillWords;
  readonly fillSubtractive55: FillWords;
  readonly fillR250: FillWords;
  readonly fillKnuthArray: FillWords;
  readonly fillSubtractWithBorrow: FillWords;
  readonly fillMwc: FillWords;
  readonly fillRecursive: FillWords;
  readonly fillXorshiftTriple32: FillWords;
  readonly fillXorshiftTriple64: FillWords;
  readonly fillKiss99: FillWords;
  readonly fillKiss64: FillWords;
  readonly fillXoshiro256PlusPlus: FillWords;
  readonly fillMrg32k3a: FillWords;
  readonly fillLecuyer1988: FillWords;
  readonly fillWichmannHill: FillWords;
  readonly fillPcg32: FillWords;
  readonly fillPcg64Dxsm: FillWords;
  readonly fillSplitMix64: FillWords;
  readonly fillSfc64: FillWords;
  readonly fillXoshiro256Plus: FillWords;
  readonly fillXoshiro256StarStar: FillWords;
  readonly fillXoroshiro128Plus: FillWords;
  readonly fillXoroshiro128PlusPlus: FillWords;
  readonly fillXoroshiro128StarStar: FillWords;
  readonly fillXorshift32: FillWords;
  readonly fillXorshift64Star: FillWords;
  readonly fillXorshift128: FillWords;
  readonly fillTaus88: FillWords;
  readonly fillLfsr113: FillWords;
  readonly rowsMidpoint32: ToRows;
  readonly rowsMidpoint64: ToRows;
  readonly rowsScaled32: ToScaledRows;
  readonly rowsScaled64: ToScaledRows;
  /** As `ToRows`: (w + offset) / divisor, w below 2^52, correctly rounded. */
  readonly rowsQuotient64: (
    words: number,
    dimension: number,
    count: number,
    out: number,
    stride: number,
    offset: number,
    divisor: number,
  ) => void;
  /** Each word k < m becomes floor(2^64 k / m), in place; `scaled` is m 2^s with its top bit set. */
  readonly fractionWords: (
    words: number,
    count: number,
    scaled: bigint,
    reciprocal: bigint,
    s: bigint,
  ) => void;
  /** Keeps words 0, step, 2 step, ..., `count` in all, in place. */
  readonly keepEvery32: (words: number, count: number, step: number) => void;
  readonly keepEvery64: (words: number, count: number, step: number) => void;
  /**
   * 64-bit words first, first + step, ... modulo `modulus`, at most 2^48; gives the word that follows. Writes up to
   * three words behind the last.
   */
  readonly fillProgression: (
    out: number,
    count: number,
    first: number,
    step: number,
    modulus: number,
  ) => number;
  /**
   * 32-bit words of the states first, first + 1, ... below 2^32 under the linear map at `map`: its 32 columns, then the
   * words of the states 0 ... 255. Writes up to three words behind the last.
   */
  readonly fillSpan32: (out: number, count: number, first: number, map: number) => void;
}

/**
 * Fill kernels of nets, lattices and other sequences. Pointers are byte addresses in the kernel memory; coordinate j of
 * point i goes to `pointer + (j * stride + i) * 8`.
 */
export interface SequenceExports {
  /** Turns the step words of `dimension` records (layout: assembly/sequences/net2.ts) from Gray-code to natural order. */
  net2Natural(records: number, dimension: number): void;
  /** Multiplies the step words by random lower triangular matrices; `seeds` holds 32 bytes for every coordinate. */
  net2Scramble(records: number, dimension: number, seeds: number): void;
  /** Makes `index` the next point of the net. */
  net2Seek(records: number, dimension: number, index: number): void;
  /** Fills `count` points of a net from point `index`. */
  net2Fill(
    records: number,
    dimension: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
  ): void;
  /** As `net2Fill`, with nested uniform scrambling; `keys` holds 18 words of 32 bits for every coordinate. */
  net2FillOwen(
    records: number,
    dimension: number,
    keys: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
  ): void;
  /** The hash word of a prefix under the two key words (32 bits each) at `keys`. */
  owenHash(prefix: number, keys: number): number;
  /** Builds the tables of Halton records (layout: assembly/sequences/halton.ts); `seeds` 0 leaves the digits as they are. */
  haltonPrepare(records: number, dimension: number, seeds: number): void;
  /** Fills `count` points of Halton's sequence from point `index`. */
  haltonFill(
    records: number,
    dimension: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
  ): void;
  /** Makes `index` the next point of rotations (layout: assembly/sequences/rotation.ts). */
  rotationSeek(records: number, dimension: number, index: number): void;
  /** Fills `count` points of rotations from point `index`; `tent` folds every coordinate to 1 - |2u - 1|. */
  rotationFill(
    records: number,
    dimension: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
    tent: boolean,
  ): void;
  /** As `haltonFill`, of the sequence that takes every `leap`-th point. */
  haltonFillLeaped(
    records: number,
    dimension: number,
    index: number,
    leap: number,
    pointer: number,
    stride: number,
    count: number,
  ): void;
  /** Draws `dimension` permutations of 0...n - 1 (32 bits each) from seeds of 32 bytes. */
  latinPrepare(permutations: number, n: number, dimension: number, seeds: number): void;
  /** Turns uniform numbers, standing where the points will, into points of a Latin hypercube from point `index`. */
  latinPass(
    permutations: number,
    n: number,
    dimension: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
  ): void;
  /** The same for boxes; `layout` holds the first bit of the index and the number of bits for every coordinate. */
  boxesPass(
    layout: number,
    dimension: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
  ): void;
  /** Makes `index` the next point of a net in base `base` with `digits` digits (layout: assembly/sequences/netb.ts). */
  netbSeek(records: number, dimension: number, base: number, digits: number, index: number): void;
  /** Fills `count` points of such a net; `weights`: base^(digits-1), ..., 1; `keys`: 8 bytes a coordinate to scramble with, or 0. */
  netbFill(
    records: number,
    dimension: number,
    base: number,
    digits: number,
    weights: number,
    keys: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
  ): void;
  /** Makes `index` the next point of extensible lattices (layout: assembly/sequences/radical.ts). */
  radicalSeek(records: number, dimension: number, index: number): void;
  /** Fills `count` points of extensible lattices from point `index`; `tent` as in `rotationFill`. */
  radicalFill(
    records: number,
    dimension: number,
    index: number,
    pointer: number,
    stride: number,
    count: number,
    tent: boolean,
  ): void;
}

/**
 * Streams of points frac(i alpha + shift), alpha a vector of 128-bit fractions: what rank-1 lattices and Kronecker
 * sequences have in common. Randomised by `shift` (R. Cranley and T. N. L. Patterson, SIAM Journal on Numerical Analysis
 * 13, 1976, 904-914) and by `shift+tent`, the baker's transform after the shift (F. J. Hickernell, in Monte Carlo and
 * Quasi-Monte Carlo Methods 2000, Springer, 2002, 274-289). 52 digits and the midpoint convention; the kernel says how
 * exact the points are.
 */
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, Seekable, Source } from "./contract.js";
import { checkIndex, checkOpening } from "./quasi-random.js";

export const ROTATION_RANDOMISATIONS = ["shift", "tent"] as const;

const RECORD_WORDS = 8;
const WORD = 64n;
const MASK = (1n << WORD) - 1n;

/** Opens a stream; alpha_j = `alphas[j]` / 2^128, below 1. */
export function openRotation(
  source: Source,
  alphas: (dimension: number) => readonly bigint[],
  request: OpenRequest,
  kernels: Kernels,
): PointStream & Seekable {
  const randomisation = checkOpening(source, request);
  const tent = randomisation?.name === "shift+tent";
  const { dimension } = request;
  const { exports } = kernels;
  const shifts = randomisation?.key.derive("shift").words64(dimension);
  const records = kernels.arena.allocate(dimension * RECORD_WORDS * 8);
  const words = kernels.u64(records, dimension * RECORD_WORDS).fill(0n);
  for (const [j, alpha] of alphas(dimension).entries()) {
    const at = j * RECORD_WORDS;
    words[at + 2] = ((alpha << 4n) >> WORD) & MASK;
    words[at + 3] = (alpha << 4n) & MASK;
    words[at + 4] = ((alpha + MASK) >> WORD) & MASK;
    words[at + 5] = shifts?.[j] ?? 0n;
  }

  let index = 0;
  const seek = (to: number): void => {
    checkIndex(source, to);
    exports.rotationSeek(records, dimension, to);
    index = to;
  };
  seek(0);
  return {
    dimension,
    seek,
    fill(pointer, stride, count) {
      checkIndex(source, index, count);
      exports.rotationFill(records, dimension, index, pointer, stride, count, tent);
      index += count;
    },
  };
}

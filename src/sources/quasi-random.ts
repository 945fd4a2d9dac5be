/** What quasi-random sources have in common: checks made when they are opened, and valid sizes. */
import { checkCapacity } from "./capacity.js";
import type { OpenRequest, Source } from "./contract.js";
import type { Key } from "./key.js";
import { checkRandomisations } from "./randomisations.js";

/**
 * The randomisation asked for, as it is written after the source's id ("shift+tent"), and the key it needs; null for the
 * plain source. Throws where dimension, n or the randomisation do not suit the source or the key is missing.
 */
export function checkOpening(source: Source, request: OpenRequest): { name: string; key: Key } | null {
  checkCapacity(source, request.dimension, request.n);
  const name = checkRandomisations(source, request.randomisations).join("+");
  if (name === "") return null;
  if (request.key === null)
    throw new TypeError(`source "${source.id}+${name}" cannot be opened without a key`);
  return { name, key: request.key };
}

/** Throws RangeError unless points `index` to `index + count - 1` are among the first 2^52 of the source. */
export function checkIndex(source: Source, index: number, count = 0): void {
  if (Number.isInteger(index) && index >= 0 && index + count <= 2 ** 52) return;
  throw new RangeError(`index: expected points from 0 to 2^52 - 1 of source "${source.id}", found ${index}`);
}

/** The power of two nearest to n (the larger one half-way), at most `largest`, itself a power of two. */
export function nearestPowerOfTwo(n: number, largest: number): number {
  const below = 2 ** Math.floor(Math.log2(Math.min(n, largest)));
  return n - below < 2 * below - n || below === largest ? below : 2 * below;
}

/** Whether a source can give points of this dimension and number: checked before a run, never in the middle of one. */
import type { Source } from "./contract.js";

/** Throws a TypeError for what is no whole number, a RangeError for one out of range or no valid size. */
export function checkCapacity(source: Source, dimension: number, n: number): void {
  checkWhole("dimension", dimension, source.largestDimension, source.id);
  checkWhole("n", n, Number.MAX_SAFE_INTEGER, source.id);
  const nearest = source.nearestSize(n);
  if (nearest !== n) {
    throw new RangeError(
      `n: expected a valid size for source "${source.id}", found ${n}; the nearest is ${nearest}`,
    );
  }
}

function checkWhole(key: string, value: number, largest: number, id: string): void {
  if (typeof value === "number" && Number.isInteger(value) && value >= 1 && value <= largest) return;
  const message = `${key}: expected an integer from 1 to ${largest} for source "${id}", found ${String(value)}`;
  throw typeof value === "number" && Number.isInteger(value)
    ? new RangeError(message)
    : new TypeError(message);
}

/** Checks that every quasi-random source makes when it is opened. */
import type { OpenRequest, Randomisation, SourceDescription } from "./contract.js";
import type { Key } from "./key.js";

/** Throws TypeError or RangeError unless `dimension` is one that the source can give. */
export function checkDimension(source: SourceDescription, dimension: number): void {
  const { id, largestDimension } = source;
  if (Number.isInteger(dimension) && dimension >= 1 && dimension <= largestDimension) return;
  const allowed = `an integer from 1 to ${largestDimension} for source "${id}"`;
  throw new RangeError(`dimension: expected ${allowed}, found ${dimension}`);
}

/**
 * The randomisation asked for among `combinations` (each as it is written after the source's id, such as "shift+tent")
 * and the key it needs, or null for the plain source. Throws RangeError for one that does not apply, TypeError where the
 * key is missing.
 */
export function chosenRandomisation<T extends string>(
  source: SourceDescription,
  request: OpenRequest,
  combinations: readonly T[],
): { name: T; key: Key } | null {
  const asked: readonly Randomisation[] = request.randomisations;
  if (asked.length === 0) return null;
  const name = combinations.find((combination) => combination === asked.join("+"));
  if (name === undefined) {
    const allowed = combinations.map((combination) => `"${combination}"`).join(", ");
    throw new RangeError(
      `randomisation: source "${source.id}" can be used plain or with one of ${allowed}; found "${asked.join("+")}"`,
    );
  }
  if (request.key === null)
    throw new TypeError(`source "${source.id}+${name}" cannot be opened without a key`);
  return { name, key: request.key };
}

/** Throws RangeError unless points `index` to `index + count - 1` are among the first 2^52 of the source. */
export function checkIndex(source: SourceDescription, index: number, count = 0): void {
  if (Number.isInteger(index) && index >= 0 && index + count <= 2 ** 52) return;
  throw new RangeError(`index: expected points from 0 to 2^52 - 1 of source "${source.id}", found ${index}`);
}

/** Starting states as people write them: whole numbers with commas between them. */

/** What one number of a state may be. */
export interface WordRange {
  readonly least: bigint;
  readonly below: bigint;
}

export interface StateForm {
  /** The source's id, for messages. */
  readonly id: string;
  readonly words: readonly WordRange[];
  /** What is allowed, in words, with an example. */
  readonly allowed: string;
  /** A further condition on the words together. */
  readonly valid?: (words: readonly bigint[]) => boolean;
}

/** The numbers of a state; throws a RangeError with what is allowed. */
export function parseWords(text: string, { id, words, allowed, valid }: StateForm): bigint[] {
  const found = /^\d+(\s*,\s*\d+)*$/.test(text.trim()) ? text.split(",").map((word) => BigInt(word)) : [];
  const fits =
    found.length === words.length &&
    words.every(({ least, below }, k) => (found[k] ?? -1n) >= least && (found[k] ?? below) < below) &&
    (valid === undefined || valid(found));
  if (fits) return found;
  throw new RangeError(`state: expected ${allowed} for source "${id}", found "${text}"`);
}

/** `count` words of the same range. */
export function equalWords(count: number, below: bigint, least = 0n): WordRange[] {
  return Array.from({ length: count }, () => ({ least, below }));
}

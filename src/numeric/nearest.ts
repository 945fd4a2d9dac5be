/**
 * The known word nearest to a mistyped one, by the number of single-letter insertions, deletions, substitutions and
 * swaps of neighbours (F. J. Damerau, "A technique for computer detection and correction of spelling errors",
 * Communications of the ACM 7 (1964) 171-176; here each letter is edited at most once). Quadratic in the length: for
 * names, not for texts.
 */

/** Longer words are cut before they are compared: nobody mistypes a name by hundreds of letters. */
const LONGEST = 64;

/** Edits between two words, case ignored. */
export function editDistance(a: string, b: string): number {
  const left = a.toLowerCase().slice(0, LONGEST);
  const right = b.toLowerCase().slice(0, LONGEST);
  let beforeLast: number[] = [];
  let last = Array.from({ length: right.length + 1 }, (_, j) => j);
  for (let i = 1; i <= left.length; i++) {
    const row = [i];
    for (let j = 1; j <= right.length; j++) {
      const differs = left[i - 1] === right[j - 1] ? 0 : 1;
      let least = Math.min((last[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, (last[j - 1] ?? 0) + differs);
      if (i > 1 && j > 1 && left[i - 1] === right[j - 2] && left[i - 2] === right[j - 1]) {
        least = Math.min(least, (beforeLast[j - 2] ?? 0) + 1);
      }
      row.push(least);
    }
    beforeLast = last;
    last = row;
  }
  return last[right.length] ?? 0;
}

/**
 * The word of `words` with the fewest edits from `word`, the first of equals; null where even the nearest differs in
 * more than half of its letters (a guess that far off would mislead).
 */
export function nearest(word: string, words: Iterable<string>): string | null {
  let best: string | null = null;
  let fewest = Infinity;
  for (const candidate of words) {
    const distance = editDistance(word, candidate);
    if (distance < fewest) [best, fewest] = [candidate, distance];
  }
  return best !== null && fewest <= Math.max(2, best.length / 2) ? best : null;
}

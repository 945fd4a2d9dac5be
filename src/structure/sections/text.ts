/** Vectors and sets as tables show them. */

/** Characters of a vector in a table; JSON has all of it. */
const LONGEST = 48;

/** "(9, −6, 1)"; long ones end in "…". */
export function vectorText(vector: readonly bigint[]): string {
  const entries = vector.map((entry) => String(entry).replace("-", "−"));
  let text = entries.join(", ");
  for (let count = entries.length; text.length > LONGEST && count > 1;) {
    count--;
    text = `${entries.slice(0, count).join(", ")}, …`;
  }
  return `(${text})`;
}

/** "{0, 1, 5}". */
export function setText(indices: readonly number[]): string {
  return `{${indices.join(", ")}}`;
}

/** Whole numbers in ascending order: "23…32", "9, 12…14". */
export function intervalText(numbers: readonly number[]): string {
  const runs: [number, number][] = [];
  for (const n of numbers) {
    const last = runs.at(-1);
    if (last !== undefined && last[1] === n - 1) last[1] = n;
    else runs.push([n, n]);
  }
  return runs.map(([first, last]) => (first === last ? `${first}` : `${first}…${last}`)).join(", ");
}

/** Lists of linear steps on rows of points, packed for kernels/assembly/distributions/linear.ts. */

/** A row of the block, or an earlier step by its index. */
export type From = { readonly row: number } | { readonly step: number };

export interface LinearStep {
  /** Row of the block that takes the result. */
  readonly row: number;
  readonly constant: number;
  readonly terms: readonly (readonly [coefficient: number, from: From])[];
}

const EARLIER = 0x80000000;

export function packSteps(steps: readonly LinearStep[]): Float64Array<ArrayBuffer> {
  const size = steps.reduce((sum, { terms }) => sum + 2 + 2 * terms.length, 1);
  const table = new Float64Array(size);
  const words = new Uint32Array(table.buffer);
  table[0] = steps.length;
  let at = 1;
  for (const { row, constant, terms } of steps) {
    words.set([row, terms.length], 2 * at);
    table[at + 1] = constant;
    at += 2;
    for (const [coefficient, from] of terms) {
      words[2 * at] = "row" in from ? from.row : EARLIER + from.step;
      table[at + 1] = coefficient;
      at += 2;
    }
  }
  return table;
}

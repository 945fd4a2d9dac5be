/** What the formula compiler takes and gives. The room knows nothing of problem files. */

/** A name that the formula may use for rows of the point block. */
export interface FormulaInput {
  readonly name: string;
  /** Number of coordinates of a vector; null for a scalar. */
  readonly length: number | null;
  /** Row of its first coordinate, 0-based. */
  readonly first: number;
}

/** A named constant: a number, a vector or a matrix (rows). */
export type FormulaConstant = number | readonly number[] | readonly (readonly number[])[];

export interface FormulaScope {
  readonly inputs: readonly FormulaInput[];
  readonly constants: Readonly<Record<string, FormulaConstant>>;
}

/**
 * A formula as a WebAssembly function spliced into the kernel module. Plain data: it can be posted to a thread.
 * The export is called as `integrand(x, result, count, pool, scratch)`, all byte addresses but `count`:
 * coordinate r of point i is read at x + (r * blockPoints + i) * 8 and channel c of point i is written at
 * result + (c * blockPoints + i) * 8. `count` points (1 to blockPoints) are asked for; the function may read and write
 * whole groups of 8 points, so buffers hold blockPoints points always.
 */
export interface CompiledFormula {
  readonly moduleBytes: Uint8Array<ArrayBuffer>;
  readonly exportName: "integrand";
  /** Rows of the point block that the scope describes. */
  readonly dimension: number;
  /** Numbers returned per point; 1 for a plain integrand. */
  readonly channels: number;
  /** True where the result is a condition (0 or 1), i.e. its mean is a probability. */
  readonly indicator: boolean;
  /** Points per block: a multiple of 64. Results never depend on it. */
  readonly blockPoints: number;
  /** Constants to be copied to `pool` (16-byte aligned) before the first call. */
  readonly pool: Float64Array<ArrayBuffer>;
  /** Bytes that must be free at `scratch` (16-byte aligned). */
  readonly scratchBytes: number;
}

/** Where in the text of a formula something stands; both 1-based. */
export interface FormulaPosition {
  readonly line: number;
  readonly column: number;
}

/** A formula that is refused: position, what was found, what is allowed. */
export class FormulaError extends Error {
  readonly position: FormulaPosition;

  constructor(message: string, position: FormulaPosition) {
    super(message);
    this.name = "FormulaError";
    this.position = position;
  }
}

/** Block passes of the distributions group: uniforms (or normals) become inputs, in place. */
export interface DistributionExports {
  /**
   * Quantiles by elementary functions: location + scale * q(u) in `rows` rows of `count` values; value i of row r stands
   * at pointer + (r * stride + i) * 8. `form` and the meaning of `shape`: assembly/distributions/closed.ts.
   */
  closedBlock(
    form: number,
    pointer: number,
    stride: number,
    rows: number,
    count: number,
    location: number,
    scale: number,
    shape: number,
  ): void;
  /** Quantiles by pieces of polynomials; `table` is the address (aligned to 16) of what numeric/quantile-table.ts makes. */
  piecesBlock(pointer: number, stride: number, rows: number, count: number, table: number): void;
  /** Linear steps on rows of the block at `pointer`; `table`: numeric/linear-steps.ts; `scratch`: 64 bytes a step. */
  linearBlock(pointer: number, stride: number, count: number, table: number, scratch: number): void;
  /** Quantiles of discrete laws; `table` is the address of what numeric/step-table.ts makes. */
  stepsBlock(pointer: number, stride: number, rows: number, count: number, table: number): void;
}

/** Block passes of the math group. The elementary functions themselves (vec_exp, ...) are spliced, not called from the host. */
export interface MathExports {
  /**
   * Replaces the uniforms in `rows` rows of `count` values by standard normals, in place; value i of row r stands at
   * pointer + (r * stride + i) * 8. `scratch` is the address of normalBlockScratch() bytes. 0 gives -infinity, 1 gives
   * +infinity, what is outside [0, 1] gives NaN. Same bits as vec_normalQuantile (M. J. Wichura's AS 241, 1988).
   */
  normalBlock(pointer: number, stride: number, rows: number, count: number, scratch: number): void;
  /** Bytes of scratch memory that normalBlock needs, whatever the block. */
  normalBlockScratch(): number;
}

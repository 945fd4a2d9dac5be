/** Block passes of the math group. The elementary functions themselves (vec_exp, ...) are spliced, not called from the host. */
// eslint-disable-next-line @typescript-eslint/no-empty-object-type -- filled by the math kernels
export interface MathExports {}

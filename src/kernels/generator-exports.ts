/** Fill kernels of the pseudo-random generators. */
// eslint-disable-next-line @typescript-eslint/no-empty-object-type -- filled by the generator kernels
export interface GeneratorExports {}

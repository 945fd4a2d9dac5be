/** Fill kernels of nets, lattices and other sequences. */
// eslint-disable-next-line @typescript-eslint/no-empty-object-type -- filled by the sequence kernels
export interface SequenceExports {}

// Exports of the math group of kernels.
export { vec_normalQuantile } from "./normal-quantile";
export { normalBlock, normalBlockScratch } from "./normal-block";

// Exports of the sums group of kernels.
export { countNonFinite, leafMoments } from "./leaves";

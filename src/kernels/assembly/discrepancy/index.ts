// Exports of the discrepancy group of kernels.
export { minimumPairs, mixturePairs, wraparoundPairs } from "./products";

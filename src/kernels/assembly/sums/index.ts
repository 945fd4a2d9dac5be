// Exports of the sums group of kernels.
export { aliasSums } from "./aliases";
export { countNonFinite, leafMoments } from "./leaves";
export { treeBytes, treePush, treePushLeaves, treeReset, treeTotal } from "./tree";

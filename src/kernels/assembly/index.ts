// The kernel module's face: every export of kernels.wasm, one line per group. Host typings: ../exports.ts.
export * from "./math/index";
export * from "./generators/index";
export * from "./sequences/index";
export * from "./sums/index";
export * from "./discrepancy/index";
export * from "./distributions/index";

/** First byte of memory that no static table uses; the host's arena begins here. */
export function heapBase(): usize {
  return __heap_base;
}

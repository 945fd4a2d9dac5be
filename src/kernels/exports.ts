/** What kernels.wasm exports, as the host sees it: one interface per group of src/kernels/assembly. */
export interface KernelExports
  extends
    MathExports,
    GeneratorExports,
    SequenceExports,
    SumExports,
    DiscrepancyExports,
    DistributionExports {
  readonly memory: WebAssembly.Memory;
  /** First byte of memory free for the host. */
  heapBase(): number;
}

import type { MathExports } from "./math-exports.js";
import type { GeneratorExports } from "./generator-exports.js";
import type { SequenceExports } from "./sequence-exports.js";
import type { SumExports } from "./sum-exports.js";
import type { DiscrepancyExports } from "./discrepancy-exports.js";
import type { DistributionExports } from "./distribution-exports.js";

/** What a replicate says at each of its sizes: by estimators for means, by the quantity itself for all others. */
import type { Estimator } from "../estimators/contract.js";
import type { Quantity } from "../problem/contract.js";
import { levelOf } from "../problem/quantity.js";
import { NOT_FINITE, type QuantityEstimate, type QuantityKind } from "../quantities/contract.js";
import { quantityKind } from "../quantities/registry.js";
import type { SizeResult } from "./integrator.js";
import type { ReplicateResult } from "./tasks.js";

export interface EstimateRequest {
  readonly quantity: Quantity;
  readonly estimators: readonly Estimator[];
  readonly replicate: number;
  /** Ascending. */
  readonly sizes: readonly SizeResult[];
  /** All values of the replicate in order, where the quantity sorts them; they are sorted in place. */
  readonly values: Float64Array | null;
  /** What was taken off before squaring, where the quantity needs squares. */
  readonly origin: number;
}

export function estimateSizes(request: EstimateRequest): ReplicateResult[] {
  const { quantity, estimators, replicate, sizes } = request;
  const kind = quantityKind(quantity);
  return sizes.map((size): ReplicateResult => {
    const { n, nonFinite } = size;
    if (kind.by === "estimators") {
      const estimates = estimators.map((estimator) => estimator.estimate(size.moments));
      return {
        replicate,
        n,
        estimates: estimates.map((e) => e.estimate),
        withinVariances: estimates.map((e) => e.withinVariance),
        nonFinite,
      };
    }
    const { estimate, withinVariance, finiteBias } =
      nonFinite > 0 ? NOT_FINITE : ofQuantity(kind, size, request);
    return {
      replicate,
      n,
      estimates: [estimate],
      withinVariances: [withinVariance],
      finiteBias,
      nonFinite,
    };
  });
}

function ofQuantity(
  kind: Exclude<QuantityKind, { by: "estimators" }>,
  { n, moments }: SizeResult,
  { quantity, values, origin }: EstimateRequest,
): QuantityEstimate {
  if (kind.by === "moments") return kind.estimate(moments, origin);
  // The first n values stay the first n when they are sorted: sizes ascend.
  const sorted = (values ?? new Float64Array()).subarray(0, n).sort();
  return kind.estimate(sorted, levelOf(quantity));
}

/**
 * The quantile of the integrand at level p, by the sample quantile of one replicate. Its standard error is sqrt(p (1 - p) /
 * n) Q'(p) with Q' the derivative of the quantile function: R. R. Bahadur, "A note on quantiles in large samples", Annals
 * of Mathematical Statistics 37 (1966) 577-580. The leading term of its bias for independent points is p (1 - p) Q''(p) /
 * (2 n) (H. A. David and H. N. Nagaraja, Order Statistics, Wiley 2003, section 4.6); evenly spaced values have
 * Q'(p) (p - 1/2) / n. Good for laws with a density at the quantile; at a jump of the law, or between two of its values,
 * there is no quantile to converge to and no standard error.
 */
import { rangeOf, type SortedQuantity } from "./contract.js";
import { curvature, isResolved, sampleQuantile, sparsity } from "./order-statistics.js";

export const quantile: SortedQuantity = {
  id: "quantile",
  title: "Quantile of the integrand at a level",
  citation: "R. R. Bahadur, Annals of Mathematical Statistics 37 (1966) 577-580",
  by: "sorted",
  estimate(sorted, p) {
    const n = sorted.length;
    const estimate = sampleQuantile(sorted, p);
    if (!isResolved(n, p)) return { estimate, withinVariance: null, finiteBias: null };
    const slope = sparsity(sorted, p);
    return {
      estimate,
      withinVariance: p * (1 - p) * slope ** 2,
      finiteBias: rangeOf((p * (1 - p) * curvature(sorted, p)) / n, (2 * slope * (p - 0.5)) / n),
    };
  },
};

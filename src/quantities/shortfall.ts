/**
 * The expected shortfall at level p: the mean of the upper part 1 - p of the law of the integrand, by the mean of the
 * largest n (1 - p) values, the last of them in part: C. Acerbi and D. Tasche, "On the coherence of expected shortfall",
 * Journal of Banking and Finance 26 (2002) 1487-1503. Its standard error is that of q + (f - q)+ / (1 - p) with q the
 * quantile (L. J. Hong, Z. Hu and G. Liu, ACM Transactions on Modeling and Computer Simulation 24 (2014) article 22). As the smallest value over q of such averages (R. T. Rockafellar and S. Uryasev, Journal of Risk 2 (2000)
 * 21-41) it is too small for independent points, by p Q'(p) / (2 n) to leading order: half the variance of the slope over
 * the curvature at the minimum.
 */
import { rangeOf, type SortedQuantity } from "./contract.js";
import { isResolved, sparsity } from "./order-statistics.js";

export const shortfall: SortedQuantity = {
  id: "shortfall",
  title: "Expected shortfall: mean beyond the quantile at a level",
  citation: "C. Acerbi, D. Tasche, Journal of Banking and Finance 26 (2002) 1487-1503",
  by: "sorted",
  estimate(sorted, p) {
    const n = sorted.length;
    // A level such as 0.95 times n may miss its whole number by rounding.
    const place = Math.max(1, Math.ceil(n * p - 1e-9));
    const edge = sorted[place - 1] as number;
    let [first, second] = [0, 0];
    for (let i = place; i < n; i++) {
      const beyond = (sorted[i] as number) - edge;
      first += beyond;
      second += beyond ** 2;
    }
    const estimate = edge + first / (n * (1 - p));
    if (!isResolved(n, p)) return { estimate, withinVariance: null, finiteBias: null };
    const spread = (second - first ** 2 / n) / (n - 1);
    return {
      estimate,
      withinVariance: spread / (1 - p) ** 2,
      finiteBias: rangeOf((-p * sparsity(sorted, p)) / n),
    };
  },
};

/**
 * The ratio E a / E b of two means, by the ratio r of the two averages. Its standard error is the delta method's, from
 * the residual a - r b; the leading term of its bias for independent points is (r Var b - Cov(a, b)) / (n (E b)^2).
 * W. G. Cochran, Sampling Techniques, 3rd edition, Wiley 1977, sections 2.11 and 6.8. The term is stated and not taken
 * off: with more even points the covariances of the averages, and the bias, are smaller than independence makes them.
 * Good for averages per unit; bad where the average of b comes near 0.
 */
import { channelMean, centredProduct } from "../estimators/moments.js";
import { rangeOf, type MomentsQuantity } from "./contract.js";

export const ratio: MomentsQuantity = {
  id: "ratio",
  title: "Ratio of the means of two numbers",
  citation: "W. G. Cochran, Sampling Techniques (1977), sections 2.11 and 6.8",
  by: "moments",
  squares: false,
  estimate(moments) {
    const { n } = moments;
    const below = channelMean(moments, 1);
    const r = channelMean(moments, 0) / below;
    const [aa, ab, bb] = [[0, 0] as const, [0, 1] as const, [1, 1] as const].map(
      ([i, j]) => centredProduct(moments, i, j) / (n - 1) / below ** 2,
    ) as [number, number, number];
    const leading = (r * bb - ab) / n;
    return {
      estimate: r,
      withinVariance: Math.max(0, aa - 2 * r * ab + r ** 2 * bb),
      finiteBias: rangeOf(2 * leading),
    };
  },
};

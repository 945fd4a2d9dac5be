/**
 * The variance of the integrand, by the sample variance with divisor n - 1: exactly unbiased for independent points. For
 * more even points, whose mean varies less, it is too large by up to sigma^2 / (n - 1), which the stated range holds.
 * Its standard error is the delta method's, from the variance of (f - mean)^2: sqrt((mu4 - sigma^4) / n) to leading order
 * (H. Cramer, Mathematical Methods of Statistics, Princeton 1946, section 27.4); it needs a fourth moment. The squares are
 * streamed about an origin, the integrand at the centre of the cube, so that a large mean costs them no digits.
 */
import { centredProduct, channelMean } from "../estimators/moments.js";
import { rangeOf, type MomentsQuantity } from "./contract.js";

export const variance: MomentsQuantity = {
  id: "variance",
  title: "Variance of the integrand",
  citation: "H. Cramer, Mathematical Methods of Statistics (1946), section 27.4",
  by: "moments",
  squares: true,
  estimate(moments, origin) {
    const { n } = moments;
    const product = (i: number, j: number) => centredProduct(moments, i, j) / (n - 1);
    const estimate = product(0, 0);
    const off = channelMean(moments, 0) - origin;
    return {
      estimate,
      withinVariance: Math.max(0, product(1, 1) - 4 * off * product(0, 1) + 4 * off ** 2 * estimate),
      finiteBias: rangeOf((2 * estimate) / n),
    };
  },
};

/**
 * Crude Monte Carlo: the mean of f over the points. Unbiased for independent or once-uniform points; with a randomised
 * quasi-random source the same mean is the randomised quasi-Monte Carlo estimate.
 * J. M. Hammersley and D. C. Handscomb, Monte Carlo Methods, Methuen 1964, section 5.2.
 */
import type { Estimator } from "./contract.js";
import { channelMean, channelVariance } from "./moments.js";

export const crude: Estimator = {
  id: "crude",
  title: "Mean of the integrand over the points",
  citation: "J. M. Hammersley, D. C. Handscomb, Monte Carlo Methods (1964), section 5.2",
  estimate: (moments) => ({ estimate: channelMean(moments), withinVariance: channelVariance(moments) }),
};

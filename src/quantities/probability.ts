/**
 * A probability: the mean of a condition, a share of hits. Unbiased; the hits of independent points are binomial, and are
 * tested as such (findings/bias-outcome.ts). C. J. Clopper and E. S. Pearson, Biometrika 26 (1934) 404-413, for intervals.
 */
import type { PlainQuantity } from "./contract.js";

export const probability: PlainQuantity = {
  id: "probability",
  title: "Probability of a condition",
  citation: "C. J. Clopper, E. S. Pearson, Biometrika 26 (1934) 404-413",
  by: "estimators",
};

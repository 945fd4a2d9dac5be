/** The mean of the integrand, which is its integral over the inputs' law: what estimators estimate. Unbiased. */
import type { PlainQuantity } from "./contract.js";

export const mean: PlainQuantity = {
  id: "mean",
  title: "Mean of the integrand",
  citation: "J. M. Hammersley, D. C. Handscomb, Monte Carlo Methods (1964), section 5.2",
  by: "estimators",
};

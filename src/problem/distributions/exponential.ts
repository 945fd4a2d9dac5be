/** Exponential: -mean log(1 - u), by log1p so that small values keep their digits. */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { CLOSED_ACCURACY, JOHNSON_1, closed, numberAt, positive } from "./parts.js";

export const exponential: Distribution = {
  title: "Exponential",
  citation: `${JOHNSON_1}, ch. 19`,
  discrete: false,
  accuracy: CLOSED_ACCURACY,
  parameters: { mean: positive("Mean, 1 / rate.", 1) },
  law(values) {
    const mean = numberAt(values, "mean");
    return {
      mean,
      variance: mean ** 2,
      support: [0, Infinity],
      density: (x) => Math.exp(-x / mean) / mean,
      passes: () => [closed(CLOSED.exponential, 0, mean)],
    };
  },
};

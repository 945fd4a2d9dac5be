/** Bernoulli: 1 with the given probability, else 0; 1 lies at large u. */
import { fromNumber, subtract } from "../../numeric/double-double.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_DISCRETE, PROBABILITY, STEPS_ACCURACY, numberAt } from "./parts.js";
import { stepsPass } from "./tables.js";

export const bernoulli: Distribution = {
  title: "Bernoulli",
  citation: `${JOHNSON_DISCRETE}, ch. 3`,
  discrete: true,
  accuracy: STEPS_ACCURACY,
  parameters: { probability: PROBABILITY },
  law(values) {
    const p = numberAt(values, "probability");
    return {
      mean: p,
      variance: p * (1 - p),
      support: [0, 1],
      density: (x) => (x === 1 ? p : 1 - p),
      passes: () =>
        stepsPass(`bernoulli ${p}`, () => ({
          values: [0, 1],
          weights: [subtract(fromNumber(1), fromNumber(p)), fromNumber(p)],
        })),
    };
  },
};

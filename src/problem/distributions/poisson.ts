/** Poisson: counts with the given mean; weights by the ratio of neighbours, outwards from the mode. */
import { fromNumber } from "../../numeric/double-double.js";
import { logGamma } from "../../numeric/gamma.js";
import { stepsByRatio } from "../../numeric/step-table.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_DISCRETE, STEPS_ACCURACY, between, numberAt } from "./parts.js";
import { stepsPass } from "./tables.js";

export const poisson: Distribution = {
  title: "Poisson",
  citation: `${JOHNSON_DISCRETE}, ch. 4`,
  discrete: true,
  accuracy: STEPS_ACCURACY,
  parameters: { mean: between("Mean.", 1e-12, 1e9) },
  law(values) {
    const mean = numberAt(values, "mean");
    return {
      mean,
      variance: mean,
      support: [0, Infinity],
      density: (k) => Math.exp(k * Math.log(mean) - mean - logGamma(k + 1)),
      passes: () =>
        stepsPass(`poisson ${mean}`, () =>
          stepsByRatio(Math.floor(mean), Infinity, (k) => [fromNumber(mean), fromNumber(k + 1)]),
        ),
    };
  },
};

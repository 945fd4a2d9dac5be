/** Binomial: successes among `trials`; weights by the ratio of neighbours, outwards from the mode. */
import { fromNumber, multiply, subtract } from "../../numeric/double-double.js";
import { logGamma } from "../../numeric/gamma.js";
import { stepsByRatio } from "../../numeric/step-table.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_DISCRETE, PROBABILITY, STEPS_ACCURACY, numberAt, whole } from "./parts.js";
import { stepsPass } from "./tables.js";

export const binomial: Distribution = {
  title: "Binomial",
  citation: `${JOHNSON_DISCRETE}, ch. 3`,
  discrete: true,
  accuracy: STEPS_ACCURACY,
  parameters: { trials: whole("Number of trials.", 1, 1e9), probability: PROBABILITY },
  law(values) {
    const [n, p] = [numberAt(values, "trials"), numberAt(values, "probability")];
    const q = subtract(fromNumber(1), fromNumber(p));
    const steps = () =>
      p === 1
        ? { values: [n], weights: [fromNumber(1)] }
        : stepsByRatio(Math.min(n, Math.floor((n + 1) * p)), n, (k) => [
            multiply(fromNumber(n - k), fromNumber(p)),
            multiply(fromNumber(k + 1), q),
          ]);
    return {
      mean: n * p,
      variance: n * p * (1 - p),
      support: [0, n],
      density: (k) =>
        Math.exp(
          logGamma(n + 1) -
            logGamma(k + 1) -
            logGamma(n - k + 1) +
            k * Math.log(p) +
            (n - k) * Math.log1p(-p),
        ),
      passes: () => stepsPass(`binomial ${n} ${p}`, steps),
    };
  },
};

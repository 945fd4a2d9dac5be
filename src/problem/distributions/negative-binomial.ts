/** Negative binomial: failures before the given number of successes, which may be any positive number (Polya's law). */
import { add, fromNumber, multiply, subtract } from "../../numeric/double-double.js";
import { logGamma } from "../../numeric/gamma.js";
import { stepsByRatio } from "../../numeric/step-table.js";
import type { Law, Distribution } from "./contract.js";
import { JOHNSON_DISCRETE, PROBABILITY, STEPS_ACCURACY, between, numberAt } from "./parts.js";
import { stepsPass } from "./tables.js";

export function failuresBefore(r: number, p: number): Law {
  const q = subtract(fromNumber(1), fromNumber(p));
  const mode = r > 1 ? Math.floor(((r - 1) * (1 - p)) / p) : 0;
  const steps = () =>
    p === 1
      ? { values: [0], weights: [fromNumber(1)] }
      : stepsByRatio(mode, Infinity, (k) => [
          multiply(add(fromNumber(r), fromNumber(k)), q),
          fromNumber(k + 1),
        ]);
  return {
    mean: (r * (1 - p)) / p,
    variance: (r * (1 - p)) / p ** 2,
    support: [0, Infinity],
    density: (k) =>
      Math.exp(logGamma(r + k) - logGamma(r) - logGamma(k + 1) + r * Math.log(p) + k * Math.log1p(-p)),
    passes: () => stepsPass(`negative-binomial ${r} ${p}`, steps),
  };
}

export const negativeBinomial: Distribution = {
  title: "Negative binomial",
  citation: `${JOHNSON_DISCRETE}, ch. 5`,
  discrete: true,
  accuracy: STEPS_ACCURACY,
  parameters: {
    successes: between("Successes waited for, any positive number.", 1e-6, 1e9),
    probability: PROBABILITY,
  },
  law: (values) => failuresBefore(numberAt(values, "successes"), numberAt(values, "probability")),
};

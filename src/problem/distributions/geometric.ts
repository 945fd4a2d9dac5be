/** Geometric: failures before the first success, from 0; for the number of trials add 1. */
import type { Distribution } from "./contract.js";
import { failuresBefore } from "./negative-binomial.js";
import { JOHNSON_DISCRETE, PROBABILITY, STEPS_ACCURACY, numberAt } from "./parts.js";

export const geometric: Distribution = {
  title: "Geometric",
  citation: `${JOHNSON_DISCRETE}, ch. 5.2`,
  discrete: true,
  accuracy: STEPS_ACCURACY,
  parameters: { probability: PROBABILITY },
  law: (values) => failuresBefore(1, numberAt(values, "probability")),
};

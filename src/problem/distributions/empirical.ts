/** Empirical: each number of a list or of a CSV column with equal probability, ties as often as they occur. */
import { fromNumber } from "../../numeric/double-double.js";
import type { Distribution } from "./contract.js";
import { STEPS_ACCURACY, listAt, real } from "./parts.js";
import { stepsPass } from "./tables.js";

/** Values at most: they stand in the record of every study. */
export const MOST_OBSERVATIONS = 65536;

export const empirical: Distribution = {
  title: "Empirical",
  citation: "Efron & Tibshirani, An Introduction to the Bootstrap, Chapman & Hall 1993, ch. 4",
  discrete: true,
  accuracy: STEPS_ACCURACY,
  parameters: {
    values: { ...real("The observations, in any order; or `file` and `column` of a CSV file."), list: true },
  },
  check(given) {
    const { length } = listAt(given, "values");
    return length <= MOST_OBSERVATIONS
      ? null
      : `expected at most ${MOST_OBSERVATIONS} observations, found ${length}; thin them`;
  },
  law(given) {
    const values = listAt(given, "values").toSorted((a, b) => a - b);
    const mean = values.reduce((sum, x) => sum + x, 0) / values.length;
    return {
      mean,
      variance: values.reduce((sum, x) => sum + (x - mean) ** 2, 0) / values.length,
      support: [values[0] ?? Number.NaN, values.at(-1) ?? Number.NaN],
      density: (x) => values.filter((value) => value === x).length / values.length,
      passes: () =>
        stepsPass(`empirical ${values.join()}`, () => ({ values, weights: values.map(() => fromNumber(1)) })),
    };
  },
};

/** A law given value by value: `values` in ascending order with their `probabilities`, whose sum must be 1. */
import { fromNumber } from "../../numeric/double-double.js";
import type { Distribution, Parameter } from "./contract.js";
import { STEPS_ACCURACY, listAt, real } from "./parts.js";
import { stepsPass } from "./tables.js";

const probabilities: Parameter = {
  about: "Their probabilities; a sum within 1e-9 of 1 is brought to 1.",
  what: "a probability from 0 to 1",
  holds: (p) => p >= 0 && p <= 1,
  list: true,
};

export const table: Distribution = {
  title: "Table of values",
  citation: "Chen & Asau, AIIE Transactions 6 (1974) 163-166 (look-up)",
  discrete: true,
  accuracy: STEPS_ACCURACY,
  parameters: { values: { ...real("The values, ascending."), list: true }, probabilities },
  check(given) {
    const [values, shares] = [listAt(given, "values"), listAt(given, "probabilities")];
    if (values.length !== shares.length) {
      return `expected as many probabilities as values, found ${shares.length} for ${values.length}`;
    }
    if (values.some((x, i) => i > 0 && !(x > (values[i - 1] ?? 0)))) {
      return "expected values in ascending order, each once; sort them";
    }
    const sum = shares.reduce((a, b) => a + b, 0);
    return Math.abs(sum - 1) <= 1e-9 ? null : `expected probabilities with the sum 1, found ${sum}`;
  },
  law(given) {
    const [values, shares] = [listAt(given, "values"), listAt(given, "probabilities")];
    const total = shares.reduce((a, b) => a + b, 0);
    const moment = (f: (x: number) => number): number =>
      values.reduce((sum, x, i) => sum + (f(x) * (shares[i] ?? 0)) / total, 0);
    const mean = moment((x) => x);
    return {
      mean,
      variance: moment((x) => (x - mean) ** 2),
      support: [values[0] ?? Number.NaN, values.at(-1) ?? Number.NaN],
      density: (x) => (shares[values.indexOf(x)] ?? 0) / total,
      passes: () =>
        stepsPass(`table ${values.join()} ${shares.join()}`, () => ({
          values,
          weights: shares.map(fromNumber),
        })),
    };
  },
};

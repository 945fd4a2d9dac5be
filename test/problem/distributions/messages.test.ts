/** What is said of parameters that are missing, unknown, out of range or at odds with each other. */
import { expect, test } from "vitest";
import { fileWith, refusal } from "../text.js";

const CASES = [
  [
    "{ x: { distribution: gamma } }",
    "shape is missing; gamma needs it: expected a number from 0.02 to 1000000",
  ],
  ["{ x: { distribution: gamma, shape: 2, rate: 1 } }", 'unknown key "rate" in inputs.x'],
  [
    "{ x: { distribution: gamma, shape: 0 } }",
    "inputs.x.shape: expected a number from 0.02 to 1000000, found 0",
  ],
  [
    "{ x: { distribution: gamma, shape: [1, 2] } }",
    "inputs.x.shape: expected a number from 0.02 to 1000000, found [1,2]",
  ],
  [
    "{ x: { distribution: uniform, from: 2, to: 1 } }",
    "inputs.x: expected from below to; exchange or change them",
  ],
  [
    "{ x: { distribution: normal, deviation: -1 } }",
    "inputs.x.deviation: expected a number from 1e-100 to 1e100, found -1",
  ],
  ["{ x: { distribution: normal, deviation: k } }", 'inputs.x.deviation: unknown name "k"'],
  [
    "{ x: { distribution: poisson, mean: .inf } }",
    "inputs.x.mean: expected a number, a formula, or a list of them",
  ],
  [
    "{ x: { distribution: binomial, trials: 2.5, probability: 0.5 } }",
    "inputs.x.trials: expected a whole number from 1 to",
  ],
  ["{ x: { distribution: geometric, probability: 1e-6 } }", "a discrete law needs 1 to 1048576 values"],
  [
    "{ x: { distribution: table, values: [1, 2], probabilities: [0.5] } }",
    "expected as many probabilities as values, found 1 for 2",
  ],
  [
    "{ x: { distribution: table, values: [2, 1], probabilities: [0.5, 0.5] } }",
    "expected values in ascending order",
  ],
  [
    "{ x: { distribution: table, values: [1, 2], probabilities: [0.5, 0.6] } }",
    "expected probabilities with the sum 1, found 1.1",
  ],
  [
    "{ x: { distribution: table, values: 3, probabilities: [1] } }",
    "inputs.x.values: expected a list of numbers, found 3",
  ],
  [
    "{ x: { distribution: truncated-normal, from: 50 } }",
    "expected an interval that begins within 30 deviations of the mean",
  ],
  [
    "{ x: { distribution: inverse-gaussian, shape: 1e-9 } }",
    "expected shape / mean from 0.001 to 1000000, found 1e-9",
  ],
] as const;

test.each(CASES)("%s", async (inputs, message) => {
  const lines = await refusal(fileWith({ inputs, integrand: "1" }));
  expect(lines.join("\n")).toContain(message);
});

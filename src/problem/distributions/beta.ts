/** Beta on (0, 1): density x^(alpha - 1) (1 - x)^(beta - 1); the quantile by a table of its log odds. */
import { add, fromNumber } from "../../numeric/double-double.js";
import { logGamma } from "../../numeric/gamma.js";
import { logLaw } from "../../numeric/log-law.js";
import type { LogLaw } from "../../numeric/log-law.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_2, PIECES_ACCURACY, between, numberAt } from "./parts.js";
import { bothTails, piecesPass } from "./tables.js";

/** The odds x / (1 - x) of a beta. */
export function oddsLaw(alpha: number, beta: number): LogLaw {
  return logLaw({ a: alpha, e: add(fromNumber(-alpha), fromNumber(-beta)) });
}

/** ln B(alpha, beta). */
export function logBeta(alpha: number, beta: number): number {
  return logGamma(alpha) + logGamma(beta) - logGamma(alpha + beta);
}

export const beta: Distribution = {
  title: "Beta",
  citation: `${JOHNSON_2}, ch. 25`,
  discrete: false,
  accuracy: PIECES_ACCURACY,
  parameters: { alpha: between("First shape.", 0.05, 1e5), beta: between("Second shape.", 0.05, 1e5) },
  law(values) {
    const [a, b] = [numberAt(values, "alpha"), numberAt(values, "beta")];
    return {
      mean: a / (a + b),
      variance: (a * b) / ((a + b) ** 2 * (a + b + 1)),
      support: [0, 1],
      density: (x) => Math.exp((a - 1) * Math.log(x) + (b - 1) * Math.log1p(-x) - logBeta(a, b)),
      passes: () => piecesPass(`beta ${a} ${b}`, () => bothTails(oddsLaw(a, b), 1, 1, [0, 1])),
    };
  },
};

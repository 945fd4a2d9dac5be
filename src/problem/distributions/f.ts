/** F: the odds of a beta of half the degrees of freedom, times denominator / numerator. */
import type { Distribution } from "./contract.js";
import { logBeta, oddsLaw } from "./beta.js";
import { JOHNSON_2, PIECES_ACCURACY, between, numberAt } from "./parts.js";
import { bothTails, piecesPass } from "./tables.js";

export const f: Distribution = {
  title: "F",
  citation: `${JOHNSON_2}, ch. 27`,
  discrete: false,
  accuracy: PIECES_ACCURACY,
  parameters: {
    numerator: between("Degrees of freedom of the numerator.", 0.1, 1e5),
    denominator: between("Degrees of freedom of the denominator.", 0.1, 1e5),
  },
  law(values) {
    const [m, n] = [numberAt(values, "numerator"), numberAt(values, "denominator")];
    const density = (x: number): number => {
      const y = (m * x) / n;
      return Math.exp((m / 2) * Math.log(y) - ((m + n) / 2) * Math.log1p(y) - logBeta(m / 2, n / 2)) / x;
    };
    return {
      mean: n > 2 ? n / (n - 2) : Infinity,
      variance: n > 4 ? (2 * n ** 2 * (m + n - 2)) / (m * (n - 2) ** 2 * (n - 4)) : Infinity,
      support: [0, Infinity],
      density,
      passes: () =>
        piecesPass(`f ${m} ${n}`, () => bothTails(oddsLaw(m / 2, n / 2), 0, n / m, [0, Infinity])),
    };
  },
};

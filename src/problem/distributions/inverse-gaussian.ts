/** Inverse Gaussian (mean, shape): first passage of a drifting Brownian motion; the quantile by a table. */
import { logLaw } from "../../numeric/log-law.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_1, PIECES_ACCURACY, between, numberAt, positive } from "./parts.js";
import { bothTails, piecesPass } from "./tables.js";

export const inverseGaussian: Distribution = {
  title: "Inverse Gaussian",
  citation: `${JOHNSON_1}, ch. 15`,
  discrete: false,
  accuracy: PIECES_ACCURACY,
  parameters: { mean: positive("Mean.", 1), shape: positive("Shape; the variance is mean^3 / shape.") },
  check(values) {
    const ratio = numberAt(values, "shape") / numberAt(values, "mean");
    return between("", 1e-3, 1e6).holds(ratio)
      ? null
      : `expected shape / mean from 0.001 to 1000000, found ${ratio}`;
  },
  law(values) {
    const [m, s] = [numberAt(values, "mean"), numberAt(values, "shape")];
    const ratio = s / m;
    return {
      mean: m,
      variance: m ** 3 / s,
      support: [0, Infinity],
      density: (x) =>
        Math.sqrt(s / (2 * Math.PI * x ** 3)) * Math.exp((-s * (x - m) ** 2) / (2 * m ** 2 * x)),
      passes: () =>
        piecesPass(`inverse-gaussian ${m} ${s}`, () =>
          bothTails(logLaw({ a: -0.5, b: -ratio / 2, d: ratio / 2 }), 0, m, [0, Infinity]),
        ),
    };
  },
};

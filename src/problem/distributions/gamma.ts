/** Gamma: density x^(shape - 1) e^(-x / scale); the quantile by a table. */
import { logGamma } from "../../numeric/gamma.js";
import { logLaw } from "../../numeric/log-law.js";
import type { Distribution, Law } from "./contract.js";
import { JOHNSON_1, PIECES_ACCURACY, between, numberAt, positive } from "./parts.js";
import { bothTails, piecesPass } from "./tables.js";

export function gammaLaw(shape: number, scale: number): Law {
  return {
    mean: shape * scale,
    variance: shape * scale ** 2,
    support: [0, Infinity],
    density: (x) => Math.exp((shape - 1) * Math.log(x / scale) - x / scale - logGamma(shape)) / scale,
    passes: () =>
      piecesPass(`gamma ${shape} ${scale}`, () =>
        bothTails(logLaw({ a: shape, b: -1 }), 0, scale, [0, Infinity]),
      ),
  };
}

export const gamma: Distribution = {
  title: "Gamma",
  citation: `${JOHNSON_1}, ch. 17; quantile by series: Steinbrecher & Shaw, European J. Applied Math. 19 (2008) 87-112`,
  discrete: false,
  accuracy: PIECES_ACCURACY,
  parameters: { shape: between("Shape.", 0.02, 1e6), scale: positive("Scale.", 1) },
  law: (values) => gammaLaw(numberAt(values, "shape"), numberAt(values, "scale")),
};

/** Student's t: x^2 / degrees are the odds of a beta (1/2, degrees / 2); the table gives log(x / (u - 1/2)), which has no zero. */
import { fromNumber, logarithm, scaled } from "../../numeric/double-double.js";
import { normalise } from "../../numeric/log-law.js";
import type { QuantileLaw } from "../../numeric/quantile-table.js";
import { logBeta, oddsLaw } from "./beta.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_2, PIECES_ACCURACY, between, numberAt, positive, real } from "./parts.js";
import { piecesPass } from "./tables.js";

function quantileLaw(degrees: number, location: number, scale: number): QuantileLaw {
  const law = normalise(oddsLaw(0.5, degrees / 2));
  const side = { law, direction: 1, base: 0, sign: 1 } as const;
  const half = scaled(logarithm(fromNumber(degrees)), 0.5);
  return { form: 2, left: side, right: side, location, scale, support: [-Infinity, Infinity], half };
}

export const student: Distribution = {
  title: "Student's t",
  citation: `${JOHNSON_2}, ch. 28; Shaw, J. Computational Finance 9 (2006) 37-73`,
  discrete: false,
  accuracy: PIECES_ACCURACY,
  parameters: {
    degrees: between("Degrees of freedom.", 0.1, 1e5),
    location: real("Location, the median.", 0),
    scale: positive("Scale.", 1),
  },
  law(values) {
    const [nu, location, scale] = [
      numberAt(values, "degrees"),
      numberAt(values, "location"),
      numberAt(values, "scale"),
    ];
    const density = (x: number): number => {
      const z = (x - location) / scale;
      const log = -0.5 * (nu + 1) * Math.log1p((z * z) / nu) - logBeta(0.5, nu / 2) - 0.5 * Math.log(nu);
      return Math.exp(log) / scale;
    };
    return {
      mean: nu > 1 ? location : Number.NaN,
      variance: nu > 2 ? (scale ** 2 * nu) / (nu - 2) : nu > 1 ? Infinity : Number.NaN,
      support: [-Infinity, Infinity],
      density,
      passes: () => piecesPass(`student ${nu} ${location} ${scale}`, () => quantileLaw(nu, location, scale)),
    };
  },
};

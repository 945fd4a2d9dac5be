/** Weibull: scale (-log(1 - u))^(1 / shape). */
import { logGamma } from "../../numeric/gamma.js";
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_1, between, closed, numberAt, positive } from "./parts.js";

export const weibull: Distribution = {
  title: "Weibull",
  citation: `${JOHNSON_1}, ch. 21`,
  discrete: false,
  accuracy: "a few units in the last place, times 1 + 1 / shape",
  parameters: { shape: between("Shape; 1 is exponential.", 0.01, 1e6), scale: positive("Scale.", 1) },
  law(values) {
    const [k, scale] = [numberAt(values, "shape"), numberAt(values, "scale")];
    const moment = (r: number): number => Math.exp(logGamma(1 + r / k));
    return {
      mean: scale * moment(1),
      variance: scale ** 2 * (moment(2) - moment(1) ** 2),
      support: [0, Infinity],
      density: (x) => (k / scale) * (x / scale) ** (k - 1) * Math.exp(-((x / scale) ** k)),
      passes: () => [closed(CLOSED.weibull, 0, scale, 1 / k)],
    };
  },
};

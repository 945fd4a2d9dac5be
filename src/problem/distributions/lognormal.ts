/** Lognormal: exp(logMean + logDeviation z), z standard normal. */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_1, between, closed, numberAt, real } from "./parts.js";

export const lognormal: Distribution = {
  title: "Lognormal",
  citation: `${JOHNSON_1}, ch. 14; Wichura (AS 241, 1988) for z`,
  discrete: false,
  accuracy: "about 1e-15 (1 + |log x|) relative",
  parameters: {
    logMean: real("Mean of the logarithm.", 0),
    logDeviation: between("Standard deviation of the logarithm.", 1e-6, 50, 1),
  },
  law(values) {
    const [m, s] = [numberAt(values, "logMean"), numberAt(values, "logDeviation")];
    return {
      mean: Math.exp(m + s ** 2 / 2),
      variance: Math.expm1(s ** 2) * Math.exp(2 * m + s ** 2),
      support: [0, Infinity],
      density: (x) => Math.exp(-0.5 * ((Math.log(x) - m) / s) ** 2) / (x * s * Math.sqrt(2 * Math.PI)),
      passes: () => [{ kind: "normal" }, closed(CLOSED.exponentialOfNormal, m, s)],
    };
  },
};

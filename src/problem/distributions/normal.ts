/** Normal: mean + deviation z, z by M. J. Wichura's AS 241 (kernels/assembly/math/normal-quantile.ts). */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { closed, numberAt, positive, real } from "./parts.js";

export const normal: Distribution = {
  title: "Normal",
  citation: "Wichura, Algorithm AS 241, Applied Statistics 37 (1988) 477-484, PPND16",
  discrete: false,
  accuracy: "about 1e-15 relative in z",
  parameters: { mean: real("Mean.", 0), deviation: positive("Standard deviation.", 1) },
  law(values) {
    const [mean, deviation] = [numberAt(values, "mean"), numberAt(values, "deviation")];
    const standard = mean === 0 && deviation === 1;
    return {
      mean,
      variance: deviation ** 2,
      support: [-Infinity, Infinity],
      density: (x) => Math.exp(-0.5 * ((x - mean) / deviation) ** 2) / (deviation * Math.sqrt(2 * Math.PI)),
      passes: () =>
        standard ? [{ kind: "normal" }] : [{ kind: "normal" }, closed(CLOSED.identity, mean, deviation)],
    };
  },
};

/** Cauchy: location + scale tan(pi (u - 1/2)). It has no mean. */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { CLOSED_ACCURACY, JOHNSON_1, closed, numberAt, positive, real } from "./parts.js";

export const cauchy: Distribution = {
  title: "Cauchy",
  citation: `${JOHNSON_1}, ch. 16`,
  discrete: false,
  accuracy: CLOSED_ACCURACY,
  parameters: { location: real("Location, the median.", 0), scale: positive("Scale.", 1) },
  law(values) {
    const [location, scale] = [numberAt(values, "location"), numberAt(values, "scale")];
    return {
      mean: Number.NaN,
      variance: Number.NaN,
      support: [-Infinity, Infinity],
      density: (x) => 1 / (Math.PI * scale * (1 + ((x - location) / scale) ** 2)),
      passes: () => [closed(CLOSED.cauchy, location, scale)],
    };
  },
};

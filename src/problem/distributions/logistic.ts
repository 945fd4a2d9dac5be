/** Logistic: location + scale log(u / (1 - u)). */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { CLOSED_ACCURACY, JOHNSON_2, closed, numberAt, positive, real } from "./parts.js";

export const logistic: Distribution = {
  title: "Logistic",
  citation: `${JOHNSON_2}, ch. 23`,
  discrete: false,
  accuracy: CLOSED_ACCURACY,
  parameters: { location: real("Location, the mean.", 0), scale: positive("Scale.", 1) },
  law(values) {
    const [location, scale] = [numberAt(values, "location"), numberAt(values, "scale")];
    return {
      mean: location,
      variance: (Math.PI * scale) ** 2 / 3,
      support: [-Infinity, Infinity],
      density: (x) => 1 / (4 * scale * Math.cosh((x - location) / (2 * scale)) ** 2),
      passes: () => [closed(CLOSED.logistic, location, scale)],
    };
  },
};

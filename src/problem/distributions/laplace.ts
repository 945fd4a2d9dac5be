/** Laplace: location -+ scale log(2 min(u, 1 - u)). */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { CLOSED_ACCURACY, JOHNSON_2, closed, numberAt, positive, real } from "./parts.js";

export const laplace: Distribution = {
  title: "Laplace",
  citation: `${JOHNSON_2}, ch. 24`,
  discrete: false,
  accuracy: CLOSED_ACCURACY,
  parameters: { location: real("Location, the mean.", 0), scale: positive("Scale.", 1) },
  law(values) {
    const [location, scale] = [numberAt(values, "location"), numberAt(values, "scale")];
    return {
      mean: location,
      variance: 2 * scale ** 2,
      support: [-Infinity, Infinity],
      density: (x) => Math.exp(-Math.abs(x - location) / scale) / (2 * scale),
      passes: () => [closed(CLOSED.laplace, location, scale)],
    };
  },
};

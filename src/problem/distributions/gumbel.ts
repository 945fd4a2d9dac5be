/** Gumbel: location - scale log(-log u), the law of largest values. */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { CLOSED_ACCURACY, JOHNSON_2, closed, numberAt, positive, real } from "./parts.js";

/** Euler's constant, DLMF 5.2.3. */
const EULER = 0.5772156649015329;

const gumbelDensity = (z: number): number => Math.exp(-z - Math.exp(-z));

export const gumbel: Distribution = {
  title: "Gumbel",
  citation: `${JOHNSON_2}, ch. 22`,
  discrete: false,
  accuracy: CLOSED_ACCURACY,
  parameters: { location: real("Location, the mode.", 0), scale: positive("Scale.", 1) },
  law(values) {
    const [location, scale] = [numberAt(values, "location"), numberAt(values, "scale")];
    return {
      mean: location + EULER * scale,
      variance: (Math.PI * scale) ** 2 / 6,
      support: [-Infinity, Infinity],
      density: (x) => gumbelDensity((x - location) / scale) / scale,
      passes: () => [closed(CLOSED.gumbel, location, scale)],
    };
  },
};

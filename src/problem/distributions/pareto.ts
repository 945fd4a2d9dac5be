/** Pareto (first kind): scale (1 - u)^(-1 / shape), from scale upwards. */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { JOHNSON_1, between, closed, numberAt, positive } from "./parts.js";

export const pareto: Distribution = {
  title: "Pareto",
  citation: `${JOHNSON_1}, ch. 20`,
  discrete: false,
  accuracy: "a few units in the last place, times 1 + 1 / shape",
  parameters: {
    shape: between("Tail index: moments of this order and above diverge.", 0.1, 1e6),
    scale: positive("Least value.", 1),
  },
  law(values) {
    const [a, scale] = [numberAt(values, "shape"), numberAt(values, "scale")];
    return {
      mean: a > 1 ? (a * scale) / (a - 1) : Infinity,
      variance: a > 2 ? (scale ** 2 * a) / ((a - 1) ** 2 * (a - 2)) : Infinity,
      support: [scale, Infinity],
      density: (x) => (a / scale) * (x / scale) ** (-a - 1),
      passes: () => [closed(CLOSED.pareto, 0, scale, -1 / a)],
    };
  },
};

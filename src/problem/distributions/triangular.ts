/** Triangular: density rising from `from` to `mode` and falling to `to`. */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { CLOSED_ACCURACY, JOHNSON_2, closed, numberAt, real } from "./parts.js";

export const triangular: Distribution = {
  title: "Triangular",
  citation: `${JOHNSON_2}, ch. 26.9`,
  discrete: false,
  accuracy: CLOSED_ACCURACY,
  parameters: { from: real("Lower end.", 0), mode: real("Place of the peak."), to: real("Upper end.", 1) },
  check(values) {
    const [from, mode, to] = [numberAt(values, "from"), numberAt(values, "mode"), numberAt(values, "to")];
    return from < to && from <= mode && mode <= to
      ? null
      : "expected from ≤ mode ≤ to and from below to; change them";
  },
  law(values) {
    const [a, c, b] = [numberAt(values, "from"), numberAt(values, "mode"), numberAt(values, "to")];
    const width = b - a;
    return {
      mean: (a + b + c) / 3,
      variance: (width ** 2 - (c - a) * (b - c)) / 18,
      support: [a, b],
      density: (x) => (x < c ? (2 * (x - a)) / (width * (c - a)) : (2 * (b - x)) / (width * (b - c))),
      passes: () => [closed(CLOSED.triangular, a, width, (c - a) / width)],
    };
  },
};

/** Uniform on an interval: from + (to - from) u. */
import { CLOSED } from "./contract.js";
import type { Distribution } from "./contract.js";
import { CLOSED_ACCURACY, JOHNSON_2, closed, numberAt, real } from "./parts.js";

export const uniform: Distribution = {
  title: "Uniform",
  citation: `${JOHNSON_2}, ch. 26`,
  discrete: false,
  accuracy: CLOSED_ACCURACY,
  parameters: { from: real("Lower end.", 0), to: real("Upper end.", 1) },
  check: (values) =>
    numberAt(values, "from") < numberAt(values, "to")
      ? null
      : "expected from below to; exchange or change them",
  law(values) {
    const [from, to] = [numberAt(values, "from"), numberAt(values, "to")];
    const width = to - from;
    return {
      mean: from + width / 2,
      variance: width ** 2 / 12,
      support: [from, to],
      density: () => 1 / width,
      passes: () => (from === 0 && to === 1 ? [] : [closed(CLOSED.identity, from, width)]),
    };
  },
};

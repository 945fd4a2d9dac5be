/** Chi-squared with any positive degrees of freedom: twice a gamma of shape degrees / 2. */
import type { Distribution } from "./contract.js";
import { gammaLaw } from "./gamma.js";
import { JOHNSON_1, PIECES_ACCURACY, between, numberAt } from "./parts.js";

export const chiSquared: Distribution = {
  title: "Chi-squared",
  citation: `${JOHNSON_1}, ch. 18`,
  discrete: false,
  accuracy: PIECES_ACCURACY,
  parameters: { degrees: between("Degrees of freedom.", 0.04, 1e6) },
  law: (values) => gammaLaw(numberAt(values, "degrees") / 2, 2),
};

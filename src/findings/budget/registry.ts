/** The lines of a budget in the order in which they are shown. A new line is its file and its entry here. */
import { arithmeticLine } from "./arithmetic.js";
import { declaredLines } from "./declared.js";
import { finiteLine } from "./finite.js";
import type { LineMaker } from "./line.js";
import { periodLine } from "./period.js";
import { referenceLine } from "./reference-line.js";
import { resolutionLine } from "./resolution.js";
import { samplingLine } from "./sampling.js";
import { structureBudgetLine } from "./structure.js";
import { transformLine } from "./transform.js";

export const LINES: readonly LineMaker[] = [
  samplingLine,
  structureBudgetLine,
  finiteLine,
  resolutionLine,
  transformLine,
  arithmeticLine,
  referenceLine,
  declaredLines,
  periodLine,
];

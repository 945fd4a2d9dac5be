/** Upper limits of a mean of paired differences. */
import { clopperPearson } from "../../numeric/binomial.js";
import type { PairedMean } from "../../record/measurements.js";

/**
 * |mean| + factor standard errors; for a condition (differences -1, 0, 1 over `amplification`) Clopper and Pearson's limit
 * (1934) of the chance of a change, over `amplification`, which holds where none was seen.
 */
export function limitOf(
  found: PairedMean,
  factor: number,
  confidence: number,
  amplification: number,
  condition: boolean,
): { value: number; counted: boolean } {
  if (!condition) return { value: Math.abs(found.bias) + factor * found.standardError, counted: false };
  const [, most] = clopperPearson(found.changed, found.points, confidence);
  return { value: most / amplification, counted: true };
}

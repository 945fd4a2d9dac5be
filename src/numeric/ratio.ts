/**
 * A ratio of means over replicates with Student's interval from its linearised residuals (delta method; W. G. Cochran,
 * Sampling Techniques, 3rd ed. (1977), 6.3-6.4). Good where the denominator is known to a few per cent; the bias is of
 * order 1 / replicates of the variance.
 */
import { deviation } from "./moments.js";
import { studentFactor } from "./student.js";
import { mean } from "./sums.js";

export interface Ratio {
  readonly value: number;
  readonly interval: readonly [number, number];
}

/**
 * mean(top) / mean(bottom), replicate by replicate in the same order, at least two of them; `confidence` in (0, 1). Throws
 * RangeError where the means of `bottom` are not above 0.
 */
export function ratioOf(top: readonly number[], bottom: readonly number[], confidence: number): Ratio {
  const below = mean(bottom);
  if (!(below > 0)) throw new RangeError(`ratio: expected a denominator above 0, found ${below}`);
  const value = mean(top) / below;
  const residuals = top.map((one, r) => one - value * (bottom[r] as number));
  const error = deviation(residuals) / below / Math.sqrt(top.length);
  const half = studentFactor(confidence, top.length - 1) * error;
  return { value, interval: [value - half, value + half] };
}

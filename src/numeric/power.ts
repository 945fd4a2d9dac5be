/**
 * The smallest bias that a two-sided test finds with a given power: (t_{1 - level/2} + t_{power}) standard errors, both
 * quantiles with the degrees of freedom of the standard error. This is the usual sample-size formula (Snedecor & Cochran,
 * Statistical Methods, 8th ed. 1989, section 6.14) with t in place of normal quantiles. Its true power, by the non-central
 * t, is a little below the nominal 80 % at strict levels: with 31 degrees of freedom 80.0 % at level 0.05 and 78.8 % at
 * 0.1/144, with 15 degrees 80.0 % and 77.2 % (SciPy 1.17.1, stats.nct).
 */
import { normalUpperQuantile } from "./normal.js";
import { studentUpperQuantile } from "./student.js";

const DETECTION_POWER = 0.8;

/** `degrees` Infinity means a known standard error (normal quantiles). */
export function detectableShift(
  standardError: number,
  level: number,
  degrees: number,
  power = DETECTION_POWER,
): number {
  const quantile = (q: number) =>
    degrees === Infinity ? normalUpperQuantile(q) : studentUpperQuantile(q, degrees);
  return (quantile(level / 2) + quantile(1 - power)) * standardError;
}

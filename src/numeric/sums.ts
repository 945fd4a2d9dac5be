/**
 * Compensated summation: Neumaier, "Rundungsfehleranalyse einiger Verfahren zur Summation endlicher Summen", ZAMM 54
 * (1974) 39-51. The error is a few units in the last place of the result plus n^2 eps^2 times the sum of magnitudes.
 * For the statistics of a study (some hundred numbers); estimates are summed in the kernels.
 */
export function sum(values: Iterable<number>): number {
  let total = 0;
  let lost = 0;
  for (const value of values) {
    const next = total + value;
    lost += Math.abs(total) >= Math.abs(value) ? total - next + value : value - next + total;
    total = next;
  }
  // An infinite total makes the correction NaN; the plain total is the honest answer then.
  return Number.isFinite(total) ? total + lost : total;
}

/** Arithmetic mean; NaN for an empty list. */
export function mean(values: readonly number[]): number {
  return sum(values) / values.length;
}

/**
 * Holm's step-down adjustment of p-values (Holm, Scandinavian Journal of Statistics 6 (1979) 65-70): rejecting where the
 * adjusted value is at most a level holds the family-wise error rate at that level whatever the dependence of the tests.
 */

/** Adjusted p-values in the order given. `familySize`, if above the count, counts tests that are not listed. */
export function holm(pValues: readonly number[], familySize = pValues.length): number[] {
  const order = pValues.map((p, index) => ({ p, index })).sort((a, b) => a.p - b.p);
  const adjusted = new Array<number>(pValues.length).fill(1);
  let running = 0;
  order.forEach(({ p, index }, rank) => {
    running = Math.max(running, Math.min(1, p * (familySize - rank)));
    adjusted[index] = running;
  });
  return adjusted;
}

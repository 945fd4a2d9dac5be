/** What a study may ask of a quantity other than a mean: no estimators of means, and sizes that it can be read from. */
import type { Problem } from "../problem/contract.js";
import type { FullSettings } from "../problem/defaults.js";
import { MOST_SORTED, isMean, levelOf, quantityForm, quantityName } from "../problem/quantity.js";
import { LARGEST_IN_USE, REFERENCE_FACTOR } from "./spec.js";

/**
 * The settings with sizes that the quantity can be read from; those too small for it are left out and said. Throws a
 * RangeError where none is left, where a replicate would hold too many values, and for estimators of means.
 */
export function fitQuantity(
  { id, quantity, inUse, reference }: Problem,
  settings: FullSettings,
  warnings: string[],
): FullSettings {
  if (isMean(quantity)) return settings;
  const name = quantityName(quantity);
  const { estimators, sizes } = settings;
  if (estimators.join() !== "crude")
    throw new RangeError(
      `estimators: those of a mean do not apply to the ${name} of "${id}", found ${estimators.join(", ")}; leave out estimators`,
    );
  if (!quantityForm(quantity).sorted) return settings;
  const level = levelOf(quantity);
  // Levels are decimal fractions: 1 / (1 - 0.999) is 1000 but for rounding.
  const least = Math.ceil((1 - 1e-9) / Math.min(level, 1 - level));
  const fitting = sizes.filter((n) => n >= least);
  if (fitting.length === 0)
    throw new RangeError(
      `sizes: the ${name} of "${id}" needs at least ${least} points, found ${sizes.join(", ")}; take larger ones (--sizes)`,
    );
  if (fitting.length < sizes.length)
    warnings.push(`${id}: sizes below ${least} points are left out, its ${name} cannot be read from them.`);
  // Without a reference the consensus takes more points than any size.
  const factor = reference === null ? REFERENCE_FACTOR : 1;
  const run = inUse !== null && inUse.points <= LARGEST_IN_USE ? inUse.points : 0;
  const largest = Math.max(factor * Math.max(...fitting), run);
  if (largest > MOST_SORTED)
    throw new RangeError(
      `sizes: the ${name} of "${id}" keeps all values of a replicate, at most ${MOST_SORTED} (2^24), found ${largest}${factor > 1 ? ` for the consensus, ${factor} times the largest size` : ""}; take fewer points${factor > 1 ? ", or give a reference" : ""}`,
    );
  return { ...settings, sizes: fitting };
}

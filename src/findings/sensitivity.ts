/**
 * What shares of the variance say: how many inputs work together, how many matter, how smooth the integrand looks to a net,
 * and what a quasi-random source can make of it. Pure.
 */
import type {
  Between,
  NetOrder,
  Sensitivity,
  SensitivityMeasures,
  Smoothness,
} from "../record/sensitivity.js";

/** The share of the variance that may be left over (Caflisch, Morokoff & Owen 1997 take 99 %). */
const LEFT_OVER = 0.01;

/**
 * Superposition dimension at 99 % (Caflisch, Morokoff & Owen 1997): the least s such that parts of at most s coordinates
 * hold so much of the variance. Of the shares p_k of the orders k, p_1 and (where all pairs were looked at) p_2 are
 * known, and D = sum of k p_k, the mean dimension. Of the orders above s there is at most (D - 1) / s, and
 * (D - 1 - p_2) / s for s >= 2, since each of order k > s has k - 1 >= s; and at least (D - s) / (d - s).
 */
export function superposition(measures: SensitivityMeasures, dimension: number): Between {
  const { allAlone, allPairs, meanDimension, grouped } = measures;
  const [lowD, highD] = meanDimension.interval;
  // in groups, what units decide alone holds parts of several coordinates
  const mostSum = (s: number): number => {
    if (grouped || s > 2 || (s === 2 && allPairs === null)) return 1;
    return allAlone.interval[1] + (s === 2 ? (allPairs?.interval[1] ?? 0) : 0);
  };
  const leastSum = (s: number): number => {
    if (grouped || s > 2 || (s === 2 && allPairs === null)) return 0;
    return allAlone.interval[0] + (s === 2 ? (allPairs?.interval[0] ?? 0) : 0);
  };
  const pairs = grouped ? 0 : Math.max(0, allPairs?.interval[0] ?? 0);
  const enough = (s: number): boolean => {
    if (s >= dimension || leastSum(s) >= 1 - LEFT_OVER) return true;
    return (highD - 1 - (s >= 2 ? pairs : 0)) / s <= LEFT_OVER;
  };
  const tooFew = (s: number): boolean => {
    if (s >= dimension) return false;
    return mostSum(s) < 1 - LEFT_OVER || (lowD - s) / (dimension - s) > LEFT_OVER;
  };
  let atLeast = 1;
  while (tooFew(atLeast)) atLeast++;
  let atMost = atLeast;
  while (!enough(atMost)) atMost++;
  return { atLeast, atMost };
}

/** Without figures where the variance is not finite; `divergent` by problem id, in words. */
export function withdrawn(
  sensitivity: readonly Sensitivity[],
  divergent: ReadonlyMap<string, string>,
): Sensitivity[] {
  return sensitivity.map((one) => {
    const reason = divergent.get(one.problem);
    return reason === undefined || one.measures === null ? one : { ...one, measures: null, reason, nets: [] };
  });
}

/** `rough`: not as a smooth integrand, but like a kinked and a jumping one alike. */
export type Looks = "smooth" | "kinked" | "jumping" | "rough" | "untold";

const half = ({ interval: [low, high] }: NetOrder): number => (high - low) / 2;

/**
 * By the companions from which the integrand's order does not differ, at the level of the intervals (half-widths of
 * independent orders added in quadrature), or else the nearest; steeper than all counts as smooth.
 */
export function looksOf({ integrand, smooth, kinked, jumping }: Smoothness): Looks {
  const meets = (other: NetOrder): boolean =>
    Math.abs(integrand.order - other.order) <= Math.hypot(half(integrand), half(other));
  const [asSmooth, asKinked, asJumping] = [meets(smooth), meets(kinked), meets(jumping)];
  if (asSmooth) return asKinked || asJumping ? "untold" : "smooth";
  if (asKinked) return asJumping ? "rough" : "kinked";
  if (asJumping || integrand.order > jumping.order) return "jumping";
  if (integrand.order < smooth.order) return "smooth";
  // like none of them: orders at practical n are no constants of a class, so one that is twice as near as the next will do
  const away = ({ order }: NetOrder): number => Math.abs(integrand.order - order);
  const kinds = { smooth, kinked, jumping };
  const [first, second] = (["smooth", "kinked", "jumping"] as const)
    .map((kind) => ({ kind, by: away(kinds[kind]) }))
    .sort((x, y) => x.by - y.by);
  return first !== undefined && second !== undefined && 2 * first.by <= second.by ? first.kind : "untold";
}

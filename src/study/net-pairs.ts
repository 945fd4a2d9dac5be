/**
 * How evenly nets cover the pairs of coordinates that an integrand was asked about: t of each pair (structure/t-value.ts) at
 * the number of points in use. Digital shifts and scrambles keep t (Owen 1995), so it holds for a randomised net too.
 */
import type { NetPairs, Sensitivity } from "../record/sensitivity.js";
import type { SourceChoice } from "../sources/choice.js";
import { isDigitalNet, netOfSource } from "../structure/net.js";
import { tValue } from "../structure/t-value.js";

/** t is a matter of seconds beyond so many points; those of the first 2^20 say enough. */
const MOST_POINTS = 2 ** 20;

/** One entry for each digital net among `sources`, in order; none where the pairs are not of single coordinates. */
export function netPairs(sensitivity: Sensitivity, sources: readonly SourceChoice[], n: number): NetPairs[] {
  const { measures } = sensitivity;
  if (measures === null || measures.grouped || measures.pairs.length === 0) return [];
  const dimension = measures.units.length;
  return sources.flatMap(({ id, source }): NetPairs[] => {
    if (!isDigitalNet(source) || dimension > source.largestDimension) return [];
    const points = Math.min(source.nearestSize(n), MOST_POINTS);
    const net = netOfSource(source, dimension, source.nearestSize(points));
    const t = measures.pairs.map(({ i, j }) => tValue(net, [i, j]).atMost);
    return [{ source: id, base: net.base, digits: net.digits, t }];
  });
}

/**
 * Period and overlap, a probability: the chance that two of the study's R streams of length L overlap, about R^2 L / period
 * for random starts on one cycle (P. L'Ecuyer et al., Mathematics and Computers in Simulation 135 (2017) 3-17), beside the
 * share of the period that one run uses. Knuth (vol. 2, 3.6) advises at most period/1000; to stay below the square root of
 * the period is common practice for linear generators, without a single source. It is not spent: it is no size of an error.
 */
import { formatCount, formatPercent, formatValue } from "../format.js";
import type { LineMaker } from "./line.js";

export const periodLine: LineMaker = ({ source, series, n }) => {
  if (source === undefined || source.period === null || source.deterministic) return [];
  if (source.family !== "pseudo-random" && source.family !== "own") return [];
  const period = Number(source.period);
  const { dimension, replicates } = series.last;
  const length = n * dimension;
  const value = Math.min(1, (replicates ** 2 * length) / period);
  const share = length / period;
  const rule =
    share > 1 / 1000
      ? "more than the period/1000 that Knuth (vol. 2, 3.6) advises"
      : length > Math.sqrt(period)
        ? "within the period/1000 that Knuth (vol. 2, 3.6) advises, above the square root of the period (common practice)"
        : "below the square root of the period (common practice) and period/1000 (Knuth, vol. 2, 3.6)";
  const basis =
    `one run takes ${formatCount(length, true)} numbers, ${formatShare(share)} of the period, ${rule}; the value is the chance that ` +
    `two of ${formatCount(replicates)} streams overlap`;
  const remedy = share > 1 / 1000 || value > 0.01 ? "a source with a longer period, or fewer points" : null;
  return [
    {
      line: "period and overlap",
      kind: "probability",
      value,
      interval: null,
      basis,
      remedy,
      lower: 0,
    },
  ];
};

function formatShare(share: number): string {
  return share >= 0.001 ? formatPercent(Number(share.toPrecision(2))) : formatValue(share);
}

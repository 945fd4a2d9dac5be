/**
 * Source resolution: the bias that a source of b output bits makes against 52, measured in pairs, with the outermost cells
 * sampled on their own (study/resolution.ts). The line is the upper limit of its size at the problem's confidence.
 */
import { formatCount, formatPercent, formatValue } from "../format.js";
import { notAssessed, type LineMaker } from "./line.js";

const REMEDY = "a source with more output bits, or one that gives the middles of its cells";

export const resolutionLine: LineMaker = ({ context, series, source }) => {
  const all = context.measurements.get(series.problem);
  if (all === undefined)
    return [notAssessed("source resolution", "bias", "not measured in this study", null)];
  const cost = all.resolution.find(({ sources }) => sources.includes(series.source))?.cost;
  const line = { line: "source resolution", kind: "bias" } as const;
  if (cost === undefined) {
    const bits = Math.min(52, source?.outputBits ?? 52);
    const basis = `coordinates of ${bits} bits, the finest there are here: none by definition`;
    return [{ ...line, value: 0, interval: null, basis, remedy: null, lower: 0 }];
  }
  const [low, high] = cost.interval;
  if (!Number.isFinite(low) || !Number.isFinite(high)) {
    return [
      notAssessed("source resolution", "bias", "the integrand is not finite in an outermost cell", REMEDY),
    ];
  }
  const lower = low > 0 || high < 0 ? Math.min(Math.abs(low), Math.abs(high)) : 0;
  const value = Math.max(Math.abs(low), Math.abs(high));
  const basis =
    `${cost.bits} bits${cost.endpoint === "left" ? ", left ends of cells" : ""} against 52 on the same points: ` +
    `${formatPercent(cost.confidence)} limit of ${formatValue(cost.bias, cost.standardError)} ` +
    `(standard error ${formatValue(cost.standardError)}; ${cost.replicates} replicates of ` +
    `${formatCount(cost.points)} points, cells at 0 and 1 apart)`;
  return [{ ...line, value, interval: [lower, value], basis, remedy: REMEDY, lower }];
};

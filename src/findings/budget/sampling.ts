/** Sampling: the replicate deviation of one run of n points, a standard deviation. RMSE is not used: bias has its own line. */
import { isMean, quantityName } from "../../problem/quantity.js";
import { formatCount } from "../format.js";
import type { Spread } from "../spread.js";
import type { LineMaker } from "./line.js";

/** Beyond this multiple of the largest measured n (or below its inverse of the smallest) a figure is extrapolated. */
export const EXTRAPOLATION = 4;

export function isExtrapolated(spread: Spread | null, n: number): boolean {
  return spread !== null && (n > EXTRAPOLATION * spread.largest || n * EXTRAPOLATION < spread.smallest);
}

export const samplingLine: LineMaker = ({ series, problem, n, spread, sigma }) => {
  const quantity = isMean(problem.quantity) ? "" : ` of the ${quantityName(problem.quantity)}`;
  const measured = series.cells.some((cell) => cell.n === n);
  const how = measured
    ? `standard deviation of ${series.last.replicates} replicates`
    : `${isExtrapolated(spread, n) ? "extrapolated" : "read"} from the deviations at ` +
      `${formatCount(spread?.smallest ?? n)} to ${formatCount(spread?.largest ?? n)} points`;
  return [
    {
      line: "sampling",
      kind: "random",
      value: sigma.value,
      interval: sigma.interval,
      basis: `one run of ${formatCount(n)} points; ${how}${quantity}`,
      remedy: "more points, or a source whose error falls faster",
      lower: sigma.interval?.[0] ?? 0,
    },
  ];
};

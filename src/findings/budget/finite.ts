/**
 * Finite n: the bias that a ratio, variance, quantile or shortfall has with sound points, of order 1/n. Its bound is the
 * farther end of the range that the replicates state (twice the leading term), carried to n points. Means have none.
 */
import { formatCount } from "../format.js";
import { rangeAt } from "../finite-bias.js";
import { quantityId } from "../../problem/quantity.js";
import { notAssessed, type LineMaker } from "./line.js";

export const finiteLine: LineMaker = ({ series, problem, n }) => {
  if (series.last.finiteBias === undefined) return [];
  const range = rangeAt(series.last, n);
  const line = "finite n";
  const remedy = "more points: this bias falls as 1/n";
  if (range === null) return [notAssessed(line, "bias", "too few points beyond the level", remedy)];
  const value = Math.max(-range[0], range[1]);
  const basis =
    `twice the leading term of the bias of a ${quantityId(problem.quantity)}, as the replicates of ` +
    `${formatCount(series.last.n)} points estimate it`;
  return [{ line, kind: "bias", value, interval: [0, value], basis, remedy, lower: 0 }];
};

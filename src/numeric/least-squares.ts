/**
 * A straight line by weighted least squares (Gauss 1809), by ml-matrix's QR solution of the weighted, centred design.
 */
import { Matrix, solve } from "ml-matrix";
import { sum } from "./sums.js";

/** y = intercept + slope x. */
export interface Line {
  readonly slope: number;
  readonly intercept: number;
  /** Standard errors if each y has variance 1 / weight. */
  readonly slopeErrorKnown: number;
  /** Standard errors scaled by the residuals, degrees of freedom length - 2; NaN for two points. */
  readonly slopeError: number;
  readonly interceptError: number;
  readonly residualSquares: number;
  /** The slope as a linear function of the y: slope = sum of coefficient times y. */
  readonly slopeCoefficients: readonly number[];
  readonly interceptCoefficients: readonly number[];
}

/** Fits a line; weights are positive and default to 1. At least two different x. */
export function fitLine(x: readonly number[], y: readonly number[], weights?: readonly number[]): Line {
  if (x.length !== y.length || x.length < 2) {
    throw new RangeError(`fitLine: expected two or more pairs, found ${x.length} and ${y.length}`);
  }
  const w = weights ?? x.map(() => 1);
  const at = (list: readonly number[], i: number) => list[i] ?? NaN;
  const total = sum(w);
  const centre = sum(x.map((value, i) => value * at(w, i))) / total;
  const spread = sum(x.map((value, i) => at(w, i) * (value - centre) ** 2));
  if (!(spread > 0)) throw new RangeError("fitLine: expected two or more different x");
  const design = new Matrix(
    x.map((value, i) => [Math.sqrt(at(w, i)), Math.sqrt(at(w, i)) * (value - centre)]),
  );
  const right = Matrix.columnVector(y.map((value, i) => Math.sqrt(at(w, i)) * value));
  const solution = solve(design, right);
  const [level, slope] = [solution.get(0, 0), solution.get(1, 0)];
  const residualSquares = sum(
    x.map((value, i) => at(w, i) * (at(y, i) - level - slope * (value - centre)) ** 2),
  );
  const scale = Math.sqrt(residualSquares / (x.length - 2));
  const slopeCoefficients = x.map((value, i) => (at(w, i) * (value - centre)) / spread);
  const slopeErrorKnown = 1 / Math.sqrt(spread);
  return {
    slope,
    intercept: level - slope * centre,
    slopeErrorKnown,
    slopeError: x.length > 2 ? slopeErrorKnown * scale : NaN,
    interceptError: x.length > 2 ? Math.sqrt(1 / total + (centre * centre) / spread) * scale : NaN,
    residualSquares,
    slopeCoefficients,
    interceptCoefficients: slopeCoefficients.map((c, i) => at(w, i) / total - centre * c),
  };
}

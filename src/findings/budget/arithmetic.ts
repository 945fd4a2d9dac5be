/**
 * Arithmetic: what doubles cost. The compiled formula against itself in 64 digits; for a condition the chance that
 * rounding turns it; and plain sums against compensated ones. Bounds add.
 */
import { studentFactor } from "../../numeric/student.js";
import { formatCount, formatPercent, formatValue } from "../format.js";
import { notAssessed, type LineMaker } from "./line.js";
import { limitOf } from "./limit.js";

const REMEDY = "a formula that loses less to cancellation";

export const arithmeticLine: LineMaker = ({ context, series, confidence }) => {
  const all = context.measurements.get(series.problem);
  const found = all?.arithmetic ?? null;
  if (found === null)
    return [
      notAssessed(
        "arithmetic",
        "bias",
        all === undefined ? "not measured in this study" : "values are not finite",
        null,
      ),
    ];
  const { formula, flips, summation, missing } = found;
  const sums = Math.abs(summation.difference);
  const summed = `sums ${formatValue(sums)} off a compensated sum of ${formatCount(summation.points)} values`;
  if (flips === null && formula === null) {
    const why =
      missing.length > 0 ? `${missing.join(", ")} without a version in 64 digits` : "values are not finite";
    return [notAssessed("arithmetic", "bias", `${why}; ${summed}`, REMEDY)];
  }
  const parts: string[] = [];
  let value = sums;
  if (flips !== null) {
    const { value: chance } = limitOf(flips, 0, confidence, flips.amplification, true);
    value += chance;
    parts.push(
      `${flips.changed} of ${formatCount(flips.points)} conditions change at inputs moved by ` +
        `${formatCount(flips.amplification)} units in the last place: ${formatPercent(confidence)} limit ` +
        `(Clopper\u2013Pearson) ${formatValue(chance)} for one unit`,
    );
  } else if (formula !== null) {
    const factor = studentFactor(confidence, formula.points - 1);
    value += limitOf(formula, factor, confidence, 1, false).value;
    parts.push(
      `the formula against itself in ${formula.digits} digits at ${formatCount(formula.points)} points: ` +
        `${formatPercent(confidence)} limit of ${formatValue(formula.bias, formula.standardError)}`,
    );
  }
  const basis = [...parts, summed].join("; ");
  return [
    {
      line: "arithmetic",
      kind: "bias",
      value,
      interval: [0, value],
      basis,
      remedy: REMEDY,
      lower: 0,
    },
  ];
};

/** Transform: the inverse distribution functions of the inputs against more exact ones, carried through the integrand. */
import type { Input } from "../../problem/contract.js";
import { studentFactor } from "../../numeric/student.js";
import { formatCount, formatPercent, formatValue } from "../format.js";
import { notAssessed, type LineMaker } from "./line.js";
import { limitOf } from "./limit.js";

/** What the quantiles of these inputs were held against. */
function quantileWords(inputs: readonly Input[]): string {
  const normal = "normal inputs against quantiles in 30 digits";
  const all = inputs.every(({ distribution }) => distribution === "uniform" || distribution === "normal");
  return all ? normal : `${normal}, other quantiles moved by their bound of 1e−12 relative`;
}

export const transformLine: LineMaker = ({ context, series, problem, confidence }) => {
  const all = context.measurements.get(series.problem);
  const line = { line: "transform", kind: "bias" } as const;
  if (problem.dependence === undefined && problem.inputs.every((input) => input.distribution === "uniform")) {
    return [
      {
        ...line,
        value: 0,
        interval: null,
        basis: "all inputs are uniform: no transform",
        remedy: null,
        lower: 0,
      },
    ];
  }
  const found = all?.transform ?? null;
  if (found === null || !Number.isFinite(found.bias))
    return [
      notAssessed(
        "transform",
        "bias",
        all === undefined ? "not measured in this study" : "values are not finite",
        null,
      ),
    ];
  const factor = studentFactor(confidence, found.points - 1);
  // A condition that no point changed: its chance is bounded as that of a rare event.
  const limit = limitOf(found, factor, confidence, found.amplification, series.last.indicator);
  const basis =
    `${quantileWords(problem.inputs)}, through the integrand at ${formatCount(found.points)} points: ` +
    `${formatPercent(confidence)} limit of ${formatValue(found.bias, found.standardError)}` +
    (limit.counted ? " (Clopper\u2013Pearson)" : "");
  return [
    {
      ...line,
      value: limit.value,
      interval: [0, limit.value],
      basis,
      remedy: "a more exact inverse distribution function",
      lower: 0,
    },
  ];
};

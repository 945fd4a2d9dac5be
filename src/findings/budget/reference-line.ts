/** Reference: the stated uncertainty of the exact value, or the interval of the consensus that stands in for it. */
import { normalUpperQuantile } from "../../numeric/normal.js";
import { formatPercent, formatValue } from "../format.js";
import type { LineMaker } from "./line.js";

export const referenceLine: LineMaker = ({ reference, confidence }) => {
  const line = { line: "reference", kind: "bias", lower: 0 } as const;
  if (reference === undefined) {
    const remedy = "a reference, or a consensus that agrees";
    return [{ ...line, value: null, interval: null, basis: "no reference value", remedy }];
  }
  const value = reference.uncertainty * normalUpperQuantile((1 - confidence) / 2);
  const basis =
    reference.uncertainty === 0
      ? `exact to double precision: ${reference.basis}`
      : `${formatPercent(confidence)} limit of its standard uncertainty ` +
        `${formatValue(reference.uncertainty)}: ${reference.basis}`;
  const remedy = reference.consensus
    ? "an exact value, or larger sizes, which the consensus follows"
    : reference.uncertainty > 0
      ? "a reference known more exactly"
      : null;
  return [{ ...line, value, interval: value === 0 ? null : [0, value], basis, remedy }];
};

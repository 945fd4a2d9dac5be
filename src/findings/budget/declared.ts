/** Declared: the user's own contributions (a time step, model inputs), taken at their word with the basis they give. */
import type { LineMaker } from "./line.js";

export const declaredLines: LineMaker = ({ problem }) =>
  (problem.declared ?? []).map(({ line, kind, value, basis }) => ({
    line,
    kind,
    value,
    interval: null,
    basis: `declared: ${basis.trim().replace(/\.$/, "")}`,
    remedy: "what the problem declares about it",
    lower: value,
  }));

/** Elements, slices and ranges; counted from 1, as in mathjs. */
import type { Builder } from "./builder.js";
import { isVector } from "./ir.js";
import type { VectorNode } from "./ir.js";
import { LIMITS } from "./language.js";
import { messages } from "./messages.js";
import { describe, plain } from "./shapes.js";
import type { Value } from "./shapes.js";

/** of[indices]. */
export function index(builder: Builder, of: Value, indices: readonly Value[]): Value {
  if (of.kind === "matrix") {
    if (indices.length !== 2) builder.fail(messages.indexCount(2, indices.length));
    const [row, column] = indices.map((value, i) => {
      if (value.kind === "matrix" || isVector(value.node)) return builder.fail(messages.matrixIndex());
      if (value.node.kind !== "number") return builder.fail(messages.notConstant("an index"));
      return position(builder, value.node.value, i === 0 ? of.rows : of.columns);
    });
    return plain(builder.element(of.node, (row ?? 0) * of.columns + (column ?? 0)));
  }
  const vector = of.node;
  if (!isVector(vector)) return builder.fail(messages.indexOfNumber());
  const [only] = indices;
  if (only === undefined || indices.length !== 1) return builder.fail(messages.indexCount(1, indices.length));
  if (only.kind === "matrix") return builder.fail(messages.notANumber("an index", describe(only)));
  if (only.node.kind === "number")
    return plain(builder.element(vector, position(builder, only.node.value, vector.length)));
  if (only.node.kind !== "values") return builder.fail(messages.notConstant("an index"));
  return plain(gather(builder, vector, only.node.values));
}

/** The elements start, start + step, ... not beyond end. */
export function indexRange(builder: Builder, start: number, step: number, end: number): Float64Array {
  if (![start, step, end].every(Number.isFinite) || step === 0) builder.fail(messages.rangeEnds());
  // A step such as 0.1 may miss its end by rounding: a billionth of a step is forgiven.
  const length = Math.floor((end - start) / step + 1e-9) + 1;
  if (length < 1) builder.fail(messages.emptyRange());
  if (length > LIMITS.elements) builder.fail(messages.tooManyElements(length));
  return Float64Array.from({ length }, (_, i) => start + i * step);
}

/** Evenly spaced indices are a slice, others a list of elements. */
function gather(builder: Builder, vector: VectorNode, indices: Float64Array): VectorNode {
  const positions = Array.from(indices, (value) => position(builder, value, vector.length));
  const [first = 0, second = 0] = positions;
  const step = positions.length > 1 ? second - first : 1;
  const even = step !== 0 && positions.every((value, i) => value === first + i * step);
  if (even) return builder.slice(vector, first, step, positions.length);
  return builder.stack(positions.map((value) => builder.element(vector, value)));
}

/** A 1-based index as a 0-based one. */
function position(builder: Builder, value: number, length: number): number {
  if (!Number.isInteger(value)) builder.fail(messages.indexInteger(value));
  if (value < 1 || value > length) builder.fail(messages.indexRange(value, length));
  return value - 1;
}

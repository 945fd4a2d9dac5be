/** Shapes of values: a number, a condition, a vector or a constant matrix; and the rules by which they go together. */
import type { Builder } from "./builder.js";
import { isVector } from "./ir.js";
import type { IrNode, ValuesNode, VectorNode } from "./ir.js";
import { messages } from "./messages.js";
import type { PrimitiveName } from "./primitives.js";

/** A node, or a constant matrix: its elements row after row. */
export type Value =
  | { readonly kind: "plain"; readonly node: IrNode }
  | { readonly kind: "matrix"; readonly node: ValuesNode; readonly rows: number; readonly columns: number };

export function plain(node: IrNode): Value {
  return { kind: "plain", node };
}

export function matrix(node: ValuesNode, rows: number): Value {
  return { kind: "matrix", node, rows, columns: node.length / rows };
}

/** "a number", "a vector of 5", ... */
export function describe(value: Value): string {
  if (value.kind === "matrix") return `a matrix of ${value.rows} by ${value.columns}`;
  if (isVector(value.node)) return `a vector of ${value.node.length.toLocaleString("en-GB")}`;
  return value.node.condition ? "a condition" : "a number";
}

export function asVector(builder: Builder, value: Value, who: string): VectorNode {
  if (value.kind === "plain" && isVector(value.node)) return value.node;
  return builder.fail(messages.needsVector(who, describe(value)));
}

/**
 * Applies an operation element by element: numbers go with everything, vectors with vectors of their length, matrices
 * with matrices of their size.
 */
export function elementwise(
  builder: Builder,
  who: string,
  values: readonly Value[],
  op: (nodes: IrNode[]) => IrNode,
): Value {
  const shaped = values.filter((value) => value.kind === "matrix" || isVector(value.node));
  const first = shaped[0];
  for (const other of shaped.slice(1)) {
    if (first === undefined || sameShape(first, other)) continue;
    const bothVectors = first.kind === "plain" && other.kind === "plain";
    builder.fail(
      bothVectors
        ? messages.lengths(who, first.node.length ?? 0, other.node.length ?? 0)
        : messages.shapes(who, describe(first), describe(other)),
    );
  }
  const node = op(values.map((value) => value.node));
  if (first?.kind !== "matrix") return plain(node);
  if (node.kind !== "values") return builder.fail(messages.matrixNotConstant());
  return matrix(node, first.rows);
}

function sameShape(a: Value, b: Value): boolean {
  if (a.kind === "matrix") return b.kind === "matrix" && a.rows === b.rows && a.columns === b.columns;
  return b.kind === "plain" && a.node.length === b.node.length;
}

/** An elementwise operation of one primitive on numbers; conditions count as 0 and 1. */
export function primitive(builder: Builder, who: string, op: PrimitiveName, ...values: Value[]): Value {
  return elementwise(builder, who, values, (nodes) =>
    builder.apply(op, ...nodes.map((node) => builder.toNumber(node))),
  );
}

/** The product that `*` means. */
export function product(builder: Builder, a: Value, b: Value): Value {
  const fail = (): never => builder.fail(messages.shapes("*", describe(a), describe(b)));
  if (a.kind === "plain" && b.kind === "plain") {
    if (isVector(a.node) && isVector(b.node)) return dot(builder, "*", a, b);
    return primitive(builder, "*", "mul", a, b);
  }
  if (isNumber(a) || isNumber(b)) return primitive(builder, "*", "mul", a, b);
  if (a.kind === "matrix" && b.kind === "matrix") {
    if (a.columns !== b.rows) fail();
    return matrix(
      builder.values(multiply(a.node.values, b.node.values, a.rows, a.columns, b.columns)),
      a.rows,
    );
  }
  if (a.kind === "matrix" && isVector(b.node)) {
    if (a.columns !== b.node.length) fail();
    return plain(builder.product(a.node, a.columns, b.node));
  }
  if (b.kind === "matrix" && isVector(a.node)) {
    if (b.rows !== a.node.length) fail();
    return plain(builder.product(builder.values(transpose(b.node.values, b.rows)), b.rows, a.node));
  }
  return fail();
}

export function dot(builder: Builder, who: string, a: Value, b: Value): Value {
  const left = asVector(builder, a, who);
  const right = asVector(builder, b, who);
  if (left.length !== right.length) builder.fail(messages.lengths(who, left.length, right.length));
  return plain(builder.reduce("sum", asVector(builder, primitive(builder, who, "mul", a, b), who)));
}

export function isNumber(value: Value): boolean {
  return value.kind === "plain" && !isVector(value.node);
}

function multiply(
  a: Float64Array,
  b: Float64Array,
  rows: number,
  inner: number,
  columns: number,
): Float64Array {
  const result = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i++) {
    for (let k = 0; k < inner; k++) {
      const factor = a[i * inner + k] ?? 0;
      for (let j = 0; j < columns; j++) {
        const at = i * columns + j;
        result[at] = (result[at] ?? 0) + factor * (b[k * columns + j] ?? 0);
      }
    }
  }
  return result;
}

function transpose(values: Float64Array, rows: number): Float64Array {
  const columns = values.length / rows;
  return Float64Array.from(
    { length: values.length },
    (_, i) => values[(i % rows) * columns + Math.floor(i / rows)] ?? 0,
  );
}

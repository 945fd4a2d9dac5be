/**
 * The intermediate representation: a graph of numbers and vectors without cycles. Nodes carry ascending ids, arguments
 * before users; equal nodes are one node (see builder.ts), so common subexpressions are computed once.
 */
import type { PrimitiveName } from "./primitives.js";

interface Shape {
  readonly id: number;
  /** Elements of a vector; null for a number. */
  readonly length: number | null;
  /** True for conditions: masks in the compiled code, which only `number` and `select` turn into numbers. */
  readonly condition: boolean;
}

/** A constant number; as a condition 0 or 1. */
export interface NumberNode extends Shape {
  readonly kind: "number";
  readonly value: number;
}

/** A constant vector. */
export interface ValuesNode extends Shape {
  readonly kind: "values";
  readonly length: number;
  readonly values: Float64Array;
}

/** One coordinate of the point. */
export interface RowNode extends Shape {
  readonly kind: "row";
  readonly row: number;
}

/** Coordinates first, first + step, ... of the point. */
export interface RowsNode extends Shape {
  readonly kind: "rows";
  readonly length: number;
  readonly first: number;
  readonly step: number;
}

/** An operation element by element; numbers among the arguments are repeated. */
export interface ApplyNode extends Shape {
  readonly kind: "apply";
  readonly op: PrimitiveName;
  readonly args: readonly IrNode[];
}

export type ReduceName = "sum" | "prod" | "min" | "max";

/** A vector to a number, element after element. */
export interface ReduceNode extends Shape {
  readonly kind: "reduce";
  readonly op: ReduceName;
  readonly of: VectorNode;
}

/** Running sums or products. */
export interface ScanNode extends Shape {
  readonly kind: "scan";
  readonly length: number;
  readonly op: "sum" | "prod";
  readonly of: VectorNode;
}

/** A vector of numbers that were computed one by one. */
export interface StackNode extends Shape {
  readonly kind: "stack";
  readonly length: number;
  readonly items: readonly IrNode[];
}

/** A constant matrix, row after row, times a vector. */
export interface ProductNode extends Shape {
  readonly kind: "product";
  readonly length: number;
  readonly matrix: ValuesNode;
  readonly columns: number;
  readonly of: VectorNode;
}

export interface SortNode extends Shape {
  readonly kind: "sort";
  readonly length: number;
  readonly of: VectorNode;
}

/** Elements first, first + step, ... of a vector that is kept in memory. */
export interface SliceNode extends Shape {
  readonly kind: "slice";
  readonly length: number;
  readonly of: VectorNode;
  readonly first: number;
  readonly step: number;
}

/** One element of a vector that is kept in memory. */
export interface PickNode extends Shape {
  readonly kind: "pick";
  readonly of: VectorNode;
  readonly index: number;
}

export type IrNode =
  | NumberNode
  | ValuesNode
  | RowNode
  | RowsNode
  | ApplyNode
  | ReduceNode
  | ScanNode
  | StackNode
  | ProductNode
  | SortNode
  | SliceNode
  | PickNode;

/** A node whose length is a number. */
export type VectorNode = IrNode & { readonly length: number };

export function isVector(node: IrNode): node is VectorNode {
  return node.length !== null;
}

export function isConstant(node: IrNode): node is NumberNode | ValuesNode {
  return node.kind === "number" || node.kind === "values";
}

/** The nodes that a node is computed from. */
export function operands(node: IrNode): readonly IrNode[] {
  switch (node.kind) {
    case "number":
    case "values":
    case "row":
    case "rows":
      return [];
    case "apply":
      return node.args;
    case "stack":
      return node.items;
    case "product":
      return [node.of];
    case "reduce":
    case "scan":
    case "sort":
    case "slice":
    case "pick":
      return [node.of];
  }
}

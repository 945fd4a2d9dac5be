/** What each function of the language table means in the graph. Number and shape of the arguments have been checked. */
import type { Builder } from "./builder.js";
import { isVector } from "./ir.js";
import type { IrNode, VectorNode } from "./ir.js";
import type { FunctionName } from "./language.js";
import { FUNCTIONS } from "./language.js";
import { messages } from "./messages.js";
import type { PrimitiveName } from "./primitives.js";
import { asVector, describe, dot, elementwise, plain } from "./shapes.js";
import type { Value } from "./shapes.js";

type Elementwise = (builder: Builder, ...args: IrNode[]) => IrNode;
type OverVector = (builder: Builder, of: VectorNode) => IrNode;

type NamesOf<S> = {
  [N in FunctionName]: (typeof FUNCTIONS)[N] extends { shape: S } ? N : never;
}[FunctionName];

const same =
  (op: PrimitiveName): Elementwise =>
  (builder, ...args) =>
    builder.apply(op, ...args);

/** Functions of numbers that are not a kernel of their own name. */
const COMPOSED: Partial<Record<FunctionName, Elementwise>> = {
  abs: same("abs"),
  floor: same("floor"),
  ceil: same("ceil"),
  fix: same("trunc"),
  sqrt: same("sqrt"),
  sign: (builder, a) => {
    const zero = builder.number(0);
    const negative = builder.apply("select", builder.apply("lt", a, zero), builder.number(-1), a);
    // What is neither above nor below 0 (0, -0, NaN) stays as it is.
    return builder.apply("select", builder.apply("gt", a, zero), builder.number(1), negative);
  },
  round: (builder, a) => {
    const whole = builder.apply("trunc", a);
    const rest = builder.apply("sub", a, whole); // exact
    const away = builder.apply(
      "select",
      builder.apply("lt", a, builder.number(0)),
      builder.number(-1),
      builder.number(1),
    );
    const half = builder.apply("ge", builder.apply("abs", rest), builder.number(0.5));
    return builder.apply("select", half, builder.apply("add", whole, away), whole);
  },
  mod: (builder, a, b) => {
    const whole = builder.apply("floor", builder.apply("div", a, b));
    const rest = builder.apply("sub", a, builder.apply("mul", b, whole));
    return builder.apply("select", builder.apply("eq", b, builder.number(0)), a, rest);
  },
  square: (builder, a) => power(builder, a, builder.number(2)),
  cube: (builder, a) => power(builder, a, builder.number(3)),
  pow: (builder, a, b) => power(builder, a, b),
};

const EXTREMA: Record<NamesOf<"extremum">, "min" | "max"> = { min: "min", max: "max" };

const OVER_VECTORS: Record<NamesOf<"reduction"> | NamesOf<"vector">, OverVector> = {
  sum: (builder, of) => builder.reduce("sum", of),
  prod: (builder, of) => builder.reduce("prod", of),
  mean: (builder, of) => builder.apply("div", builder.reduce("sum", of), builder.number(of.length)),
  norm: (builder, of) => {
    const vector = builder.toNumber(of);
    return builder.apply("sqrt", builder.reduce("sum", builder.apply("mul", vector, vector) as VectorNode));
  },
  length: (builder, of) => builder.number(of.length),
  cumsum: (builder, of) => builder.scan("sum", of),
  cumprod: (builder, of) => builder.scan("prod", of),
  sort: (builder, of) => builder.sort(of),
  diff: (builder, of) => {
    if (of.length < 2) builder.fail(messages.tooShort("diff", 2, of.length));
    const vector = builder.toNumber(of) as VectorNode;
    const later = builder.slice(vector, 1, 1, of.length - 1);
    return builder.apply("sub", later, builder.slice(vector, 0, 1, of.length - 1));
  },
};

/** Applies a function of the language. Throws FormulaError for arguments that do not fit. */
export function applyFunction(builder: Builder, name: FunctionName, args: readonly Value[]): Value {
  const entry = FUNCTIONS[name];
  const [least, most] = entry.arguments;
  if (args.length < least || args.length > most)
    builder.fail(messages.argumentCount(name, least, most, args.length));
  const [first, second] = args;
  if (first === undefined) return builder.fail(messages.argumentCount(name, least, most, 0));
  switch (entry.shape) {
    case "pair":
      return dot(builder, name, first, second ?? first);
    case "extremum": {
      const op = EXTREMA[name as keyof typeof EXTREMA];
      if (args.length === 1) return plain(builder.reduce(op, asVector(builder, first, name)));
      return elementwise(builder, name, args, (nodes) =>
        nodes.map((node) => builder.toNumber(node)).reduce((a, b) => builder.apply(op, a, b)),
      );
    }
    case "reduction":
    case "vector": {
      if (first.kind === "matrix") builder.fail(messages.noMatrix(name, `; found ${describe(first)}`));
      return plain(OVER_VECTORS[name as keyof typeof OVER_VECTORS](builder, asVector(builder, first, name)));
    }
    case "elementwise": {
      const composed = COMPOSED[name] ?? same(name as PrimitiveName);
      return elementwise(builder, name, args, (nodes) =>
        composed(builder, ...nodes.map((node) => builder.toNumber(node))),
      );
    }
  }
}

/** Largest whole exponent in size that is computed by multiplication; its error stays below 32 roundings. */
const LARGEST_WHOLE = 32;

/** a^b element by element. Whole constant exponents by multiplication, ½ by the square root, others by the kernel. */
export function power(builder: Builder, a: IrNode, b: IrNode): IrNode {
  if (b.kind === "number") {
    const exponent = b.value;
    if (Number.isInteger(exponent) && Math.abs(exponent) <= LARGEST_WHOLE)
      return wholePower(builder, a, exponent);
    if (exponent === 0.5) return builder.apply("sqrt", a);
    if (exponent === -0.5) return builder.apply("div", builder.number(1), builder.apply("sqrt", a));
  }
  if (b.kind === "values" && isVector(a)) {
    const [shared] = b.values;
    if (shared !== undefined && b.values.every((value) => value === shared))
      return power(builder, a, builder.number(shared));
  }
  return builder.apply("pow", a, b);
}

/** Square and multiply (Knuth, The Art of Computer Programming, vol. 2, 4.6.3, from the low end). */
function wholePower(builder: Builder, a: IrNode, exponent: number): IrNode {
  if (exponent === 0) {
    return isVector(a) ? builder.values(new Float64Array(a.length).fill(1)) : builder.number(1);
  }
  let square = a;
  let result: IrNode | null = null;
  for (let rest = Math.abs(exponent); rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = result === null ? square : builder.apply("mul", result, square);
    if (rest > 1) square = builder.apply("mul", square, square);
  }
  if (result === null) throw new RangeError("an exponent of 0");
  return exponent < 0 ? builder.apply("div", builder.number(1), result) : result;
}

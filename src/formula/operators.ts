/** What each operator means in the graph. */
import type { Builder } from "./builder.js";
import { applyFunction, power } from "./functions.js";
import { isVector } from "./ir.js";
import type { IrNode } from "./ir.js";
import { messages } from "./messages.js";
import type { ComparisonName } from "./primitives.js";
import { describe, elementwise, isNumber, primitive, product } from "./shapes.js";
import type { Value } from "./shapes.js";

const COMPARISON_OF: Readonly<Record<string, ComparisonName>> = {
  "<": "lt",
  "<=": "le",
  ">": "gt",
  ">=": "ge",
  "==": "eq",
  "!=": "ne",
};

export function applyPrefix(builder: Builder, operator: string, a: Value): Value {
  if (operator === "-") return primitive(builder, "-", "neg", a);
  if (operator === "not") {
    return elementwise(builder, "not", [a], ([node]) => builder.apply("not", condition(builder, node)));
  }
  return elementwise(builder, "+", [a], ([node]) => builder.toNumber(given(node)));
}

export function applyInfix(builder: Builder, operator: string, a: Value, b: Value): Value {
  switch (operator) {
    case "+":
      return primitive(builder, "+", "add", a, b);
    case "-":
      return primitive(builder, "-", "sub", a, b);
    case "*":
      return product(builder, a, b);
    case ".*":
      return primitive(builder, ".*", "mul", a, b);
    case "/":
      if (!isNumber(b)) builder.fail(messages.elementwiseAdvice("/", describe(a), describe(b)));
      return primitive(builder, "/", "div", a, b);
    case "./":
      return primitive(builder, "./", "div", a, b);
    case "^":
      if (!isNumber(a) || !isNumber(b))
        builder.fail(messages.elementwiseAdvice("^", describe(a), describe(b)));
      return raise(builder, "^", a, b);
    case ".^":
      return raise(builder, ".^", a, b);
    case "mod":
      return applyFunction(builder, "mod", [a, b]);
    case "and":
    case "or":
      return elementwise(builder, operator, [a, b], ([left, right]) =>
        builder.apply(operator, condition(builder, left), condition(builder, right)),
      );
    default: {
      const op = COMPARISON_OF[operator];
      if (op === undefined) throw new TypeError(`no meaning for the operator ${operator}`);
      return primitive(builder, operator, op, a, b);
    }
  }
}

/** c ? a : b. */
export function choose(builder: Builder, c: Value, a: Value, b: Value): Value {
  return elementwise(builder, "? :", [c, a, b], ([test, yes, no]) => {
    const mask = condition(builder, test);
    const [left, right] = [given(yes), given(no)];
    const conditions = left.condition && right.condition;
    const args = conditions ? [left, right] : [builder.toNumber(left), builder.toNumber(right)];
    return builder.apply("select", mask, ...args);
  });
}

function raise(builder: Builder, who: string, a: Value, b: Value): Value {
  return elementwise(builder, who, [a, b], ([base, exponent]) => {
    const result = power(builder, builder.toNumber(given(base)), builder.toNumber(given(exponent)));
    const length = [base, exponent].find((node) => node !== undefined && isVector(node))?.length ?? null;
    if (length === null || isVector(result)) return result;
    return builder.stack(new Array<IrNode>(length).fill(result));
  });
}

function condition(builder: Builder, node: IrNode | undefined): IrNode {
  return builder.toCondition(given(node));
}

function given(node: IrNode | undefined): IrNode {
  if (node === undefined) throw new TypeError("an operand is missing");
  return node;
}

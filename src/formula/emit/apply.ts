/** Instructions of the elementwise operations; their arguments are on the stack. */
import { isKernelName } from "../primitives.js";
import type { KernelName, PrimitiveName } from "../primitives.js";
import type { Code } from "./code.js";
import type { SimdName } from "./opcodes.js";

type InstructionName = Exclude<PrimitiveName, KernelName | "number" | "select">;

const INSTRUCTIONS: Readonly<Record<InstructionName, SimdName>> = {
  neg: "neg",
  abs: "abs",
  sqrt: "sqrt",
  floor: "floor",
  ceil: "ceil",
  trunc: "trunc",
  add: "add",
  sub: "sub",
  mul: "mul",
  div: "div",
  min: "min",
  max: "max",
  lt: "lt",
  le: "le",
  gt: "gt",
  ge: "ge",
  eq: "eq",
  ne: "ne",
  and: "and",
  or: "or",
  not: "not",
};

export interface Emission {
  /** Pushes an argument. */
  readonly push: (argument: number) => void;
  /** Pushes the number 1. */
  readonly pushOne: () => void;
  readonly kernel: (name: KernelName) => void;
}

/** Writes the operation with `count` arguments. */
export function writeOperation(code: Code, op: PrimitiveName, count: number, emission: Emission): void {
  if (op === "select") {
    // bitselect(a, b, mask): bits of a where the mask is set.
    for (const argument of [1, 2, 0]) emission.push(argument);
    code.simd("bitselect");
    return;
  }
  for (let argument = 0; argument < count; argument++) emission.push(argument);
  if (op === "number") {
    emission.pushOne();
    code.simd("and");
  } else if (isKernelName(op)) {
    emission.kernel(op);
  } else {
    code.simd(INSTRUCTIONS[op]);
  }
}

/** The operations that the engine computes element by element: instructions and kernels. */

/** Kernels of the math group by name, with the number of their arguments; exported by the module as `vec_<name>`. */
export const KERNELS = {
  exp: 1,
  expm1: 1,
  log: 1,
  log1p: 1,
  log2: 1,
  log10: 1,
  cbrt: 1,
  pow: 2,
  sin: 1,
  cos: 1,
  tan: 1,
  asin: 1,
  acos: 1,
  atan: 1,
  atan2: 2,
  sinh: 1,
  cosh: 1,
  tanh: 1,
  erf: 1,
  erfc: 1,
  gamma: 1,
  lgamma: 1,
  normalPdf: 1,
  normalCdf: 1,
  normalQuantile: 1,
} as const;

export type KernelName = keyof typeof KERNELS;

export function isKernelName(name: string): name is KernelName {
  return Object.hasOwn(KERNELS, name);
}

/** Name under which the kernel module exports a kernel. */
export function kernelExport(name: KernelName): string {
  return `vec_${name}`;
}

/** Instructions on numbers, each rounding as IEEE 754 says, with the same operation in JavaScript for constants. */
export const ARITHMETIC = {
  neg: (a: number) => -a,
  abs: (a: number) => Math.abs(a),
  sqrt: (a: number) => Math.sqrt(a),
  floor: (a: number) => Math.floor(a),
  ceil: (a: number) => Math.ceil(a),
  trunc: (a: number) => Math.trunc(a),
  add: (a: number, b: number) => a + b,
  sub: (a: number, b: number) => a - b,
  mul: (a: number, b: number) => a * b,
  div: (a: number, b: number) => a / b,
  min: (a: number, b: number) => Math.min(a, b),
  max: (a: number, b: number) => Math.max(a, b),
} as const;

export type ArithmeticName = keyof typeof ARITHMETIC;

/** Comparisons: numbers to a condition (a mask of all ones or all zeros in the compiled code). */
export const COMPARISONS = {
  lt: (a: number, b: number) => a < b,
  le: (a: number, b: number) => a <= b,
  gt: (a: number, b: number) => a > b,
  ge: (a: number, b: number) => a >= b,
  eq: (a: number, b: number) => a === b,
  ne: (a: number, b: number) => a !== b,
} as const;

export type ComparisonName = keyof typeof COMPARISONS;

/** Operations with conditions: `number` makes 0 or 1 of a condition, `select` takes one of two numbers by a condition. */
export type ConditionName = "and" | "or" | "not" | "number" | "select";

export type PrimitiveName = ArithmeticName | ComparisonName | ConditionName | KernelName;

export function isArithmetic(name: PrimitiveName): name is ArithmeticName {
  return Object.hasOwn(ARITHMETIC, name);
}

export function isComparison(name: PrimitiveName): name is ComparisonName {
  return Object.hasOwn(COMPARISONS, name);
}

/** Whether the operation gives a condition. */
export function givesCondition(name: PrimitiveName): boolean {
  return isComparison(name) || name === "and" || name === "or" || name === "not";
}

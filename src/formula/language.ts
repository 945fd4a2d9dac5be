/**
 * The formula language as data: every function with its arity, what it does to shapes, the kernel that computes it,
 * what it means, and one line of help. `tolerand functions` and docs/formula.md are derived from these tables, and a
 * name that is not in them does not exist for the compiler.
 */
import type { KernelName } from "./primitives.js";

/** What a function does to shapes. */
export type FunctionShape =
  /** Numbers to a number; applied element by element to vectors, numbers are repeated to match. */
  | "elementwise"
  /** A vector to a number. */
  | "reduction"
  /** A vector to a number; or two and more arguments element by element. */
  | "extremum"
  /** Two vectors of one length to a number. */
  | "pair"
  /** A vector to a vector. */
  | "vector";

export interface FunctionEntry {
  readonly arguments: readonly [least: number, most: number];
  readonly shape: FunctionShape;
  /** The kernel that computes it; null where instructions of the processor and simple compositions do. */
  readonly kernel: KernelName | null;
  /** How the same thing is written in mathjs; null where mathjs has no such function. */
  readonly mathjs: string | null;
  readonly group: FunctionGroup;
  readonly help: string;
}

export type FunctionGroup =
  "Vectors" | "Rounding and sign" | "Powers and logarithms" | "Angles" | "Probability";

type Entry<S extends FunctionShape> = FunctionEntry & { readonly shape: S };
type Row = readonly [kernel: KernelName | null, mathjs: string | null, help: string];

function elementwise(group: FunctionGroup, [kernel, mathjs, help]: Row, count = 1): Entry<"elementwise"> {
  return { arguments: [count, count], shape: "elementwise", kernel, mathjs, group, help };
}

function overVector<S extends FunctionShape>(shape: S, mathjs: string | null, help: string): Entry<S> {
  const count = shape === "pair" ? 2 : 1;
  const most = shape === "extremum" ? Infinity : count;
  return { arguments: [count, most], shape, kernel: null, mathjs, group: "Vectors", help };
}

const rounding = (row: Row, count = 1) => elementwise("Rounding and sign", row, count);
const powers = (row: Row, count = 1) => elementwise("Powers and logarithms", row, count);
const angles = (row: Row, count = 1) => elementwise("Angles", row, count);
const probability = (row: Row) => elementwise("Probability", row);

export const FUNCTIONS = {
  sum: overVector("reduction", "sum(v)", "sum of the elements, added in order"),
  prod: overVector("reduction", "prod(v)", "product of the elements"),
  mean: overVector("reduction", "mean(v)", "sum divided by length"),
  min: overVector("extremum", "min(v)", "smallest element; of several arguments, element by element"),
  max: overVector("extremum", "max(v)", "largest element; of several arguments, element by element"),
  dot: overVector("pair", "dot(v, w)", "inner product"),
  norm: overVector("reduction", "norm(v)", "Euclidean length, sqrt(sum(v .^ 2))"),
  cumsum: overVector("vector", "cumsum(v)", "running sums"),
  cumprod: overVector("vector", null, "running products"),
  diff: overVector("vector", "diff(v)", "differences of neighbours, one element shorter"),
  sort: overVector("vector", "sort(v)", "elements in ascending order; all NaN if one is"),
  length: overVector("reduction", "count(v)", "number of elements, a constant"),

  abs: rounding([null, "abs(a)", "absolute value"]),
  sign: rounding([null, "sign(a)", "-1, 0 or 1"]),
  floor: rounding([null, "floor(a)", "largest integer not above a, exactly"]),
  ceil: rounding([null, "ceil(a)", "smallest integer not below a, exactly"]),
  round: rounding([null, "round(a)", "nearest integer, halves away from zero"]),
  fix: rounding([null, "fix(a)", "integer part, towards zero"]),
  mod: rounding([null, "mod(a, b)", "a - b * floor(a / b); a where b is 0"], 2),

  sqrt: powers([null, "sqrt(a)", "square root"]),
  cbrt: powers(["cbrt", "cbrt(a)", "cube root"]),
  square: powers([null, "square(a)", "a * a"]),
  cube: powers([null, "cube(a)", "a * a * a"]),
  pow: powers(["pow", "pow(a, b)", "a to the power b, as a ^ b"], 2),
  exp: powers(["exp", "exp(a)", "exponential"]),
  expm1: powers(["expm1", "expm1(a)", "exp(a) - 1, accurate near 0"]),
  log: powers(["log", "log(a)", "natural logarithm"]),
  log1p: powers(["log1p", "log1p(a)", "log(1 + a), accurate near 0"]),
  log2: powers(["log2", "log2(a)", "logarithm to base 2"]),
  log10: powers(["log10", "log10(a)", "logarithm to base 10"]),

  sin: angles(["sin", "sin(a)", "sine of radians"]),
  cos: angles(["cos", "cos(a)", "cosine of radians"]),
  tan: angles(["tan", "tan(a)", "tangent of radians"]),
  asin: angles(["asin", "asin(a)", "inverse sine"]),
  acos: angles(["acos", "acos(a)", "inverse cosine"]),
  atan: angles(["atan", "atan(a)", "inverse tangent"]),
  atan2: angles(["atan2", "atan2(a, b)", "angle of the point with abscissa b and ordinate a"], 2),
  sinh: angles(["sinh", "sinh(a)", "hyperbolic sine"]),
  cosh: angles(["cosh", "cosh(a)", "hyperbolic cosine"]),
  tanh: angles(["tanh", "tanh(a)", "hyperbolic tangent"]),

  erf: probability(["erf", "erf(a)", "error function"]),
  erfc: probability(["erfc", null, "1 - erf(a), accurate in the tail"]),
  gamma: probability(["gamma", "gamma(a)", "gamma function"]),
  lgamma: probability(["lgamma", "lgamma(a)", "logarithm of gamma(a) for a >= 0, NaN below"]),
  normalPdf: probability(["normalPdf", null, "density of the standard normal distribution"]),
  normalCdf: probability(["normalCdf", null, "distribution function of the standard normal"]),
  normalQuantile: probability(["normalQuantile", null, "inverse of normalCdf"]),
} as const satisfies Record<string, FunctionEntry>;

export type FunctionName = keyof typeof FUNCTIONS;

export function isFunctionName(name: string): name is FunctionName {
  return Object.hasOwn(FUNCTIONS, name);
}

/** Named numbers. */
export const NAMED_NUMBERS: Readonly<
  Record<string, { readonly value: number | boolean; readonly help: string }>
> = {
  pi: { value: Math.PI, help: "ratio of circumference to diameter" },
  e: { value: Math.E, help: "base of natural logarithms" },
  true: { value: true, help: "a condition that holds" },
  false: { value: false, help: "a condition that does not hold" },
};

/** Words with a meaning of their own, which no input, constant or local name may take. */
export const RESERVED_WORDS = [
  "and",
  "or",
  "not",
  "mod",
  "xor",
  "to",
  "in",
  "end",
  "null",
  "undefined",
  "NaN",
  "Infinity",
];

/** Operators in order of falling precedence, as mathjs reads them. */
export const OPERATORS = [
  {
    signs: "f(a)  v[i]  v[i:j]  v[i:s:j]",
    help: "call, element (counted from 1, `end` is the last), slice, slice with step",
  },
  { signs: "^  .^", help: "power of numbers; element by element. Right to left: 2^3^2 is 2^9" },
  { signs: "-a  +a  not a", help: "sign, negation of a condition" },
  {
    signs: "*  /  .*  ./  mod",
    help: "`*` of two vectors is the inner product, matrix `*` vector the usual product",
  },
  { signs: "+  -", help: "a number is added to every element of a vector" },
  { signs: "i:j  i:s:j", help: "the vector i, i + s, ... up to j, with constant ends" },
  { signs: "<  <=  >  >=  ==  !=", help: "exact comparison of doubles; a < b < c means a < b and b < c" },
  { signs: "and", help: "both conditions; a number counts as true unless it is 0 or NaN" },
  { signs: "or", help: "either condition" },
  {
    signs: "c ? a : b",
    help: "a where c holds, else b; both are computed, and what is not chosen has no effect",
  },
] as const;

/** Bounds that keep a hostile formula from taking time or memory. */
export const LIMITS = {
  /** Characters of a formula. */
  characters: 65_536,
  /** Brackets within brackets. */
  brackets: 64,
  /** Depth of the syntax tree of one statement, and of helper functions expanded inside it. */
  depth: 600,
  /** Operations that wait for each other one after the other, over all lines. */
  chain: 1_500,
  /** Operations after helper functions are expanded. */
  operations: 20_000,
  /** Elements of a vector. */
  elements: 1_000_000,
  /** Elements of all constant vectors and matrices that a formula makes. */
  constantElements: 4_000_000,
  /** Bytes of scratch memory. */
  scratchBytes: 64 * 1024 * 1024,
} as const;

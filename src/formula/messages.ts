/** Every message of the formula compiler: what was found, what is allowed, what to do. */
import { LIMITS } from "./language.js";

const count = (n: number): string => n.toLocaleString("en-GB");

function suggestion(near: string | null, otherwise: string): string {
  return near === null ? otherwise : `did you mean "${near}"?`;
}

export const messages = {
  // The text.
  tooLong: (length: number) =>
    `the formula has ${count(length)} characters; at most ${count(LIMITS.characters)} are allowed. Put long lists of numbers under constants`,
  empty: () => "the formula is empty; write an expression, such as sum(x)",
  tooNested: () =>
    `more than ${LIMITS.brackets} brackets within each other; name parts of the expression on lines of their own`,
  tooDeep: () =>
    `the expression is more than ${LIMITS.depth} operations deep; use sum or prod over a vector, or name parts of it on lines of their own`,
  chainTooLong: () =>
    `a chain of more than ${count(LIMITS.chain)} operations, each waiting for the one before; use sum, prod, cumsum or cumprod over a vector`,
  unclosed: (bracket: string) => `"${bracket}" is never closed`,
  unopened: (bracket: string) => `"${bracket}" closes nothing`,
  crossed: (opening: string, closing: string) => `"${closing}" found where "${opening}" is still open`,
  openRange: () => "a range needs both its ends; write 1:end for all elements",
  hexadecimal: () => "only decimal numbers are allowed, such as 12, 0.5 or 1e-3",
  character: (text: string, index: number, afterName: boolean) => {
    const found = String.fromCodePoint(text.codePointAt(index) ?? 0);
    const advice: Readonly<Record<string, string>> = {
      '"': "there are no strings in the formula language",
      "'": "there are no strings and no transposition in the formula language; vectors have no orientation",
      "`": "there are no strings in the formula language",
      "{": "there are no objects in the formula language",
      "}": "there are no objects in the formula language",
      "%": "write mod(a, b) for a remainder, a / 100 for per cent",
      "!": "write not for a condition, gamma(a + 1) for a factorial",
      "&": "write and",
      "|": "write or, abs(a) for an absolute value",
      "~": "write not",
    };
    const dot = afterName
      ? "there is no access to properties in the formula language"
      : "a dot stands in a number or in .* ./ .^";
    return `unexpected ${JSON.stringify(found)}; ${found === "." ? dot : (advice[found] ?? "letters, digits, brackets and the operators + - * / ^ .* ./ .^ < <= > >= == != ? : are allowed")}`;
  },
  syntax: (reason: string) => `the formula cannot be read here: ${reason}`,
  notInLanguage: (what: string, instead: string) => `${what} is not part of the formula language; ${instead}`,
  implicitProduct: () => "an operator is missing; write * for a product",

  // Names.
  unknownName: (name: string, near: string | null, known: readonly string[]) =>
    `unknown name "${name}"; ${suggestion(near, known.length === 0 ? "no names are defined here" : `known here: ${known.slice(0, 12).join(", ")}${known.length > 12 ? ", ..." : ""}`)}`,
  unknownFunction: (name: string, near: string | null) =>
    `unknown function "${name}"; ${suggestion(near, "`tolerand functions` lists them all")}`,
  notAFunction: (name: string) =>
    `"${name}" is not a function; write * for a product, ${name}[i] for an element`,
  functionAsValue: (name: string) => `"${name}" is a function; give it its arguments in round brackets`,
  taken: (name: string, by: string) => `the name "${name}" is taken by ${by}; choose another`,
  invalidName: (name: string) =>
    `"${name}" cannot be a name in a formula; use letters, digits and _, beginning with a letter`,
  recursion: (name: string) =>
    `"${name}" uses itself; helper functions are expanded in place and cannot be recursive`,
  duplicateParameter: (name: string) => `the parameter "${name}" is named twice`,
  endOutside: () => "end has a meaning only within square brackets",
  noResult: () => "the last line must be an expression, the value of the formula",
  unusedValue: () =>
    "only the last line may be an expression without a name; write name = ... to use a value later",

  // Shapes.
  argumentCount: (name: string, least: number, most: number, found: number) =>
    `${name} takes ${argumentRange(least, most)}; found ${found}`,
  needsVector: (name: string, found: string) => `${name} needs a vector; found ${found}`,
  noMatrix: (name: string, instead: string) => `${name} does not take a matrix${instead}`,
  lengths: (name: string, left: number, right: number) =>
    `${name} needs vectors of one length; found ${count(left)} and ${count(right)}`,
  shapes: (name: string, left: string, right: string) => `${name} does not go with ${left} and ${right}`,
  elementwiseAdvice: (operator: string, left: string, right: string) =>
    `${operator} of ${left} and ${right} has no clear meaning; write .${operator} for element by element`,
  tooShort: (name: string, least: number, found: number) =>
    `${name} needs at least ${least} elements; found ${found}`,
  listOfVectors: (found: string) =>
    `a list takes numbers, or rows of one length for a constant matrix; found ${found}`,
  raggedRows: (first: number, found: number) =>
    `rows of a matrix need one length; found ${count(first)} and ${count(found)}`,
  matrixNotConstant: () => "a matrix must be constant; it cannot depend on the inputs",
  emptyList: () => "a list needs at least one element",
  notConstant: (what: string) => `${what} must be constant; it cannot depend on the inputs`,
  notANumber: (what: string, found: string) => `${what} must be a number; found ${found}`,
  rangeEnds: () => "the ends and the step of a range must be finite numbers, the step not 0",
  emptyRange: () => "the range is empty",
  tooManyElements: (found: number) =>
    `a vector of ${count(found)} elements; at most ${count(LIMITS.elements)} are allowed`,
  tooManyConstants: () =>
    `the formula makes more than ${count(LIMITS.constantElements)} constant numbers; shorten its vectors`,
  tooManyOperations: () =>
    `the formula expands to more than ${count(LIMITS.operations)} operations; use vectors instead of writing elements out, and fewer nested helper functions`,
  tooMuchScratch: (bytes: number) =>
    `the formula needs ${count(bytes)} bytes for intermediate vectors; at most ${count(LIMITS.scratchBytes)} are allowed. Use fewer or shorter vectors`,
  indexOfNumber: () => "a number has no elements",
  indexCount: (wanted: number, found: number) =>
    `${wanted === 1 ? "a vector takes one index" : "a matrix takes two indices"}; found ${found}`,
  indexInteger: (found: number) => `an index must be an integer; found ${found}`,
  indexRange: (found: number, length: number) => `index ${count(found)} is outside 1 to ${count(length)}`,
  matrixIndex: () => "an element of a matrix is taken by two numbers, A[2, 3]",
  resultShape: (found: string) =>
    `the formula gives ${found}; it must give a number. Take sum, mean or max of it, or one element`,
  pairShape: (found: string) =>
    `the formula gives ${found}; a ratio needs two numbers: let the last line be [above, below]`,
  constantInputs: () => "the value must be constant",
} as const;

function argumentRange(least: number, most: number): string {
  const plural = (n: number): string => (n === 1 ? "argument" : "arguments");
  if (least === most) return `${least === 1 ? "one" : least === 2 ? "two" : String(least)} ${plural(least)}`;
  return most === Infinity ? `at least ${least} ${plural(least)}` : `${least} to ${most} arguments`;
}

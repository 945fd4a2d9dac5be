/**
 * The reference interpreter: evaluates a formula with mathjs itself, point by point. Slow (about a thousand times slower
 * than the compiled function) and independent of everything behind the parser: the compiler's oracle in tests, and a
 * second opinion for `tolerand check --at`.
 *
 * What mathjs does otherwise than the language is evened out: functions of numbers are mapped over vectors, comparisons
 * are exact, complex results are NaN, conditionals work element by element.
 */
import type { ConditionalNode, MathJsInstance, MathNode, OperatorNode } from "mathjs";
import type { FormulaConstant, FormulaScope } from "./contract.js";
import { describeFormula } from "./compile.js";
import { FUNCTIONS } from "./language.js";
import { loadMathjs } from "./mathjs.js";
import { VECTOR_FUNCTIONS, numberFunctions } from "./reference-functions.js";

type Scalar = number | boolean;
type Argument = Scalar | readonly Scalar[];
type Callable = (...args: Argument[]) => unknown;

const CHOOSE = "choose_";

/**
 * A function from the coordinates of a point (in the order of the rows) to the channels of the formula. Throws
 * FormulaError for what the compiler refuses.
 */
export async function interpretFormula(
  text: string,
  scope: FormulaScope,
): Promise<(coordinates: readonly number[]) => number[]> {
  await describeFormula(text, scope);
  const math = await loadMathjs();
  const code = math.parse(text.replaceAll("\r", " ")).transform(rewrite(math)).compile();
  const functions = languageFunctions(math);
  return (coordinates) => {
    const names = new Map<string, unknown>(Object.entries(functions));
    for (const [name, value] of Object.entries(scope.constants)) names.set(name, copy(value));
    for (const { name, first, length } of scope.inputs) {
      names.set(name, length === null ? coordinates[first] : coordinates.slice(first, first + length));
    }
    return [toNumber(last(code.evaluate(names)))];
  };
}

/** Operators and conditionals that need the language's meaning become calls; mathjs leaves replaced nodes' children alone. */
function rewrite(math: MathJsInstance): (node: MathNode) => MathNode {
  const call = (name: string, args: MathNode[]): MathNode =>
    new math.FunctionNode(
      name,
      args.map((arg) => arg.transform(visit)),
    );
  const visit = (node: MathNode): MathNode => {
    if (isConditional(node)) return call(CHOOSE, [node.condition, node.trueExpr, node.falseExpr]);
    if (isOperator(node) && (node.fn as string) === "mod") return call("mod", node.args);
    if (isOperator(node) && ["pow", "dotPow"].includes(node.fn)) return call("pow", node.args);
    return node;
  };
  return visit;
}

function isConditional(node: MathNode): node is ConditionalNode {
  return node.type === "ConditionalNode";
}

function isOperator(node: MathNode): node is OperatorNode {
  return node.type === "OperatorNode";
}

/** The functions of the language as values of a mathjs scope, which go before mathjs' own. */
function languageFunctions(math: MathJsInstance): Record<string, Callable> {
  const own = numberFunctions(math);
  const functions: Record<string, Callable> = {
    [CHOOSE]: broadcast((test, yes, no) => (test ? (yes ?? NaN) : (no ?? NaN))),
  };
  const builtIn = math as unknown as Record<string, (...args: unknown[]) => unknown>;
  for (const [name, { shape }] of Object.entries(FUNCTIONS)) {
    const vectorFunction = VECTOR_FUNCTIONS[name];
    const numeric = own[name] ?? ((...args: number[]) => toNumber(builtIn[name]?.(...args)));
    if (shape === "elementwise") functions[name] = broadcast(numeric);
    else if (shape === "extremum") functions[name] = extremum(numeric);
    else if (vectorFunction !== undefined)
      functions[name] = (of) => vectorFunction((of as Scalar[]).map(Number));
    else functions[name] = (...args) => builtIn[name]?.(...args.map(numbersOf));
  }
  return functions;
}

function numbersOf(value: Argument): number | number[] {
  return typeof value === "object" ? value.map(Number) : Number(value);
}

/** Element by element over vectors, numbers repeated. */
function broadcast(numeric: (...args: number[]) => number): Callable {
  const over = (...args: unknown[]): unknown => {
    const vector = args.find(Array.isArray) as unknown[] | undefined;
    if (vector === undefined) return numeric(...args.map(Number));
    return vector.map((_, i) =>
      over(...args.map((arg) => (Array.isArray(arg) ? (arg as unknown[])[i] : arg))),
    );
  };
  return over;
}

function extremum(numeric: (...args: number[]) => number): Callable {
  const over = broadcast(numeric);
  return (...args) => (args.length === 1 ? numeric(...[args[0] ?? NaN].flat().map(Number)) : over(...args));
}

/** The value of the last line. */
function last(value: unknown): unknown {
  if (typeof value !== "object" || value === null || !("entries" in value)) return value;
  return (value.entries as unknown[]).at(-1);
}

/** Real numbers and conditions; what is complex for mathjs does not exist for the language. */
function toNumber(value: unknown): number {
  return typeof value === "number" || typeof value === "boolean" ? Number(value) : NaN;
}

function copy(value: FormulaConstant): unknown {
  return structuredClone(value);
}

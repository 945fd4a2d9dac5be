/**
 * Formulas in 64 decimal digits: mathjs' BigNumber (decimal.js) in place of doubles, so that what the compiled function
 * loses to rounding shows. Some thousand times slower still than the interpreter: for subsamples only. erf, erfc and the
 * normal law are series of our own; gamma and lgamma have no version here.
 */
import type { BigNumber, ConditionalNode, MathJsInstance, MathNode, OperatorNode } from "mathjs";
import type { FormulaConstant, FormulaScope } from "./contract.js";
import { FUNCTIONS } from "./language.js";

export const DIGITS = 64;

/** Names that have no version in many digits. */
const WITHOUT: ReadonlySet<string> = new Set(["gamma", "lgamma"]);

type Value = BigNumber | boolean | Value[];
type Callable = (...args: Value[]) => Value;

export interface HighPrecision {
  /** Functions of the formula without a version in many digits; where there are any, `excess` gives NaN. */
  readonly missing: readonly string[];
  /** `value` (a double) less the formula's value at `coordinates`, rounded once. */
  excess(coordinates: readonly number[], value: number): number;
}

let loaded: Promise<MathJsInstance> | undefined;

function loadBigMath(): Promise<MathJsInstance> {
  loaded ??= import("mathjs").then(({ all, create }) =>
    create(all ?? {}, { matrix: "Array", number: "BigNumber", precision: DIGITS, relTol: 1e-60, absTol: 0 }),
  );
  return loaded;
}

/** `text` is a formula that the compiler accepts. */
export async function highPrecision(text: string, scope: FormulaScope): Promise<HighPrecision> {
  const math = await loadBigMath();
  const tree = math.parse(text.replaceAll("\r", " "));
  const missing = new Set<string>();
  tree.traverse((node) => {
    if (node.type === "FunctionNode" && WITHOUT.has((node as unknown as { fn: { name: string } }).fn.name))
      missing.add((node as unknown as { fn: { name: string } }).fn.name);
  });
  const code = tree.transform(rewrite(math)).compile();
  const functions = bigFunctions(math);
  const big = (value: FormulaConstant): unknown =>
    typeof value === "number" ? math.bignumber(value) : value.map((part) => big(part));
  const constants = Object.entries(scope.constants).map(([name, value]) => [name, big(value)] as const);
  return {
    missing: [...missing],
    excess(coordinates, value) {
      if (missing.size > 0) return NaN;
      const names = new Map<string, unknown>([...Object.entries(functions), ...constants]);
      for (const { name, first, length } of scope.inputs) {
        const rows = coordinates.slice(first, first + (length ?? 1)).map((row) => math.bignumber(row));
        names.set(name, length === null ? rows[0] : rows);
      }
      const exact = last(code.evaluate(names));
      if (typeof exact === "boolean" || typeof exact === "number") return value - Number(exact);
      if (!math.isBigNumber(exact)) return NaN;
      return math.bignumber(value).minus(exact).toNumber();
    },
  };
}

/** Operators that the language means otherwise become calls, as in the interpreter. */
function rewrite(math: MathJsInstance): (node: MathNode) => MathNode {
  const call = (name: string, args: MathNode[]): MathNode =>
    new math.FunctionNode(
      name,
      args.map((arg) => arg.transform(visit)),
    );
  const visit = (node: MathNode): MathNode => {
    if (node.type === "ConditionalNode") {
      const { condition, trueExpr, falseExpr } = node as ConditionalNode;
      return call("choose_", [condition, trueExpr, falseExpr]);
    }
    const { fn, args } = node as OperatorNode;
    if (node.type === "OperatorNode" && (fn as string) === "mod") return call("mod", args);
    if (node.type === "OperatorNode" && (fn === "pow" || fn === "dotPow")) return call("pow", args);
    return node;
  };
  return visit;
}

function bigFunctions(math: MathJsInstance): Record<string, Callable> {
  const builtIn = math as unknown as Record<string, (...args: unknown[]) => Value>;
  const number = (value: Value): BigNumber =>
    value === true ? math.bignumber(1) : value === false ? math.bignumber(0) : (value as BigNumber);
  const numbers = (value: Value): Value => (Array.isArray(value) ? value.map(numbers) : number(value));
  const broadcast = (f: Callable): Callable => {
    const over: Callable = (...args) => {
      const vector = args.find(Array.isArray);
      if (vector === undefined) return f(...args);
      return vector.map((_, i) => over(...args.map((arg) => (Array.isArray(arg) ? (arg[i] as Value) : arg))));
    };
    return over;
  };
  const own = numberFunctions(math);
  const functions: Record<string, Callable> = {
    choose_: broadcast((test, yes, no) =>
      test === true || (test !== false && !(test as BigNumber).isZero()) ? yes : no,
    ),
  };
  for (const [name, { shape }] of Object.entries(FUNCTIONS)) {
    const ownFunction = own[name];
    const plain: Callable = (...args) => builtIn[name]?.(...args.map(numbers)) as Value;
    const one: Callable =
      ownFunction === undefined ? plain : (...args) => ownFunction(...args.map((arg) => number(arg)));
    if (shape === "elementwise") functions[name] = broadcast(one);
    else if (shape === "extremum")
      functions[name] = (...args) => (args.length === 1 ? plain(...args) : broadcast(plain)(...args));
    else functions[name] = plain;
  }
  const vector = (value: Value | undefined): BigNumber[] => (value as Value[]).map(number);
  functions["length"] = (of) => math.bignumber((of as Value[]).length);
  functions["norm"] = (of) =>
    vector(of)
      .reduce((sum, x) => sum.plus(x.times(x)), math.bignumber(0))
      .sqrt();
  functions["sort"] = (of) => vector(of).sort((a, b) => a.comparedTo(b));
  functions["cumprod"] = (of) => {
    let product = math.bignumber(1);
    return vector(of).map((x) => (product = product.times(x)));
  };
  return functions;
}

/** Functions of numbers that mathjs lacks for BigNumber, or defines otherwise than the language. */
function numberFunctions(math: MathJsInstance): Record<string, (...args: BigNumber[]) => BigNumber> {
  const big = (value: number): BigNumber => math.bignumber(value);
  const pi = math.acos(big(-1));
  const half = big(0.5);
  /** Phi(z) - 1/2 = phi(z) sum z^(2k+1) / (1 3 5 ... (2k+1)) (Abramowitz & Stegun 26.2.11): terms of one sign. */
  const fromMiddle = (z: BigNumber): BigNumber => {
    const square = z.times(z);
    let [term, total] = [z, z];
    for (let k = 1; k < 20_000 && term.abs().gt(total.abs().times(1e-66)); k++) {
      term = term.times(square).div(2 * k + 1);
      total = total.plus(term);
    }
    return density(z).times(total);
  };
  const density = (z: BigNumber): BigNumber => z.times(z).times(-0.5).exp().div(pi.times(2).sqrt());
  const root2 = big(2).sqrt();
  const erf = (x: BigNumber): BigNumber => fromMiddle(x.times(root2)).times(2);
  const cdf = (z: BigNumber): BigNumber => half.plus(fromMiddle(z));
  return {
    floor: (a) => a.floor(),
    ceil: (a) => a.ceil(),
    fix: (a) => a.trunc(),
    round: (a) => (a.minus(a.trunc()).abs().gte(half) ? a.trunc().plus(a.isNegative() ? -1 : 1) : a.trunc()),
    mod: (a, b) => (b === undefined || b.isZero() ? a : a.minus(b.times(a.div(b).floor()))),
    erf,
    erfc: (x) => big(1).minus(erf(x)),
    normalPdf: density,
    normalCdf: cdf,
    normalQuantile: (p) => {
      // Newton's method from 0 on the side of the smaller tail, where Phi is convex: no step goes astray.
      const upper = p.gt(half);
      const target = upper ? big(1).minus(p) : p;
      let z = big(0);
      for (let i = 0; i < 400; i++) {
        const step = cdf(z).minus(target).div(density(z));
        z = z.minus(step);
        if (step.abs().lt(1e-55)) break;
      }
      return upper ? z.neg() : z;
    },
  };
}

/** The value of the last line. */
function last(value: unknown): unknown {
  if (typeof value !== "object" || value === null || !("entries" in value) || Array.isArray(value))
    return value;
  return (value.entries as unknown[]).at(-1);
}

/** A formula from text to WebAssembly: parse, elaborate, plan, emit. */
import { kernelBytes } from "../kernels/instance.js";
import { Builder } from "./builder.js";
import { FormulaError } from "./contract.js";
import type { CompiledFormula, FormulaConstant, FormulaScope } from "./contract.js";
import { elaborate } from "./elaborate.js";
import type { Elaborated, NamedShape } from "./elaborate.js";
import { FUNCTION_TYPE, emitFunction } from "./emit/function.js";
import { KernelModule } from "./emit/module.js";
import { runKernel } from "./fold.js";
import { isVector } from "./ir.js";
import type { IrNode } from "./ir.js";
import { LIMITS } from "./language.js";
import { loadMathjs } from "./mathjs.js";
import { messages } from "./messages.js";
import { parseFormula } from "./parse.js";
import { makePlan } from "./plan.js";
import { describe } from "./shapes.js";

/** What a formula holds, for `tolerand check`. */
export interface FormulaDescription {
  /** The names given on its lines with their shapes in words: "a number", "a condition", "a vector of 64". */
  readonly names: readonly NamedShape[];
  readonly result: string;
}

const BEGINNING = { line: 1, column: 1 };

/**
 * Compiles a formula. The result of the formula must be a number or a condition, or for 2 components a vector of two,
 * which become channels 0 and 1.
 * Throws FormulaError with the place in the text for anything that is not in the language.
 */
export async function compileFormula(
  text: string,
  scope: FormulaScope,
  components: 1 | 2 = 1,
): Promise<CompiledFormula> {
  const builder = new Builder(runKernel);
  const { result } = await elaborateText(text, scope, builder);
  if (components === 2) return compilePair(builder, result, scope);
  if (result.kind === "matrix" || isVector(result.node)) {
    throw new FormulaError(messages.resultShape(describe(result)), builder.at);
  }
  const indicator = takesOnlyZeroAndOne(result.node);
  return emitGraph(builder, [builder.toNumber(result.node)], dimensionOf(scope), indicator);
}

function compilePair(builder: Builder, result: Elaborated["result"], scope: FormulaScope): CompiledFormula {
  if (result.kind === "matrix" || !isVector(result.node) || result.node.length !== 2) {
    throw new FormulaError(messages.pairShape(describe(result)), builder.at);
  }
  const { node } = result;
  const roots = [0, 1].map((i) => builder.toNumber(builder.element(node, i)));
  return emitGraph(builder, roots, dimensionOf(scope), false);
}

/** Shapes of the names of a formula and of its result. Throws FormulaError. */
export async function describeFormula(text: string, scope: FormulaScope): Promise<FormulaDescription> {
  const { names, result } = await elaborateText(text, scope, new Builder(runKernel));
  return { names, result: describe(result) };
}

/**
 * The value of a formula of constants, such as "2^31 - 1" or "normalCdf(1.2) / 2", with the accuracy of the kernels;
 * a condition gives 0 or 1. Throws FormulaError.
 */
export async function evaluateConstant(
  text: string,
  constants: Readonly<Record<string, FormulaConstant>> = {},
): Promise<number> {
  const builder = new Builder(runKernel);
  const { result } = await elaborateText(text, { inputs: [], constants }, builder);
  if (result.kind === "matrix" || result.node.kind !== "number") {
    throw new FormulaError(messages.resultShape(describe(result)), builder.at);
  }
  return result.node.value;
}

async function elaborateText(text: string, scope: FormulaScope, builder: Builder): Promise<Elaborated> {
  const math = await loadMathjs();
  return elaborate(parseFormula(text, math), scope, builder);
}

function dimensionOf(scope: FormulaScope): number {
  return Math.max(0, ...scope.inputs.map(({ first, length }) => first + (length ?? 1)));
}

/** Emits the function that computes `roots`, one channel each. */
export function emitGraph(
  builder: Builder,
  roots: readonly IrNode[],
  dimension: number,
  indicator: boolean,
): CompiledFormula {
  const plan = makePlan(builder.nodes, roots, (node) => builder.isExpensive(node));
  const blockPoints = blockPointsFor(dimension);
  const module = new KernelModule(kernelBytes());
  const { body, pool, scratchBytes } = emitFunction(plan, {
    module,
    blockPoints,
    unroll: unrollFor(builder),
  });
  if (scratchBytes > LIMITS.scratchBytes)
    throw new FormulaError(messages.tooMuchScratch(scratchBytes), BEGINNING);
  return {
    moduleBytes: module.with([{ name: "integrand", type: FUNCTION_TYPE, body }]),
    exportName: "integrand",
    dimension,
    channels: roots.length,
    indicator,
    blockPoints,
    pool,
    scratchBytes,
  };
}

const SMALLEST_BLOCK = 64;
const LARGEST_BLOCK = 2048;
/** Bytes of coordinates that a block holds: with results and scratch they stay in the 32 to 48 KB of first-level cache. */
const BLOCK_BYTES = 32 * 1024;

/** Points per block: the most, in multiples of 64, whose coordinates take 32 KB. */
export function blockPointsFor(dimension: number): number {
  const fitting = Math.floor(BLOCK_BYTES / (8 * Math.max(1, dimension)) / SMALLEST_BLOCK) * SMALLEST_BLOCK;
  return Math.min(LARGEST_BLOCK, Math.max(SMALLEST_BLOCK, fitting));
}

/** Nodes above which one vector a turn is enough: the function would only grow. */
const MANY_NODES = 4_000;

/**
 * Vectors of two points per turn. Four hide the latency of additions: a Gaussian peak in 8 dimensions takes 2.7 ns a
 * point with four, 3.1 with two, 3.7 with one; a barrier on a path of 64 steps 135, 141 and 173 ns. Where a running sum
 * feeds one heavy kernel, fewer would be better (mean(exp(cumsum(x))) 99 ns with one against 103, normalCdf in place of
 * exp 168 with two against 199): not worth a second rule.
 */
function unrollFor(builder: Builder): number {
  return builder.nodes.length > MANY_NODES ? 1 : 4;
}

/** Conditions, products and choices of them. */
function takesOnlyZeroAndOne(node: IrNode): boolean {
  if (node.condition) return true;
  if (node.kind === "number") return node.value === 0 || node.value === 1;
  if (node.kind === "reduce") return node.op !== "sum" && takesOnlyZeroAndOne(node.of);
  if (node.kind !== "apply") return false;
  if (node.op === "number") return true;
  if (node.op === "select") return node.args.slice(1).every(takesOnlyZeroAndOne);
  return (
    (node.op === "mul" || node.op === "min" || node.op === "max") && node.args.every(takesOnlyZeroAndOne)
  );
}

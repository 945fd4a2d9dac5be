/**
 * Makes nodes of the graph: folds constants, gives back the same node for the same thing, and moves slices and single
 * elements down to the leaves, so that only sorted, running and listed vectors are ever sliced in memory.
 *
 * A folded constant has the very bits that the compiled code would compute: instructions round alike in JavaScript
 * (IEEE 754), sums run in the same order, and transcendental functions are folded by running the kernel itself.
 */
import { FormulaError } from "./contract.js";
import type { FormulaPosition } from "./contract.js";
import { isConstant, isVector, operands } from "./ir.js";
import type { IrNode, NumberNode, ReduceName, ValuesNode, VectorNode } from "./ir.js";
import { LIMITS } from "./language.js";
import { messages } from "./messages.js";
import {
  ARITHMETIC,
  COMPARISONS,
  givesCondition,
  isArithmetic,
  isComparison,
  isKernelName,
} from "./primitives.js";
import type { KernelName, PrimitiveName } from "./primitives.js";
import { COMBINE, START } from "./reductions.js";

/** Runs a kernel over columns of arguments. */
export type KernelRunner = (name: KernelName, columns: readonly Float64Array[]) => Float64Array;

type Draft<T> = T extends IrNode ? Omit<T, "id"> : never;

/** Lists up to this length hash by content; longer ones are told apart by identity. */
const HASHED = 64;

export class Builder {
  /** Where in the text the operation under way stands; used in errors. */
  at: FormulaPosition = { line: 1, column: 1 };
  readonly nodes: IrNode[] = [];
  readonly #known = new Map<string, IrNode>();
  readonly #runKernel: KernelRunner;
  readonly #expensive = new Set<number>();
  readonly #depths: number[] = [];
  /** Slices and elements already moved to the leaves; without it shared nodes would be walked again and again. */
  readonly #moved = new Map<string, IrNode>();
  #constantElements = 0;
  #operations = 0;

  constructor(runKernel: KernelRunner) {
    this.#runKernel = runKernel;
  }

  fail(message: string): never {
    throw new FormulaError(message, this.at);
  }

  number(value: number): NumberNode {
    const draft = { kind: "number", value, length: null, condition: false } as const;
    return this.#node(`n${Object.is(value, -0) ? "-0" : value}`, draft) as NumberNode;
  }

  condition(value: boolean): NumberNode {
    const draft = { kind: "number", value: Number(value), length: null, condition: true } as const;
    return this.#node(`c${value}`, draft) as NumberNode;
  }

  values(values: Float64Array): ValuesNode {
    this.#checkLength(values.length);
    this.#constantElements += values.length;
    if (this.#constantElements > LIMITS.constantElements) this.fail(messages.tooManyConstants());
    const bytes = Buffer.from(values.buffer, values.byteOffset, values.byteLength);
    const key = values.length <= HASHED ? `v${bytes.toString("latin1")}` : null;
    const draft = { kind: "values", values, length: values.length, condition: false } as const;
    return this.#node(key, draft) as ValuesNode;
  }

  row(row: number): IrNode {
    return this.#node(`x${row}`, { kind: "row", row, length: null, condition: false });
  }

  rows(first: number, length: number, step = 1): VectorNode {
    this.#checkLength(length);
    const draft = { kind: "rows", first, step, length, condition: false } as const;
    return this.#node(`X${first},${step},${length}`, draft) as VectorNode;
  }

  /** An elementwise operation; shapes have been checked. */
  apply(op: PrimitiveName, ...args: IrNode[]): IrNode {
    const folded = this.#simplify(op, args);
    if (folded !== null) return folded;
    const length = args.find(isVector)?.length ?? null;
    const condition = givesCondition(op) || (op === "select" && args.slice(1).every((arg) => arg.condition));
    const key = `${op}(${args.map((arg) => arg.id).join()})`;
    const node = this.#node(key, { kind: "apply", op, args, length, condition });
    if (isKernelName(op) || args.some((arg) => isVector(arg) && this.isExpensive(arg)))
      this.#expensive.add(node.id);
    return node;
  }

  reduce(op: ReduceName, of: VectorNode): IrNode {
    if (of.kind === "values") {
      const combine = ARITHMETIC[COMBINE[op]];
      let total = START[op];
      for (const value of of.values) total = combine(total, value);
      return this.number(total);
    }
    const vector = this.toNumber(of) as VectorNode;
    if (vector.length === 1) return this.element(vector, 0);
    if (vector.kind === "stack") return vector.items.reduce((a, b) => this.apply(COMBINE[op], a, b));
    return this.#node(`${op}[${vector.id}]`, {
      kind: "reduce",
      op,
      of: vector,
      length: null,
      condition: false,
    });
  }

  scan(op: "sum" | "prod", of: VectorNode): VectorNode {
    if (of.kind === "values") {
      const combine = ARITHMETIC[COMBINE[op]];
      let total = START[op];
      return this.values(of.values.map((value) => (total = combine(total, value))));
    }
    const vector = this.toNumber(of) as VectorNode;
    const draft = { kind: "scan", op, of: vector, length: vector.length, condition: false } as const;
    const node = this.#node(`scan ${op}[${vector.id}]`, draft) as VectorNode;
    this.#expensive.add(node.id);
    return node;
  }

  /** A vector of numbers. */
  stack(items: readonly IrNode[]): VectorNode {
    if (items.every((item) => item.kind === "number" && !item.condition)) {
      return this.values(Float64Array.from(items, (item) => (item as NumberNode).value));
    }
    const numbers = items.map((item) => this.toNumber(item));
    const draft = { kind: "stack", items: numbers, length: numbers.length, condition: false } as const;
    return this.#node(`[${numbers.map((item) => item.id).join()}]`, draft) as VectorNode;
  }

  product(matrix: ValuesNode, columns: number, of: VectorNode): VectorNode {
    const length = matrix.length / columns;
    if (of.kind === "values") {
      const result = new Float64Array(length);
      for (let i = 0; i < length; i++) {
        let total = 0;
        for (let j = 0; j < columns; j++)
          total += (matrix.values[i * columns + j] ?? 0) * (of.values[j] ?? 0);
        result[i] = total;
      }
      return this.values(result);
    }
    const vector = this.toNumber(of) as VectorNode;
    const draft = { kind: "product", matrix, columns, of: vector, length, condition: false } as const;
    const node = this.#node(`M${matrix.id}[${vector.id}]`, draft) as VectorNode;
    this.#expensive.add(node.id);
    return node;
  }

  sort(of: VectorNode): VectorNode {
    if (of.kind === "values") {
      const spoilt = of.values.some(Number.isNaN); // as the sorting network does, see sort-rows.ts
      return this.values(spoilt ? new Float64Array(of.length).fill(NaN) : of.values.slice().sort());
    }
    if (of.length === 1 || of.kind === "sort") return of;
    const vector = this.toNumber(of) as VectorNode;
    const draft = { kind: "sort", of: vector, length: vector.length, condition: false } as const;
    return this.#node(`sort[${vector.id}]`, draft) as VectorNode;
  }

  /** Elements first, first + step, ... (0-based) of a vector. */
  slice(of: VectorNode, first: number, step: number, length: number): VectorNode {
    if (first === 0 && step === 1 && length === of.length) return of;
    const key = `${of.id}:${first},${step},${length}`;
    const moved = this.#moved.get(key) ?? this.#slice(of, first, step, length);
    this.#moved.set(key, moved);
    return moved as VectorNode;
  }

  #slice(of: VectorNode, first: number, step: number, length: number): VectorNode {
    switch (of.kind) {
      case "values":
        return this.values(Float64Array.from({ length }, (_, i) => of.values[first + i * step] ?? NaN));
      case "rows":
        return this.rows(of.first + first * of.step, length, of.step * step);
      case "slice":
        return this.slice(of.of, of.first + first * of.step, of.step * step, length);
      case "stack":
        return this.stack(Array.from({ length }, (_, i) => this.element(of, first + i * step)));
      case "apply":
        if (of.condition || !this.isExpensive(of)) {
          const args: IrNode[] = [];
          for (const arg of of.args) args.push(isVector(arg) ? this.slice(arg, first, step, length) : arg);
          return this.apply(of.op, ...args) as VectorNode;
        }
        break;
      default:
        break;
    }
    const draft = { kind: "slice", of, first, step, length, condition: false } as const;
    return this.#node(`slice ${first},${step},${length}[${of.id}]`, draft) as VectorNode;
  }

  /** Element `index` (0-based) of a vector. */
  element(of: VectorNode, index: number): IrNode {
    const key = `${of.id}:${index}`;
    const moved = this.#moved.get(key) ?? this.#element(of, index);
    this.#moved.set(key, moved);
    return moved;
  }

  #element(of: VectorNode, index: number): IrNode {
    switch (of.kind) {
      case "values":
        return this.number(of.values[index] ?? NaN);
      case "rows":
        return this.row(of.first + index * of.step);
      case "slice":
        return this.element(of.of, of.first + index * of.step);
      case "stack":
        return of.items[index] as IrNode;
      case "apply": {
        const args: IrNode[] = [];
        for (const arg of of.args) args.push(isVector(arg) ? this.element(arg, index) : arg);
        return this.apply(of.op, ...args);
      }
      case "scan":
        if (index === 0) return this.element(of.of, 0);
        // The last running sum is the sum, which shares its loop with the running sums.
        if (index === of.length - 1) return this.reduce(of.op, of.of);
        break;
      case "sort":
        if (index === 0) return this.reduce("min", of.of);
        if (index === of.length - 1) return this.reduce("max", of.of);
        break;
      default:
        break;
    }
    return this.#node(`${of.id}[${index}]`, { kind: "pick", of, index, length: null, condition: false });
  }

  /** 0 or 1 for a condition; numbers stay. */
  toNumber(node: IrNode): IrNode {
    return node.condition ? this.apply("number", node) : node;
  }

  /** A number holds as a condition unless it is 0 or NaN. */
  toCondition(node: IrNode): IrNode {
    return node.condition ? node : this.apply("gt", this.apply("abs", node), this.number(0));
  }

  /** Whether recomputing the vector costs more than reading it back from memory. */
  isExpensive(node: IrNode): boolean {
    return this.#expensive.has(node.id);
  }

  /** Constant results and identities that change no bit of a number. Null where there is none. */
  #simplify(op: PrimitiveName, args: readonly IrNode[]): IrNode | null {
    const [a, b, c] = args;
    if (op === "select" && a?.kind === "number" && b !== undefined && c !== undefined) {
      return this.#repeat(a.value === 1 ? b : c, args);
    }
    if (op === "select" && b === c && b !== undefined && (isVector(b) || a?.length === null)) return b;
    if (op === "and" || op === "or") return this.#simplifyLogic(op, args);
    if (op === "not" && a?.kind === "apply" && a.op === "not") return a.args[0] ?? null;
    if (op === "not" && a?.kind === "number") return this.condition(a.value === 0);
    if (op === "number" && a?.kind === "number") return this.number(a.value);
    if (op === "number" && a?.kind === "apply" && a.args.every(isConstant)) return a.args[0] ?? null;
    return args.every(isConstant) ? this.#fold(op, args) : null;
  }

  #simplifyLogic(op: "and" | "or", args: readonly IrNode[]): IrNode | null {
    const constant = args.find((arg) => arg.kind === "number");
    if (constant === undefined) return args[0] === args[1] ? (args[0] ?? null) : null;
    const other = args[0] === constant ? args[1] : args[0];
    if (other === undefined) return null;
    return (constant.value === 1) === (op === "and") ? other : this.#repeat(constant, args);
  }

  /** A number chosen where the result is a vector: repeated. */
  #repeat(node: IrNode, args: readonly IrNode[]): IrNode {
    const length = args.find(isVector)?.length;
    if (length === undefined || isVector(node)) return node;
    if (node.condition) {
      const ones = this.values(new Float64Array(length).fill(node.kind === "number" ? node.value : 1));
      const repeated = this.#comparedToZero(ones);
      return node.kind === "number" ? repeated : this.apply("and", node, repeated);
    }
    return this.stack(new Array<IrNode>(length).fill(node));
  }

  /** A constant condition of a vector is kept as zeros and ones compared with 0. */
  #comparedToZero(zerosAndOnes: ValuesNode): IrNode {
    const args = [zerosAndOnes, this.number(0)];
    const draft = { kind: "apply", op: "ne", args, length: zerosAndOnes.length, condition: true } as const;
    return this.#node(`ne(${zerosAndOnes.id},0)`, draft);
  }

  #fold(op: PrimitiveName, args: readonly (NumberNode | ValuesNode)[]): IrNode | null {
    const length = args.find(isVector)?.length;
    const size = length ?? 1;
    const columns = args.map((arg) =>
      arg.kind === "values" ? arg.values : new Float64Array(size).fill(arg.value),
    );
    let result: Float64Array;
    if (isKernelName(op)) {
      result = this.#runKernel(op, columns);
    } else if (isArithmetic(op) || isComparison(op)) {
      const [a, b] = columns;
      const compute: (a: number, b: number) => number | boolean = isArithmetic(op)
        ? ARITHMETIC[op]
        : COMPARISONS[op];
      result = Float64Array.from({ length: size }, (_, i) => Number(compute(a?.[i] ?? NaN, b?.[i] ?? NaN)));
    } else {
      return null;
    }
    const first = result[0] ?? NaN;
    if (isComparison(op)) {
      if (length === undefined) return this.condition(first === 1);
      return this.#comparedToZero(this.values(result));
    }
    return length === undefined ? this.number(first) : this.values(result);
  }

  #checkLength(length: number): void {
    if (length > LIMITS.elements) this.fail(messages.tooManyElements(length));
    if (length < 1) this.fail(messages.emptyRange());
  }

  #node(key: string | null, draft: Draft<IrNode>): IrNode {
    const known = key === null ? undefined : this.#known.get(key);
    if (known !== undefined) return known;
    this.#operations += draft.kind === "stack" ? draft.items.length : 1;
    if (this.#operations > LIMITS.operations) this.fail(messages.tooManyOperations());
    const node: IrNode = { ...draft, id: this.nodes.length };
    const depth = 1 + Math.max(0, ...operands(node).map((operand) => this.#depths[operand.id] ?? 0));
    if (depth > LIMITS.chain) this.fail(messages.chainTooLong());
    this.#depths.push(depth);
    this.nodes.push(node);
    if (key !== null) this.#known.set(key, node);
    return node;
  }
}

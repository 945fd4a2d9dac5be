/** What the writers of numbers and of loops share while one function is emitted. */
import type { IrNode, StackNode, VectorNode } from "../ir.js";
import type { Plan } from "../plan.js";
import { writeOperation } from "./apply.js";
import { Code, Locals } from "./code.js";
import type { KernelModule } from "./module.js";
import { I32 } from "./opcodes.js";
import { Pool } from "./pool.js";
import { Kernels } from "./splice.js";

/** Parameters of the emitted function, in order. */
export const PARAMETERS = { x: 0, result: 1, count: 2, pool: 3, scratch: 4 } as const;
export const PARAMETER_TYPES = [I32, I32, I32, I32, I32];
/** Bytes of one vector of two points. */
export const VECTOR = 16;

export interface FunctionOptions {
  readonly module: KernelModule;
  /** Points per block, which is the distance of coordinates in x and of channels in result. */
  readonly blockPoints: number;
  /** Vectors per turn: 1 or 4. */
  readonly unroll: number;
}

export class Frame {
  readonly plan: Plan;
  readonly options: FunctionOptions;
  readonly locals = new Locals(PARAMETER_TYPES.length);
  readonly pool = new Pool(this.locals);
  readonly kernels: Kernels;
  readonly code = new Code();
  /** Locals of numbers by node id, one per vector of the turn. */
  readonly #bound = new Map<number, readonly number[]>();

  constructor(plan: Plan, options: FunctionOptions) {
    this.plan = plan;
    this.options = options;
    this.kernels = new Kernels(options.module, this.locals);
  }

  get unroll(): number {
    return this.options.unroll;
  }

  /** Locals for a value in each vector of the turn. */
  vectors(): number[] {
    return Array.from({ length: this.unroll }, () => this.locals.vector());
  }

  bind(node: IrNode, locals: readonly number[]): void {
    this.#bound.set(node.id, locals);
  }

  /** Bytes between neighbouring elements of a vector in scratch memory. */
  get memoryStride(): number {
    return this.unroll * VECTOR;
  }

  get rowStride(): number {
    return this.options.blockPoints * 8;
  }

  /** Byte offset in scratch memory of an element of a vector that is kept there. */
  memoryOffset(node: VectorNode, index: number): number {
    return ((this.plan.memory.get(node.id) ?? 0) + index) * this.memoryStride;
  }

  pushConstant(code: Code, value: number): void {
    code.get(this.pool.number(value));
  }

  /** The local of a number that has one. */
  localOf(node: IrNode, u: number): number {
    const local = this.#bound.get(node.id)?.[u];
    if (local === undefined) throw new TypeError(`a ${node.kind} without a local`);
    return local;
  }

  /** Pushes the value of a number for vector `u` of the turn. */
  pushNumber(code: Code, node: IrNode, u: number): void {
    const bound = this.#bound.get(node.id);
    if (bound !== undefined) return code.get(bound[u] ?? 0);
    switch (node.kind) {
      case "number":
        return this.pushConstant(code, node.value);
      case "row":
        return code.load(PARAMETERS.x, node.row * this.rowStride + u * VECTOR);
      case "pick":
        return code.load(PARAMETERS.scratch, this.memoryOffset(node.of, node.index) + u * VECTOR);
      case "apply":
        return writeOperation(code, node.op, node.args.length, {
          push: (argument) => this.pushNumber(code, node.args[argument] as IrNode, u),
          pushOne: () => this.pushConstant(code, 1),
          kernel: (name) => this.kernels.call(code, name),
        });
      default:
        throw new TypeError(`a ${node.kind} where a number is expected`);
    }
  }

  /** Keeps a number in locals, or writes a list to memory. */
  writeNumber(node: IrNode): void {
    if (node.kind === "stack") return this.#writeStack(node);
    const locals = this.vectors();
    for (let u = 0; u < this.unroll; u++) {
      this.pushNumber(this.code, node, u);
      this.code.set(locals[u] ?? 0);
    }
    this.bind(node, locals);
  }

  #writeStack(node: StackNode): void {
    node.items.forEach((item, index) => {
      for (let u = 0; u < this.unroll; u++) {
        this.code.get(PARAMETERS.scratch);
        this.pushNumber(this.code, item, u);
        this.code.store(this.memoryOffset(node, index) + u * VECTOR);
      }
    });
  }
}

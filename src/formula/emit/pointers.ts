/** Addresses that move along with a loop over elements: one per stride, whatever the number of vectors read. */
import type { RowsNode, VectorNode } from "../ir.js";
import type { Code } from "./code.js";
import { PARAMETERS, VECTOR } from "./frame.js";
import type { Frame } from "./frame.js";
import { OP } from "./opcodes.js";

interface Pointer {
  readonly local: number;
  readonly base: number;
  /** Bytes to add per element. */
  readonly stride: number;
}

export class Pointers {
  readonly #frame: Frame;
  readonly #length: number;
  readonly #pointers = new Map<string, Pointer>();

  constructor(frame: Frame, length: number) {
    this.#frame = frame;
    this.#length = length;
  }

  /** Steps along the doubles of the pool. */
  pool(): number {
    return this.#pointer(PARAMETERS.pool, 8);
  }

  memory(step: number): number {
    return this.#pointer(PARAMETERS.scratch, step * this.#frame.memoryStride);
  }

  pushRow(code: Code, node: RowsNode, u: number): void {
    const stride = node.step * this.#frame.rowStride;
    const lowest = this.#lowest(node.first, node.step) * this.#frame.rowStride;
    code.load(this.#pointer(PARAMETERS.x, stride), lowest + u * VECTOR);
  }

  pushMemory(code: Code, node: VectorNode, first: number, step: number, u: number): void {
    code.load(this.memory(step), this.#frame.memoryOffset(node, this.#lowest(first, step)) + u * VECTOR);
  }

  writeEntry(code: Code): void {
    for (const { local, base, stride } of this.#pointers.values()) {
      code.get(base);
      // Going down, the pointer starts above its base, so that offsets are never negative.
      if (stride < 0) {
        code.integer(-stride * (this.#length - 1));
        code.op(OP.i32Add);
      }
      code.set(local);
    }
  }

  writeAdvance(code: Code): void {
    for (const { local, stride } of this.#pointers.values()) code.advance(local, stride);
  }

  /** The lowest index of a slice: its first when going up, its last when going down. */
  #lowest(first: number, step: number): number {
    return step > 0 ? first : first + step * (this.#length - 1);
  }

  #pointer(base: number, stride: number): number {
    const key = `${base} ${stride}`;
    const known = this.#pointers.get(key);
    if (known !== undefined) return known.local;
    const pointer = { local: this.#frame.locals.integer(), base, stride };
    this.#pointers.set(key, pointer);
    return pointer.local;
  }
}

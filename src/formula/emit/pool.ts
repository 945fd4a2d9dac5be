/** The constants of an emitted function, which it reads from memory: v128.const is slow in V8. */
import type { ValuesNode } from "../ir.js";
import type { Code, Locals } from "./code.js";

export class Pool {
  readonly #locals: Locals;
  readonly #numbers = new Map<number | "-0", number>();
  readonly #offsets = new Map<number, number>();
  readonly #parts: Float64Array[] = [];
  readonly #entry: { readonly local: number; readonly offset: number }[] = [];
  #size = 0;

  constructor(locals: Locals) {
    this.#locals = locals;
  }

  /** The local that holds a constant in both lanes throughout the function. */
  number(value: number): number {
    // Map takes 0 and -0 for the same key.
    const key = Object.is(value, -0) ? "-0" : value;
    const known = this.#numbers.get(key);
    if (known !== undefined) return known;
    const local = this.#locals.vector();
    this.#numbers.set(key, local);
    this.#entry.push({ local, offset: this.#add(Float64Array.of(value)) });
    return local;
  }

  /** Byte offset of the first element of a constant vector. */
  vector(node: ValuesNode): number {
    const known = this.#offsets.get(node.id);
    if (known !== undefined) return known;
    const offset = this.#add(node.values);
    this.#offsets.set(node.id, offset);
    return offset;
  }

  /** Loads all constants into their locals; to stand at the function's entry. */
  writeEntry(code: Code, pointer: number): void {
    for (const { local, offset } of this.#entry) {
      code.loadSplat(pointer, offset);
      code.set(local);
    }
  }

  content(): Float64Array<ArrayBuffer> {
    const all = new Float64Array(this.#size);
    let at = 0;
    for (const part of this.#parts) {
      all.set(part, at);
      at += part.length;
    }
    return all;
  }

  #add(values: Float64Array): number {
    const offset = this.#size * 8;
    this.#parts.push(values);
    this.#size += values.length;
    return offset;
  }
}

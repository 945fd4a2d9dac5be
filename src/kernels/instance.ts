/** Loading and instantiating the kernel module, and handing out its memory. */
import { readFileSync } from "node:fs";
import type { KernelExports } from "./exports.js";

/** One instance of the kernel module (alone or with a formula spliced in) and its memory. */
export interface Kernels {
  readonly exports: KernelExports;
  /** The spliced formula of this module (formula/contract.ts), where there is one. */
  readonly formula: unknown;
  readonly arena: Arena;
  /** View of `length` doubles at byte address `pointer`; do not keep it over an allocation. */
  f64(pointer: number, length: number): Float64Array;
  /** View of `length` 64-bit words at byte address `pointer`; do not keep it over an allocation. */
  u64(pointer: number, length: number): BigUint64Array;
  /** View of `length` 32-bit words at byte address `pointer`; do not keep it over an allocation. */
  u32(pointer: number, length: number): Uint32Array;
}

const PAGE = 65536;
const ALIGNMENT = 16;

/** Bump allocator over the kernel memory; grows it when needed. Memory is given back down to a mark, never piecewise. */
export class Arena {
  readonly #memory: WebAssembly.Memory;
  #next: number;

  constructor(memory: WebAssembly.Memory, first: number) {
    this.#memory = memory;
    this.#next = align(first);
  }

  /** Address of `bytes` fresh bytes, aligned to 16. The content is whatever was there before. Throws RangeError beyond 4 GiB. */
  allocate(bytes: number): number {
    const pointer = this.#next;
    const end = pointer + bytes;
    const missing = end - this.#memory.buffer.byteLength;
    if (missing > 0) this.#memory.grow(Math.ceil(missing / PAGE));
    this.#next = align(end);
    return pointer;
  }

  /** The present end of what is allocated; hand it to `release` to give back everything allocated later. */
  mark(): number {
    return this.#next;
  }

  release(mark: number): void {
    this.#next = mark;
  }
}

function align(pointer: number): number {
  return Math.ceil(pointer / ALIGNMENT) * ALIGNMENT;
}

let bytes: Uint8Array<ArrayBuffer> | undefined;

/** The bytes of kernels.wasm, as the formula emitter splices into them. */
export function kernelBytes(): Uint8Array<ArrayBuffer> {
  bytes ??= new Uint8Array(readFileSync(new URL("../../dist/kernels/kernels.wasm", import.meta.url)));
  return bytes;
}

let plain: WebAssembly.Module | undefined;

/** The kernel module without a formula. */
export function kernelModule(): WebAssembly.Module {
  plain ??= new WebAssembly.Module(kernelBytes());
  return plain;
}

/** A fresh instance of `module` (by default the plain kernels) with memory of its own. */
export function instantiateKernels(module: WebAssembly.Module = kernelModule()): Kernels {
  const abort = (): never => {
    throw new Error("a kernel aborted");
  };
  const instance = new WebAssembly.Instance(module, { env: { abort } });
  const exports = instance.exports as unknown as KernelExports;
  const memory = exports.memory;
  return {
    exports,
    formula: instance.exports["integrand"],
    arena: new Arena(memory, exports.heapBase()),
    f64: (pointer, length) => new Float64Array(memory.buffer, pointer, length),
    u64: (pointer, length) => new BigUint64Array(memory.buffer, pointer, length),
    u32: (pointer, length) => new Uint32Array(memory.buffer, pointer, length),
  };
}

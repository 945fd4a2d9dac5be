/** The body of one function under construction: locals and instructions. */
import { writeSigned, writeUnsigned } from "./leb.js";
import { EMPTY, I32, OP, SIMD, SIMD_OP, V128 } from "./opcodes.js";
import type { SimdName } from "./opcodes.js";

/** Locals of a function, numbered after its parameters. */
export class Locals {
  readonly types: number[] = [];
  readonly #parameters: number;

  constructor(parameters: number) {
    this.#parameters = parameters;
  }

  add(type: number): number {
    this.types.push(type);
    return this.#parameters + this.types.length - 1;
  }

  vector(): number {
    return this.add(V128);
  }

  integer(): number {
    return this.add(I32);
  }
}

/** A run of instructions. */
export class Code {
  readonly bytes: number[] = [];

  append(other: Code): void {
    for (const byte of other.bytes) this.bytes.push(byte);
  }

  raw(bytes: Iterable<number>): void {
    for (const byte of bytes) this.bytes.push(byte);
  }

  get(local: number): void {
    this.local(OP.localGet, local);
  }

  set(local: number): void {
    this.local(OP.localSet, local);
  }

  local(opcode: number, local: number): void {
    this.bytes.push(opcode);
    writeUnsigned(this.bytes, local);
  }

  simd(name: SimdName): void {
    this.bytes.push(SIMD);
    writeUnsigned(this.bytes, SIMD_OP[name]);
  }

  /** Loads a vector from the address in `pointer` plus `offset`. */
  load(pointer: number, offset: number): void {
    this.get(pointer);
    this.#memory("load", 4, offset);
  }

  /** Loads one double into both lanes. */
  loadSplat(pointer: number, offset: number): void {
    this.get(pointer);
    this.#memory("load64Splat", 3, offset);
  }

  /** Stores the vector on the stack; the address has been pushed before it. */
  store(offset: number): void {
    this.#memory("store", 4, offset);
  }

  zero(): void {
    this.simd("const");
    for (let i = 0; i < 16; i++) this.bytes.push(0);
  }

  integer(value: number): void {
    this.bytes.push(OP.i32Const);
    writeSigned(this.bytes, value);
  }

  op(opcode: number): void {
    this.bytes.push(opcode);
  }

  call(index: number): void {
    this.bytes.push(OP.call);
    writeUnsigned(this.bytes, index);
  }

  /** `local += bytes`. */
  advance(local: number, bytes: number): void {
    this.get(local);
    this.integer(bytes);
    this.op(OP.i32Add);
    this.set(local);
  }

  /** Runs `body` and again while the counter, lowered by `by` each time, is above 0. */
  loop(counter: number, by: number, body: Code): void {
    this.bytes.push(OP.loop, EMPTY);
    this.append(body);
    this.get(counter);
    this.integer(by);
    this.op(OP.i32Sub);
    this.local(OP.localTee, counter);
    this.integer(0);
    this.op(OP.i32GreaterSigned);
    this.bytes.push(OP.brIf, 0, OP.end);
  }

  #memory(name: SimdName, alignment: number, offset: number): void {
    this.simd(name);
    this.bytes.push(alignment);
    writeUnsigned(this.bytes, offset);
  }
}

/** Locals and code of a function as the code section holds them. */
export function functionBody(locals: Locals, code: Code): number[] {
  const runs: [count: number, type: number][] = [];
  for (const type of locals.types) {
    const last = runs.at(-1);
    if (last?.[1] === type) last[0] += 1;
    else runs.push([1, type]);
  }
  const bytes: number[] = [];
  writeUnsigned(bytes, runs.length);
  for (const [count, type] of runs) {
    writeUnsigned(bytes, count);
    bytes.push(type);
  }
  for (const byte of code.bytes) bytes.push(byte);
  bytes.push(OP.end);
  return bytes;
}

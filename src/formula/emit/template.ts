/**
 * A kernel's body made ready for splicing into another function: its locals can be renumbered and its `return` becomes
 * a branch out of the block that it is wrapped in. Calls and globals keep their indices, as functions are only appended.
 */
import type { KernelModule } from "./module.js";
import { Reader } from "./leb.js";
import { OP } from "./opcodes.js";

type Step =
  | { readonly kind: "raw"; readonly bytes: Uint8Array }
  | { readonly kind: "local"; readonly opcode: number; readonly index: number }
  | { readonly kind: "return"; readonly depth: number };

export interface Template {
  readonly parameters: number;
  /** Types of parameters and locals in order. */
  readonly locals: readonly number[];
  /** Locals to be zeroed at each splice: the body may read them before it sets them. */
  readonly zeroed: readonly number[];
  readonly result: number;
  readonly steps: readonly Step[];
}

/** Takes an exported kernel apart. Throws TypeError for instructions that kernels do not use. */
export function readTemplate(module: KernelModule, name: string): Template {
  const { type, body } = module.functionOf(name);
  const reader = new Reader(body);
  const locals = [...type.parameters];
  for (let groups = reader.unsigned(); groups > 0; groups--) {
    const repeat = reader.unsigned();
    const local = reader.byte();
    for (let k = 0; k < repeat; k++) locals.push(local);
  }
  const steps: Step[] = [];
  let depth = 0;
  const assigned = new Set(type.parameters.map((_, i) => i));
  const zeroed = new Set<number>();
  while (!reader.done) {
    const start = reader.position;
    const opcode = reader.byte();
    if (opcode === OP.end && depth === 0) break;
    if (opcode === OP.return) {
      steps.push({ kind: "return", depth });
      continue;
    }
    if (opcode >= OP.localGet && opcode <= OP.localTee) {
      const index = reader.unsigned();
      steps.push({ kind: "local", opcode, index });
      // Only what is set outside all blocks is sure to be set.
      if (opcode === OP.localGet && !assigned.has(index)) zeroed.add(index);
      if (opcode !== OP.localGet && depth === 0) assigned.add(index);
      continue;
    }
    if (opcode === OP.block || opcode === OP.loop || opcode === 0x04) depth += 1;
    if (opcode === OP.end) depth -= 1;
    skipImmediates(reader, opcode, name);
    const previous = steps.at(-1);
    const bytes = body.subarray(start, reader.position);
    if (previous?.kind === "raw")
      steps[steps.length - 1] = { kind: "raw", bytes: join(previous.bytes, bytes) };
    else steps.push({ kind: "raw", bytes });
  }
  const result = type.results[0];
  if (result === undefined) throw new TypeError(`the kernel "${name}" has no result`);
  return { parameters: type.parameters.length, locals, zeroed: [...zeroed], result, steps };
}

/** The parts lie one behind the other in the same body. */
function join(a: Uint8Array, b: Uint8Array): Uint8Array {
  return new Uint8Array(a.buffer, a.byteOffset, a.length + b.length);
}

/** Passes over what follows an opcode (core specification, 5.4). */
function skipImmediates(reader: Reader, opcode: number, name: string): void {
  if (opcode === 0x02 || opcode === 0x03 || opcode === 0x04) return reader.skipInteger(); // block types
  if (opcode <= 0x01 || opcode === 0x05 || opcode === 0x0b || opcode === 0x1a || opcode === 0x1b) return;
  if (opcode === 0x0c || opcode === 0x0d || opcode === 0x10 || opcode === 0x23 || opcode === 0x24) {
    return reader.skipInteger(); // br, br_if, call, global.get, global.set
  }
  if (opcode === 0x0e) {
    for (let labels = reader.unsigned() + 1; labels > 0; labels--) reader.skipInteger(); // br_table
    return;
  }
  if (opcode >= 0x28 && opcode <= 0x3e) return skipAddress(reader);
  if (opcode === 0x41 || opcode === 0x42) return reader.skipInteger();
  if (opcode === 0x43) return void reader.take(4);
  if (opcode === 0x44) return void reader.take(8);
  if (opcode >= 0x45 && opcode <= 0xc4) return; // comparisons, arithmetic, conversions
  if (opcode === 0xfd) return skipSimdImmediates(reader);
  throw new TypeError(
    `the kernel "${name}" holds the instruction 0x${opcode.toString(16)}, which cannot be spliced`,
  );
}

function skipAddress(reader: Reader): void {
  reader.skipInteger();
  reader.skipInteger();
}

function skipSimdImmediates(reader: Reader): void {
  const opcode = reader.unsigned();
  if (opcode <= 11 || opcode === 92 || opcode === 93) skipAddress(reader);
  else if (opcode === 12 || opcode === 13)
    reader.take(16); // constant, shuffle
  else if (opcode >= 21 && opcode <= 34)
    reader.byte(); // lane
  else if (opcode >= 84 && opcode <= 91) {
    skipAddress(reader);
    reader.byte();
  }
}

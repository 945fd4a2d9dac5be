/**
 * Kernels run on constants: the kernel module with one small function per kernel, which applies it to columns of
 * arguments. Platform functions (Math.exp, ...) are never used: their bits differ between machines.
 */
import { instantiateKernels, kernelBytes } from "../kernels/instance.js";
import type { Kernels } from "../kernels/instance.js";
import { Code, Locals, functionBody } from "./emit/code.js";
import { KernelModule } from "./emit/module.js";
import type { NewFunction } from "./emit/module.js";
import { I32 } from "./emit/opcodes.js";
import { KERNELS, isKernelName, kernelExport } from "./primitives.js";
import type { KernelName } from "./primitives.js";

/** Doubles that are computed at a time. */
const CHUNK = 1024;

let runner: Kernels | undefined;

/** Applies a kernel to columns of equal length. */
export function runKernel(name: KernelName, columns: readonly Float64Array[]): Float64Array {
  runner ??= instantiateKernels(new WebAssembly.Module(applyingModule()));
  const apply = (runner.exports as unknown as Record<string, unknown>)[applierName(name)];
  if (typeof apply !== "function") throw new RangeError(`there is no kernel for ${name}`);
  const length = columns[0]?.length ?? 0;
  const result = new Float64Array(length);
  const { arena } = runner;
  const mark = arena.mark();
  const pointers = columns.map(() => arena.allocate(CHUNK * 8));
  const out = arena.allocate(CHUNK * 8);
  for (let begin = 0; begin < length; begin += CHUNK) {
    const end = Math.min(length, begin + CHUNK);
    columns.forEach((column, i) => {
      const view = runner?.f64(pointers[i] ?? 0, CHUNK);
      view?.fill(1);
      view?.set(column.subarray(begin, end));
    });
    (apply as (...args: number[]) => void)(...pointers, out, CHUNK * 8);
    result.set(runner.f64(out, end - begin), begin);
  }
  arena.release(mark);
  return result;
}

function applierName(name: KernelName): string {
  return `apply_${name}`;
}

function applyingModule(): Uint8Array<ArrayBuffer> {
  const module = new KernelModule(kernelBytes());
  const names = Object.keys(KERNELS).filter(isKernelName);
  return module.with(
    names.filter((name) => module.has(kernelExport(name))).map((name) => applier(module, name)),
  );
}

/** f(columns..., result, bytes): from the last pair of doubles to the first. */
function applier(module: KernelModule, name: KernelName): NewFunction {
  const columns = KERNELS[name];
  const [result, left] = [columns, columns + 1];
  const body = new Code();
  for (let column = 0; column < columns; column++) body.advance(column, 0);
  body.get(result);
  for (let column = 0; column < columns; column++) body.load(column, 0);
  body.call(module.indexOf(kernelExport(name)));
  body.store(0);
  for (let pointer = 0; pointer <= columns; pointer++) body.advance(pointer, 16);
  const code = new Code();
  code.loop(left, 16, body);
  const parameters = new Array<number>(columns + 2).fill(I32);
  return {
    name: applierName(name),
    type: { parameters, results: [] },
    body: functionBody(new Locals(parameters.length), code),
  };
}

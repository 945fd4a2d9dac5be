/** Applies the vec_ kernels to arrays of doubles, for tests. */
import { instantiateKernels, kernelBytes } from "../../src/kernels/instance.js";
import { mapModule } from "../../tools/map-kernels.mjs";

type Loop = (inputs: number, outputs: number, count: number) => void;

/** Applies one kernel lane by lane; kernels of two arguments take two arrays of the same length. */
export type MapKernel = (first: Float64Array, second?: Float64Array) => Float64Array;

/** Array versions of the kernels `vec_<name>` for the names given. */
export function mapKernels<Name extends string>(names: readonly Name[]): Record<Name, MapKernel> {
  const kernels = instantiateKernels(new WebAssembly.Module(mapModule(kernelBytes(), names)));
  const exports = kernels.exports as unknown as Record<string, Loop>;
  const entries = names.map((name): [Name, MapKernel] => [
    name,
    (first, second) => {
      const loop = exports[`map_${name}`];
      if (loop === undefined) throw new Error(`no loop for ${name}`);
      const count = Math.ceil(first.length / 8) * 8;
      const mark = kernels.arena.mark();
      const inputs = kernels.arena.allocate(count * 16);
      const outputs = kernels.arena.allocate(count * 8);
      // the padding is filled as well, as memory given back earlier may hold anything
      kernels.f64(inputs, 2 * count).fill(1);
      kernels.f64(inputs, count).set(first);
      if (second !== undefined) kernels.f64(inputs + count * 8, count).set(second);
      loop(inputs, outputs, count);
      const result = kernels.f64(outputs, first.length).slice();
      kernels.arena.release(mark);
      return result;
    },
  ]);
  return Object.fromEntries(entries) as Record<Name, MapKernel>;
}

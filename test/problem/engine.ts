/** The smallest engine: points, transforms, formula, one block after the other. Enough to test problems with. */
import { instantiateKernels } from "../../src/kernels/instance.js";
import type { Kernels } from "../../src/kernels/instance.js";
import type { CompiledProblem } from "../../src/problem/compile.js";
import { makeKey } from "../../src/sources/key.js";
import { findSource } from "../../src/sources/registry.js";
import { TransformPasses } from "../../src/study/transform-passes.js";

type Integrand = (x: number, result: number, count: number, pool: number, scratch: number) => void;

export class Engine {
  readonly kernels: Kernels;
  readonly #problem: CompiledProblem;
  readonly #integrand: Integrand;
  readonly #passes: TransformPasses;
  readonly #addresses: { x: number; result: number; pool: number; scratch: number };

  constructor(problem: CompiledProblem) {
    const { moduleBytes, exportName, dimension, blockPoints, pool, scratchBytes } = problem.formula;
    this.#problem = problem;
    this.kernels = instantiateKernels(new WebAssembly.Module(moduleBytes));
    const { arena, exports } = this.kernels;
    this.#integrand = (exports as unknown as Record<string, Integrand>)[exportName] as Integrand;
    this.#addresses = {
      x: arena.allocate(Math.max(1, dimension) * blockPoints * 8),
      result: arena.allocate(blockPoints * 8),
      pool: arena.allocate(pool.byteLength),
      scratch: arena.allocate(scratchBytes),
    };
    this.kernels.f64(this.#addresses.pool, pool.length).set(pool);
    this.#passes = new TransformPasses(this.kernels, problem.transforms, this.#addresses.x, blockPoints);
  }

  /** Values of the integrand at the points that stand in the block as uniform coordinates. */
  #values(count: number): Float64Array {
    const { x, result, pool, scratch } = this.#addresses;
    this.#passes.run(count);
    this.#integrand(x, result, count, pool, scratch);
    return this.kernels.f64(result, count);
  }

  /** The value at one point of the unit cube. */
  at(coordinates: readonly number[]): number {
    const { blockPoints } = this.#problem.formula;
    const block = this.kernels.f64(this.#addresses.x, blockPoints * coordinates.length);
    for (const [row, value] of coordinates.entries())
      block.fill(value, row * blockPoints, (row + 1) * blockPoints);
    return this.#values(1)[0] ?? NaN;
  }

  /** Mean over n points of a source and the standard error that holds for independent points. */
  mean(sourceId: string, n: number, name: string): { mean: number; standardError: number } {
    const { dimension, blockPoints } = this.#problem.formula;
    const source = findSource(sourceId);
    if (source === undefined) throw new RangeError(`no source "${sourceId}"`);
    const key = makeKey({ seed: 1, purpose: "study", problem: name, source: sourceId, replicate: 0 });
    const stream = source.open({ dimension, n, randomisations: [], key }, this.kernels);
    let sum = 0;
    let squares = 0;
    for (let first = 0; first < n; first += blockPoints) {
      const count = Math.min(blockPoints, n - first);
      stream.fill(this.#addresses.x, blockPoints, count);
      for (const value of this.#values(count)) {
        sum += value;
        squares += value * value;
      }
    }
    const mean = sum / n;
    return { mean, standardError: Math.sqrt((squares / n - mean * mean) / (n - 1)) };
  }
}

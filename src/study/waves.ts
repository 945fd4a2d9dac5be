/**
 * The waves that a point set mistakes for constants: plane waves for a lattice, in pairs h, -h; Walsh functions for a digital
 * net, one by one, as their opposites are dual vectors of their own. Added up block by block beside the integrand.
 */
import type { Kernels } from "../kernels/instance.js";
import type { SparseVector, Weight } from "../structure/alias-set.js";
import { walshPhases } from "../structure/walsh.js";

export interface Wave extends Weight {
  readonly vector: SparseVector;
  /** The base of a Walsh function; null for a plane wave. */
  readonly walsh: number | null;
}

/** Adds value times wave over the points of a block to sums[k], for each wave k; row j begins at rows[j * stride]. */
export type AddWaves = (
  values: Float64Array,
  rows: Float64Array,
  stride: number,
  count: number,
  sums: Float64Array,
) => void;

/** What a mean of value times wave is to be multiplied by: a pair h, -h counts twice. */
export function factorOf({ size, walsh }: Wave): number {
  return walsh === null ? 2 * size : size;
}

/** Waves of one kind; what they need of kernel memory is taken from the arena. */
export function openWaves(waves: readonly Wave[], kernels: Kernels): AddWaves {
  const base = waves[0]?.walsh ?? null;
  return base === null ? planeWaves(waves, kernels) : walshFunctions(waves, base);
}

function planeWaves(waves: readonly Wave[], kernels: Kernels): AddWaves {
  const table = Float64Array.from(
    waves.flatMap(({ vector: { indices, entries }, phase }) => [
      phase,
      indices.length,
      ...indices.flatMap((index, k) => [index, entries[k] ?? 0]),
    ]),
  );
  const at = kernels.arena.allocate(table.byteLength);
  const sumsAt = kernels.arena.allocate(Math.max(1, waves.length) * 8);
  kernels.f64(at, table.length).set(table);
  return (values, rows, stride, count, sums) => {
    const own = kernels.f64(sumsAt, waves.length);
    own.set(sums);
    kernels.exports.aliasSums(rows.byteOffset, stride, count, values.byteOffset, 0, at, waves.length, sumsAt);
    sums.set(kernels.f64(sumsAt, waves.length));
  };
}

function walshFunctions(waves: readonly Wave[], base: number): AddWaves {
  const cosines = Float64Array.from({ length: base }, (_, p) => Math.cos((2 * Math.PI * p) / base));
  return (values, rows, stride, count, sums) => {
    waves.forEach(({ vector: { indices, entries } }, k) => {
      const phases = walshPhases(base, { indices, k: entries }, rows, stride, count);
      let sum = 0;
      for (let i = 0; i < count; i++) sum += (values[i] ?? 0) * (cosines[phases[i] ?? 0] ?? 0);
      sums[k] = (sums[k] ?? 0) + sum;
    });
  };
}

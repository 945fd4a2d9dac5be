/** Whether a source's own points see the wave of a probe as predicted: looked at before a file is written. */
import { instantiateKernels } from "../kernels/instance.js";
import type { SourceChoice } from "../sources/choice.js";
import { makeKey } from "../sources/key.js";
import type { Probe } from "../structure/probe.js";

const BLOCK = 256;

/** The least cosine over the first `n` points of a replicate (1 where each stands on a plane). */
export function leastCosine(choice: SourceChoice, probe: Probe, n: number, replicate: number): number {
  const { dimension, vector, phase } = probe;
  const kernels = instantiateKernels();
  const key = makeKey({ seed: 0, purpose: "points", problem: "probe", source: choice.id, replicate });
  const stream = choice.open({ dimension, n, key: choice.deterministic ? null : key, replicate }, kernels);
  const pointer = kernels.arena.allocate(BLOCK * dimension * 8);
  let least = 1;
  for (let begin = 0; begin < n; begin += BLOCK) {
    const count = Math.min(BLOCK, n - begin);
    stream.fill(pointer, BLOCK, count);
    const rows = kernels.f64(pointer, BLOCK * dimension);
    for (let i = 0; i < count; i++) {
      let turns = -phase;
      for (let j = 0; j < dimension; j++) turns += (vector[j] ?? 0) * (rows[j * BLOCK + i] ?? NaN);
      least = Math.min(least, Math.cos(2 * Math.PI * (turns - Math.round(turns))));
    }
  }
  return least;
}

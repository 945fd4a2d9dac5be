// Sobol' points alone: nanoseconds per coordinate, ours and SciPy's, in turn.
import { instantiateKernels } from "../dist/kernels/instance.js";
import { parseSource } from "../dist/sources/choice.js";
import { median, table } from "./table.mjs";

const BLOCK = 1024;

export async function sobolFill(python, rounds) {
  const rows = [];
  for (const [dimension, points] of [
    [10, 1 << 21],
    [64, 1 << 18],
  ]) {
    const kernels = instantiateKernels();
    const source = parseSource("sobol");
    const pointer = kernels.arena.allocate(BLOCK * dimension * 8);
    const fill = () => {
      const mark = kernels.arena.mark();
      const stream = source.open({ dimension, n: points, key: null }, kernels);
      const start = performance.now();
      for (let begin = 0; begin < points; begin += BLOCK) stream.fill(pointer, BLOCK, BLOCK);
      const seconds = (performance.now() - start) / 1000;
      kernels.arena.release(mark);
      return seconds;
    };
    fill();
    const pairs = [];
    for (let round = 0; round < rounds; round++) {
      pairs.push({ ours: fill(), scipy: (await python.ask("fill", dimension, points)).seconds });
    }
    const perCoordinate = (seconds) => ((seconds / points / dimension) * 1e9).toFixed(2);
    rows.push([
      `d = ${dimension}`,
      perCoordinate(median(pairs.map((p) => p.ours))),
      perCoordinate(median(pairs.map((p) => p.scipy))),
      median(pairs.map((p) => p.scipy / p.ours)).toFixed(2),
    ]);
  }
  return table(
    ["", "ours, ns per coordinate", "SciPy, ns per coordinate", "SciPy's time ÷ ours"],
    rows,
    "lrrr",
  );
}

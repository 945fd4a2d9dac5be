// The engine side of the benchmark: the four integrands as formulas, run through the same path as a study.
import { compileFormula } from "../dist/formula/index.js";
import { channelMean } from "../dist/estimators/moments.js";
import { parseSource } from "../dist/sources/choice.js";
import { makeKey } from "../dist/sources/key.js";
import { Integrator } from "../dist/study/integrator.js";

const range = (n, f) => Array.from({ length: n }, (_, j) => f(j));

const FORMULAS = {
  peak: {
    d: 8,
    text: "exp(-sum((c .* (x - w)) .^ 2))",
    constants: { c: range(8, (j) => 0.6 + 0.1 * j), w: range(8, (j) => 0.3 + 0.05 * j) },
  },
  product: {
    d: 16,
    text: "prod((abs(4 * x - 2) + a) ./ (1 + a))",
    constants: { a: range(16, (j) => 0.5 * (j + 1)) },
  },
  path: {
    d: 64,
    normal: true,
    text: "max(100 * mean(exp(cumsum((0.05 - 0.02) / 64 + 0.025 * x))) - 100, 0)",
    constants: {},
  },
  wave: {
    d: 10,
    text: "cos(2 * pi * 0.3 + dot(c, x))",
    constants: { c: range(10, (j) => 0.9 / (1 + 0.1 * j)) },
  },
};

/** One workload under one source; `measure(points)` gives estimate and seconds, compilation not counted. */
export async function engineRates(name, sourceId) {
  const { d, text, constants, normal } = FORMULAS[name];
  const { moduleBytes, ...formula } = await compileFormula(text, {
    inputs: [{ name: "x", length: d, first: 0 }],
    constants,
  });
  const transforms = normal ? [{ kind: "normal", first: 0, rows: d }] : [];
  const integrator = new Integrator({
    id: name,
    module: new WebAssembly.Module(moduleBytes),
    formula,
    transforms,
  });
  const source = parseSource(sourceId);
  const key = makeKey({ seed: 1, purpose: "study", problem: name, source: source.id, replicate: 0 });
  const measure = (points) => {
    const mark = integrator.kernels.arena.mark();
    const start = performance.now();
    const stream = source.open(
      { dimension: d, n: points, key: source.deterministic ? null : key },
      integrator.kernels,
    );
    const { sizes } = integrator.run(stream, [points]);
    const seconds = (performance.now() - start) / 1000;
    integrator.kernels.arena.release(mark);
    return { estimate: channelMean(sizes[0].moments), seconds };
  };
  measure(1 << 18); // past the engine's baseline compiler
  return { measure };
}

// Quantiles of inputs beside SciPy's ppf (and scipy.special, where it has the quantile alone) on the same uniforms, the two
// taking turns; the median over rounds. The time to make a table is measured once, on parameters that no round uses.
import { execFileSync } from "node:child_process";
import { performance } from "node:perf_hooks";
import { instantiateKernels } from "../dist/kernels/instance.js";
import { lawOf } from "../dist/problem/distributions/registry.js";
import { TransformPasses } from "../dist/study/transform-passes.js";
import { median, table } from "./table.mjs";

const BLOCK = 4096;
const COUNT = 1 << 18;

const CASES = [
  ["gamma", { shape: 2.5 }, { shape: 2.625 }, "special.gammaincinv(2.5, u)"],
  ["beta", { alpha: 2.5, beta: 4 }, { alpha: 2.625, beta: 4 }, "special.betaincinv(2.5, 4, u)"],
  ["student", { degrees: 5 }, { degrees: 5.125 }, "special.stdtrit(5, u)"],
  [
    "inverse-gaussian",
    { mean: 2, shape: 3 },
    { mean: 2, shape: 3.125 },
    "stats.invgauss.ppf(u, 2 / 3, scale=3)",
  ],
  ["weibull", { shape: 2 }, null, "np.sqrt(-np.log1p(-u))"],
  ["poisson", { mean: 30 }, { mean: 30.5 }, "stats.poisson.ppf(u, 30)"],
];

/** SciPy's nanoseconds for a value. */
function peer(expression) {
  const script = `
import time
import numpy as np
from scipy import special, stats
u = np.random.default_rng(1).random(${COUNT})
${expression.replace("u)", "u[:100])")}
t = time.perf_counter()
${expression}
print((time.perf_counter() - t) / ${COUNT} * 1e9)`;
  return Number(execFileSync("python3", ["-c", script], { encoding: "utf8" }));
}

function ours(law) {
  const kernels = instantiateKernels();
  const x = kernels.arena.allocate(BLOCK * 8);
  const transforms = law.passes().map((pass) => ({ ...pass, first: 0, rows: 1 }));
  const passes = new TransformPasses(kernels, transforms, x, BLOCK);
  const uniforms = Float64Array.from({ length: BLOCK }, (_, i) => ((i + 0.5) * 0.6180339887498949) % 1);
  let spent = 0;
  for (let round = 0; round < COUNT / BLOCK; round++) {
    kernels.f64(x, BLOCK).set(uniforms);
    const started = performance.now();
    passes.run(BLOCK);
    spent += performance.now() - started;
  }
  return (spent / COUNT) * 1e6;
}

function buildMilliseconds(id, parameters) {
  if (parameters === null) return "–";
  const started = performance.now();
  lawOf(id, parameters).passes();
  return (performance.now() - started).toFixed(0);
}

/** The section `quantiles` of docs/measurements.md. */
export function quantileTable(rounds) {
  const rows = CASES.map(([id, parameters, fresh, expression]) => {
    const law = lawOf(id, parameters);
    ours(law);
    const times = Array.from({ length: rounds }, () => [ours(law), peer(expression)]);
    const own = median(times.map(([a]) => a));
    const ratio = median(times.map(([a, b]) => b / a));
    return [id, own.toFixed(1), ratio.toFixed(1), expression, buildMilliseconds(id, fresh)];
  });
  return table(
    ["distribution", "ns per value", "SciPy time ÷ ours", "SciPy", "table made in ms"],
    rows,
    "lrrlr",
  );
}

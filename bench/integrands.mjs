// Integrands with correlated inputs and paths, as problem files, against the NumPy/SciPy script of integrands.py: one thread each.
import { spawn } from "node:child_process";
import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { fileURLToPath } from "node:url";
import { channelMean } from "../dist/estimators/moments.js";
import { loadProblem } from "../dist/problem/load.js";
import { parseSource } from "../dist/sources/choice.js";
import { makeKey } from "../dist/sources/key.js";
import { Integrator } from "../dist/study/integrator.js";
import { prepareProblems } from "../dist/study/runnable.js";
import { median, table } from "./table.mjs";

const path = (construction) => `
constants: { start: 100, guaranteed: 95, volatility: 0.2 }
inputs:
  output: { path: geometric-brownian, length: 64, start: start, volatility: volatility, construction: ${construction} }
integrand: max(guaranteed - mean(output), 0)`;

const WORKLOADS = {
  bridge: { title: "average of a path of 64, bridge", points: 1 << 16, text: path("bridge") },
  principal: {
    title: "average of a path of 64, principal components",
    points: 1 << 16,
    text: path("principal-components"),
  },
  basket: {
    title: "basket of 5 correlated prices",
    points: 1 << 19,
    text: `
inputs: { z: { distribution: normal, length: 5 } }
dependence: { correlation: [${[0, 1, 2, 3, 4].map((i) => `[${[0, 1, 2, 3, 4].map((j) => (i === j ? 1 : 0.5))}]`)}] }
integrand: max(100 * mean(exp(0.2 * z - 0.02)) - 100, 0)`,
  },
  credit: {
    title: "loss on 100 loans with one factor",
    points: 1 << 15,
    text: `
constants: { limit: -1.7506860712521692 }
inputs:
  common: { distribution: normal }
  own: { distribution: normal, length: 100 }
integrand: mean(sqrt(0.2) * common + sqrt(0.8) * own < limit)`,
  },
};

function startScript() {
  const file = fileURLToPath(new URL("integrands.py", import.meta.url));
  const python = spawn("python3", [file], { stdio: ["pipe", "pipe", "inherit"] });
  const lines = createInterface({ input: python.stdout })[Symbol.asyncIterator]();
  return {
    async ask(...words) {
      python.stdin.write(`${words.join(" ")}\n`);
      const [estimate, seconds] = (await lines.next()).value.split(" ").map(Number);
      return { estimate, seconds };
    },
    close: () => python.stdin.end(),
  };
}

async function engine(name, folder) {
  const file = join(folder, `${name}.yaml`);
  writeFileSync(file, `title: ${name}\n${WORKLOADS[name].text}\ntolerance: { absolute: 1 }\n`);
  const { problem } = await loadProblem(file);
  const [runnable] = await prepareProblems([problem]);
  const integrator = new Integrator(runnable);
  return (sourceId, points) => {
    const source = parseSource(sourceId);
    const key = makeKey({ seed: 1, purpose: "study", problem: name, source: source.id, replicate: 0 });
    const mark = integrator.kernels.arena.mark();
    const start = performance.now();
    const request = { dimension: problem.dimension, n: points, key: source.deterministic ? null : key };
    const { sizes } = integrator.run(source.open(request, integrator.kernels), [points]);
    const seconds = (performance.now() - start) / 1000;
    integrator.kernels.arena.release(mark);
    return { estimate: channelMean(sizes[0].moments), seconds };
  };
}

export async function integrandTable(rounds, folder) {
  const script = startScript();
  const rows = [];
  try {
    for (const [name, { title, points }] of Object.entries(WORKLOADS)) {
      const measure = await engine(name, folder);
      for (const [kind, source] of [
        ["draws", "pcg64"],
        ["draws", "xoshiro256++"],
        ["sobol", "sobol"],
      ]) {
        measure(source, points); // past the engine's baseline compiler
        const pairs = [];
        for (let round = 0; round < rounds; round++)
          pairs.push({ ours: measure(source, points), theirs: await script.ask(name, kind, points) });
        const apart = Math.abs(pairs[0].ours.estimate / pairs[0].theirs.estimate - 1);
        if (!(apart < (kind === "sobol" ? 1e-3 : 0.1))) throw new Error(`${name}, ${source}: ${apart} apart`);
        rows.push([
          title,
          kind === "sobol" ? source : `${source} (NumPy: PCG64, ziggurat)`,
          (median(pairs.map((p) => p.ours.seconds / points)) * 1e9).toFixed(0),
          median(pairs.map((p) => p.theirs.seconds / p.ours.seconds)).toFixed(2),
        ]);
        process.stderr.write(`bench: ${rows.at(-1).join("  ")}\n`);
      }
    }
  } finally {
    script.close();
  }
  return table(["integrand", "points", "ns per point", "NumPy/SciPy time ÷ ours"], rows, "llrr");
}

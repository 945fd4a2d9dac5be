// Averages over every starting state of generators of 2^31 and 2^32 states, three dimensions, two threads.
import { availableParallelism } from "node:os";
import { cycleExecutor, fullCycle } from "../dist/study/full-cycle.js";
import { prepareProblems } from "../dist/study/runnable.js";
import { median, table } from "./table.mjs";

const THREADS = 2;

const CASES = [
  ["lcg-1103515245", "Gaussian peak", "exp(-sum((x - 0.5) .^ 2) / 0.1)"],
  ["minstd-16807", "Gaussian peak", "exp(-sum((x - 0.5) .^ 2) / 0.1)"],
  ["minstd-16807", "product", "x[1] * x[2] * x[3]"],
  ["randu", "Gaussian peak", "exp(-sum((x - 0.5) .^ 2) / 0.1)"],
  ["xorshift32", "Gaussian peak", "exp(-sum((x - 0.5) .^ 2) / 0.1)"],
];

function problemOf(integrand) {
  return {
    id: "bench",
    dimension: 3,
    inputs: [{ name: "x", distribution: "uniform", length: 3, first: 0 }],
    constants: {},
    integrand,
    reference: null,
  };
}

async function once(source, integrand) {
  const problem = problemOf(integrand);
  const [runnable] = await prepareProblems([problem]);
  const executor = cycleExecutor({ problem: runnable, source }, THREADS);
  const started = performance.now();
  const { states, mean } = await fullCycle({
    problem,
    source,
    executor,
    journal: { done: new Map(), add: () => {} },
    signal: { aborted: false },
    advance: () => {},
  });
  const seconds = (performance.now() - started) / 1000;
  await executor.close();
  return { states, mean, seconds };
}

/** The whole cycle each time, nothing scaled up; the mean must be the same in every round. */
export async function fullCycleTable(rounds) {
  if (availableParallelism() < THREADS) throw new Error(`needs ${THREADS} processors`);
  const rows = [];
  for (const [source, title, integrand] of CASES) {
    const runs = [];
    for (let round = 0; round < Math.min(rounds, 3); round++) runs.push(await once(source, integrand));
    const [{ states, mean }] = runs;
    if (runs.some((run) => run.mean !== mean)) throw new Error("the mean changes between rounds");
    rows.push([
      `\`${source}\``,
      title,
      states.toLocaleString("en"),
      median(runs.map((r) => r.seconds)).toFixed(1),
    ]);
  }
  return table(["source", "integrand, d = 3", "states", "two threads, s"], rows, "llrr");
}
